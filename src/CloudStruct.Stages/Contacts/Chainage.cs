using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>Metres along a dike.</summary>
internal static class Chainage
{
    /// <summary>Chainage of the vertices of a centre line.</summary>
    /// <param name="line">Vertices in order.</param>
    /// <param name="along">Their places along strike [m].</param>
    /// <param name="baseline">Line that fixes origin and direction; fewer than two vertices: 0 at the first vertex.</param>
    /// <remarks>With a baseline each vertex takes the length along the baseline, in plan, of the nearest point on it, carried on
    /// straight beyond its ends, so that a change of the centre line from season to season does not move the count. Where that
    /// would run backward (a dike that doubles back against the line) the count goes on by the distance along strike.</remarks>
    public static double[] Along(Vec3[] line, double[] along, Vec3[] baseline)
    {
        var chainage = new double[line.Length];
        for (int i = 0; i < line.Length; i++)
        {
            chainage[i] = baseline.Length < 2 ? along[i] - along[0] : OnLine(line[i], baseline);
            if (i > 0 && !(chainage[i] > chainage[i - 1])) chainage[i] = chainage[i - 1] + (along[i] - along[i - 1]);
        }

        return chainage;
    }

    /// <summary>Horizontal direction of a baseline from first to last vertex; null when it has none.</summary>
    public static Vec3? Direction(Vec3[] baseline)
    {
        if (baseline.Length < 2) return null;
        Vec3 d = baseline[^1] - baseline[0];
        d = new Vec3(d.X, d.Y, 0);
        return d.Length > 0 ? d.Unit() : null;
    }

    private static double OnLine(Vec3 place, Vec3[] baseline)
    {
        double best = double.PositiveInfinity, at = 0, passed = 0;
        for (int i = 0; i + 1 < baseline.Length; i++)
        {
            double dx = baseline[i + 1].X - baseline[i].X, dy = baseline[i + 1].Y - baseline[i].Y, length = Math.Sqrt((dx * dx) + (dy * dy));
            if (length == 0) continue;
            double px = place.X - baseline[i].X, py = place.Y - baseline[i].Y, u = ((px * dx) + (py * dy)) / length;
            u = Math.Clamp(u, i == 0 ? double.NegativeInfinity : 0, i + 2 == baseline.Length ? double.PositiveInfinity : length);
            double ex = px - (u * dx / length), ey = py - (u * dy / length), distance = (ex * ex) + (ey * ey);
            if (distance < best) (best, at) = (distance, passed + u);
            passed += length;
        }

        return at;
    }
}
