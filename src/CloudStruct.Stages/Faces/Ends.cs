using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>Whether the ends of a face along strike are seen: there rock of another face, worn rock or ground goes on from it. Where
/// nothing goes on, the face runs out of the survey or behind something.</summary>
internal static class Ends
{
    private const double RowSpacings = 2;

    // At an edge about half of the 16 neighbours lie across it; a few points of the face itself that its band left out do not count as such.
    private const int FewestAcross = 4;
    private const int FewestInRow = 3;

    /// <summary>How many of the two ends along strike run out of sight: each is judged by the last points of rows along strike, the
    /// majority deciding. Null when no row is long enough to have two ends.</summary>
    /// <param name="surface">The points.</param>
    /// <param name="pieces">Labels, sorted.</param>
    /// <param name="label">The face.</param>
    /// <param name="along">Unit strike direction.</param>
    /// <param name="down">Unit direction down the dip.</param>
    public static int? Hidden(Surface surface, Pieces pieces, int label, Vec3 along, Vec3 down)
    {
        double row = RowSpacings * surface.SpacingM;
        var rows = new SortedDictionary<int, (int Count, int First, double Low, int Last, double High)>();
        foreach (int i in pieces.Of(label))
        {
            Vec3 p = surface.Place(i);
            int at = (int)Math.Floor(p.Dot(down) / row);
            double u = p.Dot(along);
            if (!rows.TryGetValue(at, out var r)) r = (0, i, u, i, u);
            if (u < r.Low) (r.First, r.Low) = (i, u);
            if (u > r.High) (r.Last, r.High) = (i, u);
            r.Count++;
            rows[at] = r;
        }

        int judged = 0, first = 0, last = 0;
        foreach (var r in rows.Values)
        {
            if (r.Count < FewestInRow) continue;
            judged++;
            if (GoesOn(surface, pieces, label, r.First)) first++;
            if (GoesOn(surface, pieces, label, r.Last)) last++;
        }

        if (judged == 0) return null;
        return (2 * first < judged ? 1 : 0) + (2 * last < judged ? 1 : 0);
    }

    private static bool GoesOn(Surface surface, Pieces pieces, int label, int point)
    {
        int across = 0;
        foreach (int j in surface.NeighboursOf(point))
        {
            if (j < 0) break;
            if (pieces.Label[j] != label) across++;
        }

        return across >= FewestAcross;
    }
}
