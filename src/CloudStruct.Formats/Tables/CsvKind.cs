namespace CloudStruct.Formats.Tables;

/// <summary>What a table column holds; decides the digits written and the CSVW data type.</summary>
public enum CsvKind
{
    /// <summary>Words.</summary>
    Text,

    /// <summary>Whole number.</summary>
    Integer,

    /// <summary>Degrees, 2 decimals.</summary>
    AngleDeg,

    /// <summary>Degrees from 0 to below 360, 2 decimals; what rounds to 360.00 is written 0.00.</summary>
    AzimuthDeg,

    /// <summary>Degrees from 0 to below 180, 2 decimals; what rounds to 180.00 is written 0.00.</summary>
    AxisDeg,

    /// <summary>Metres, 3 decimals.</summary>
    Metres,

    /// <summary>Any other number, 4 significant digits: areas, ratios, intensities.</summary>
    Number,

    /// <summary>A number with all its digits, for what is read again by programs.</summary>
    Exact,

    /// <summary>yes or no, from bool.</summary>
    YesNo,
}
