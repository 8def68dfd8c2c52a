namespace CloudStruct.Products.Plots;

/// <summary>Shapes of marks, in the order in which sets take them.</summary>
internal enum MarkShape
{
    Circle,
    Square,
    TriangleUp,
    Diamond,
    TriangleDown,
    Hexagon,
    Cross,
}
