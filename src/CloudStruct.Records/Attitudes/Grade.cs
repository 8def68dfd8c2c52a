namespace CloudStruct.Records.Attitudes;

/// <summary>Trust class of an attitude by its total cone.</summary>
public enum Grade
{
    /// <summary>Total cone up to 2 deg.</summary>
    Firm,

    /// <summary>Total cone up to 5 deg.</summary>
    Fair,

    /// <summary>Total cone above 5 deg, or not known.</summary>
    Weak,
}
