namespace CloudStruct.Products.Plots;

/// <summary>Where a text lies from its place.</summary>
internal enum Align
{
    Left,
    Middle,
    Right,
}
