namespace CloudStruct.Formats.Ply;

/// <summary>One element of a PLY file: a table of records.</summary>
/// <param name="Name">As written: "vertex", "face".</param>
/// <param name="Count">Records.</param>
/// <param name="Properties">In file order.</param>
internal sealed record PlyElement(string Name, long Count, PlyProperty[] Properties)
{
    /// <summary>Whether every record has the same length in a binary file.</summary>
    public bool IsFixed => !Properties.Any(p => p.IsList);

    /// <summary>Least bytes of a record in a binary file: lists empty.</summary>
    public int LeastBytes => Properties.Sum(p => PlyTypes.Bytes(p.CountType ?? p.Type));

    /// <summary>Index of the first scalar property with one of these names, case aside; -1 when there is none.</summary>
    public int IndexOf(params ReadOnlySpan<string> names)
    {
        foreach (string name in names)
        {
            int i = Array.FindIndex(Properties, p => !p.IsList && p.Name.Equals(name, StringComparison.OrdinalIgnoreCase));
            if (i >= 0) return i;
        }
        return -1;
    }

    /// <summary>Byte at which a property stands in a fixed record.</summary>
    public int OffsetOf(int index) => Properties.Take(index).Sum(p => PlyTypes.Bytes(p.Type));
}
