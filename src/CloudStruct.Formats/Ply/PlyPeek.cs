using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;

namespace CloudStruct.Formats.Ply;

/// <summary>What the first vertices tell that the header does not: how far coordinates reach and how colours are scaled.</summary>
/// <param name="LargestCoordinate">Largest absolute coordinate seen.</param>
/// <param name="FinerThanFloat">True when text states coordinates more finely than a 32-bit float holds them.</param>
/// <param name="LargestColour">Largest colour value seen.</param>
internal sealed record PlyPeek(double LargestCoordinate, bool FinerThanFloat, double LargestColour)
{
    // Enough to see the scale of colours and one odd coordinate; little enough that inspect stays quick.
    private const long MostVertices = 4096;

    // What stands before the vertices is passed only when that is quick.
    private const long MostBefore = 1 << 16;

    /// <summary>Looks at the first vertices; damage found there is left for the reader to report.</summary>
    public static PlyPeek At(FileBytes file, PlyHeader header, PlyVertexLayout layout)
    {
        double largest = 0, colour = 0;
        bool finer = false;
        try
        {
            PlyCursor cursor = PlyCursor.Over(file, header);
            foreach (PlyElement before in header.Elements.TakeWhile(e => !ReferenceEquals(e, layout.Element)))
            {
                if (before.Count > MostBefore && !before.IsFixed) return new PlyPeek(0, false, 0);
                cursor.SkipElement(before, CancellationToken.None);
            }
            PlyProperty[] properties = layout.Element.Properties;
            for (long i = 0; i < Math.Min(MostVertices, layout.Element.Count); i++)
            {
                cursor.StartRecord(layout.Element);
                for (int p = 0; p < properties.Length; p++)
                {
                    if (properties[p].IsList)
                    {
                        cursor.SkipProperty(properties[p]);
                        continue;
                    }
                    double v = cursor.Value(properties[p].Type);
                    if (!double.IsFinite(v)) continue;
                    if (p == layout.X || p == layout.Y || p == layout.Z)
                    {
                        largest = Math.Max(largest, Math.Abs(v));
                        finer |= cursor is PlyAsciiCursor text && Math.Abs(v - (float)v) > text.HalfUnit;
                    }
                    else if (layout.HasColour && layout.Colour.Contains(p))
                    {
                        colour = Math.Max(colour, v);
                    }
                }
                cursor.EndRecord();
            }
        }
        catch (InputException)
        {
            return new PlyPeek(largest, finer, colour);
        }
        return new PlyPeek(largest, finer, colour);
    }
}
