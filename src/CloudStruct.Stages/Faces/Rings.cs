namespace CloudStruct.Stages.Faces;

/// <summary>Closed rings in a plane.</summary>
internal static class Rings
{
    /// <summary>Leaves out corners that lie within a distance of the line between those that stay.</summary>
    /// <param name="ring">Not closed.</param>
    /// <param name="toleranceM">That distance [m].</param>
    /// <remarks>D. H. Douglas and T. K. Peucker 1973, on the two halves between the first corner and the farthest from it.</remarks>
    public static List<(double U, double V)> Simplify(List<(double U, double V)> ring, double toleranceM)
    {
        if (ring.Count < 4) return ring;
        int far = 0;
        double most = -1;
        for (int i = 1; i < ring.Count; i++)
        {
            double d = Square(ring[i].U - ring[0].U) + Square(ring[i].V - ring[0].V);
            if (d > most) (far, most) = (i, d);
        }

        var closed = new List<(double U, double V)>(ring) { ring[0] };
        var keep = new bool[closed.Count];
        keep[0] = keep[far] = keep[^1] = true;
        var work = new Stack<(int From, int To)>();
        work.Push((0, far));
        work.Push((far, closed.Count - 1));
        while (work.Count > 0)
        {
            (int from, int to) = work.Pop();
            int best = -1;
            double farthest = toleranceM;
            for (int i = from + 1; i < to; i++)
            {
                double d = FromSegment(closed[i], closed[from], closed[to]);
                if (d > farthest) (best, farthest) = (i, d);
            }

            if (best < 0) continue;
            keep[best] = true;
            work.Push((from, best));
            work.Push((best, to));
        }

        return [.. closed.Take(closed.Count - 1).Where((_, i) => keep[i])];
    }

    private static double FromSegment((double U, double V) p, (double U, double V) a, (double U, double V) b)
    {
        double du = b.U - a.U, dv = b.V - a.V, length2 = (du * du) + (dv * dv);
        double t = length2 > 0 ? Math.Clamp((((p.U - a.U) * du) + ((p.V - a.V) * dv)) / length2, 0, 1) : 0;
        return Math.Sqrt(Square(p.U - a.U - (t * du)) + Square(p.V - a.V - (t * dv)));
    }

    private static double Square(double x) => x * x;
}
