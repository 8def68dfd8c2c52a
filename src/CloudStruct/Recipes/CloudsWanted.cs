namespace CloudStruct.Recipes;

/// <summary>Which classified cloud is written.</summary>
internal enum CloudsWanted
{
    /// <summary>Every input point.</summary>
    Las,

    /// <summary>Every input point, compressed.</summary>
    Laz,

    /// <summary>The working points only.</summary>
    Thinned,

    /// <summary>None.</summary>
    None,
}
