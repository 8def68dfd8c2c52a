namespace CloudStruct.Recipes;

/// <summary>North that a recipe can ask for.</summary>
internal enum NorthWanted
{
    /// <summary>True north where the coordinate system allows it.</summary>
    True,

    /// <summary>Grid north.</summary>
    Grid,
}
