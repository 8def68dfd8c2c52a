namespace CloudStruct.Records.Frame;

/// <summary>What a coordinate reference system says about x and y.</summary>
public enum CrsKind
{
    /// <summary>Nothing is stated: local axes; north is whatever y is.</summary>
    Unknown,

    /// <summary>Projected: metres or feet on a map grid.</summary>
    Projected,

    /// <summary>Degrees; refused for measuring.</summary>
    Geographic,

    /// <summary>A local or engineering system: metres, but no relation to north is stated.</summary>
    Local,
}
