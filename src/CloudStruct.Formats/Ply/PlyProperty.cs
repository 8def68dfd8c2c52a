namespace CloudStruct.Formats.Ply;

/// <summary>One property of an element.</summary>
/// <param name="Name">As written.</param>
/// <param name="Type">Type of its values.</param>
/// <param name="CountType">For a list, the type of its length; else null.</param>
internal sealed record PlyProperty(string Name, PlyType Type, PlyType? CountType)
{
    /// <summary>Whether it is a list.</summary>
    public bool IsList => CountType != null;
}
