using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Rock;
using CloudStruct.Simulate.Views;

namespace CloudStruct.Simulate;

/// <summary>Numbers the true faces: connected pieces, as sampled, of one plane of the rock.</summary>
internal static class FaceTruth
{
    /// <summary>Gaps up to about this many spacings do not part a face.</summary>
    private const double CellSpacings = 2.0;

    /// <summary>Numbers faces and measures them.</summary>
    /// <param name="massif">The rock.</param>
    /// <param name="sights">Seen places before noise.</param>
    /// <param name="onPlane">Whether each still lies on its plane.</param>
    /// <param name="normals">Outward normal at each.</param>
    /// <param name="origin">Map coordinates of the local origin.</param>
    /// <param name="spacingM">Mean distance of neighbouring points [m].</param>
    /// <returns>Face number per point, and the faces.</returns>
    public static (int[] FaceOf, SimulatedFace[] Faces) Number(
        Massif massif, Sight[] sights, bool[] onPlane, Vec3[] normals, Vec3 origin, double spacingM)
    {
        var faceOf = new int[sights.Length];
        int[] order = [.. Enumerable.Range(0, sights.Length).Where(i => onPlane[i])];
        long[] keys = [.. order.Select(i => Key(sights[i]))];
        Array.Sort(keys, order);   // unstable among equal keys; put in order below
        var faces = new List<SimulatedFace>();
        for (int from = 0; from < order.Length;)
        {
            int to = from + 1;
            while (to < order.Length && keys[to] == keys[from]) to++;
            Span<int> group = order.AsSpan(from, to - from);
            group.Sort();
            AddPieces(massif, sights, normals, group, origin, CellSpacings * spacingM, spacingM, faceOf, faces);
            from = to;
        }

        return (faceOf, [.. faces]);
    }

    private static long Key(Sight s) => ((long)s.Kind << 56) | ((long)s.Rock << 48) | ((long)s.Surface << 1) | (s.Back ? 1L : 0L);

    private static void AddPieces(
        Massif massif, Sight[] sights, Vec3[] normals, Span<int> group, Vec3 origin, double cellM, double spacingM, int[] faceOf, List<SimulatedFace> faces)
    {
        Sight first = sights[group[0]];
        Vec3 n = first.Kind == Hit.Kinds.Margin ? massif.Dikes[first.Surface / 2].Across : normals[group[0]];
        (Vec3 e, Vec3 f) = Chance.Axes.Beside(n);
        var cells = new Dictionary<(int, int), List<int>>();
        foreach (int i in group)
        {
            Vec3 p = sights[i].Place;
            var cell = ((int)Math.Floor(p.Dot(e) / cellM), (int)Math.Floor(p.Dot(f) / cellM));
            if (!cells.TryGetValue(cell, out List<int>? list)) cells[cell] = list = [];
            list.Add(i);
        }

        var done = new HashSet<(int, int)>();
        foreach ((int, int) start in cells.Keys)   // in order of insertion, that is of points
        {
            if (!done.Add(start)) continue;
            List<(int X, int Y)> piece = [start];
            for (int k = 0; k < piece.Count; k++)
            {
                for (int dx = -1; dx <= 1; dx++)
                {
                    for (int dy = -1; dy <= 1; dy++)
                    {
                        (int, int) next = (piece[k].X + dx, piece[k].Y + dy);
                        if (cells.ContainsKey(next) && done.Add(next)) piece.Add(next);
                    }
                }
            }

            faces.Add(Measure(sights, normals, piece, cells, first, n, origin, cellM, spacingM, faceOf, faces.Count + 1));
        }
    }

    private static SimulatedFace Measure(
        Sight[] sights,
        Vec3[] normals,
        List<(int X, int Y)> piece,
        Dictionary<(int, int), List<int>> cells,
        Sight first,
        Vec3 n,
        Vec3 origin,
        double cellM,
        double spacingM,
        int[] faceOf,
        int id)
    {
        Vec3 sum = default, normalSum = default;
        int points = 0;
        foreach ((int, int) cell in piece)
        {
            foreach (int i in cells[cell])
            {
                faceOf[i] = id;
                sum += sights[i].Place;
                normalSum += normals[i];
                points++;
            }
        }

        Vec3 middle = sum / points, normal = first.Kind == Hit.Kinds.Margin ? normalSum.Unit() : n;
        double offset = normal.Dot(middle), squares = 0;
        if (first.Kind == Hit.Kinds.Margin)
        {
            foreach ((int, int) cell in piece)
            {
                foreach (int i in cells[cell]) squares += Math.Pow(normal.Dot(sights[i].Place) - offset, 2);
            }
        }

        return new SimulatedFace
        {
            Id = id,
            Kind = first.Kind switch
            {
                Hit.Kinds.Loose => FaceKind.LooseSide,
                Hit.Kinds.Margin => FaceKind.Contact,
                _ => first.Rock == 0 ? FaceKind.Joint : FaceKind.CoolingJoint,
            },
            Dike = first.Kind == Hit.Kinds.Margin ? (first.Surface / 2) + 1 : first.Rock,
            Normal = normal,
            OffsetM = offset,
            Middle = middle + origin,
            AreaM2 = Area(piece, cells, cellM, spacingM),
            Points = points,
            WaveRmsM = Math.Sqrt(squares / points),
        };
    }

    /// <summary>Cells with all neighbours count whole; at the rim, as much of a cell as it has of the usual points.</summary>
    private static double Area(List<(int X, int Y)> piece, Dictionary<(int, int), List<int>> cells, double cellM, double spacingM)
    {
        var inner = new List<int>();
        var rim = new List<int>();
        foreach ((int x, int y) in piece)
        {
            bool whole = true;
            for (int dx = -1; dx <= 1 && whole; dx++)
            {
                for (int dy = -1; dy <= 1 && whole; dy++) whole = cells.ContainsKey((x + dx, y + dy));
            }

            (whole ? inner : rim).Add(cells[(x, y)].Count);
        }

        double usual = inner.Count >= 6 ? inner.Average() : cellM * cellM / (spacingM * spacingM);
        return cellM * cellM * (inner.Count + rim.Sum(c => Math.Min(1, c / usual)));
    }
}
