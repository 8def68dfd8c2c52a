using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Classify;

/// <summary>A bent slab: margins as functions of the distance along strike, each piece with its own tilt.</summary>
/// <remarks>Coordinates about a reference plane: s along strike, v in the plane square to it, t along the normal. Looking
/// along increasing s, which runs toward azimuths 0 to 180, the side of falling t is A (for dips below 30 deg the lower side).
/// At knot k: margins at t = A[k] + G[k] (v - V[k]) and B[k] + G[k] (v - V[k]); straight between knots.</remarks>
internal sealed class Sheet
{
    public Sheet(Vec3 origin, Vec3 normal)
    {
        Origin = origin;
        Vec3 n = normal.Unit();
        double flat = Math.Sqrt((n.X * n.X) + (n.Y * n.Y));
        Vec3 u = flat > 1e-9 ? new Vec3(-n.Y, n.X, 0) / flat : new Vec3(1, 0, 0);
        if (u.X < 0 || (u.X == 0 && u.Y < 0)) u = -u;
        // A to B points to the right of increasing s; a sheet that lies flatter than 30 deg has A below.
        bool shallow = Math.Abs(n.Z) > Math.Cos(30 * Math.PI / 180);
        if (shallow ? n.Z < 0 : n.Dot(new Vec3(u.Y, -u.X, 0)) < 0) n = -n;
        (U, N) = (u, n);
        V = n.Cross(u);
    }

    public Vec3 Origin { get; }
    public Vec3 U { get; }
    public Vec3 V { get; }
    public Vec3 N { get; }

    /// <summary>Knots, in order of s; empty before the first fit.</summary>
    public List<Knot> Knots { get; } = [];

    /// <summary>Median width over the knots [m].</summary>
    public double WidthM
    {
        get
        {
            double[] w = [.. Knots.Select(k => k.B - k.A).Order()];
            return w.Length == 0 ? 0 : w[w.Length / 2];
        }
    }

    public (double S, double V, double T) At(float x, float y, float z)
    {
        double dx = x - Origin.X, dy = y - Origin.Y, dz = z - Origin.Z;
        return ((dx * U.X) + (dy * U.Y) + (dz * U.Z), (dx * V.X) + (dy * V.Y) + (dz * V.Z), (dx * N.X) + (dy * N.Y) + (dz * N.Z));
    }

    public Vec3 Place(double s, double v, double t) => Origin + (U * s) + (V * v) + (N * t);

    /// <summary>The margins' t at (s, v), with the ends' values kept beyond the ends.</summary>
    public (double A, double B) Margins(double s, double v)
    {
        (int k, double f) = Between(s);
        Knot p = Knots[k], q = Knots[Math.Min(k + 1, Knots.Count - 1)];
        double a = (p.A + (p.G * (v - p.V))) * (1 - f), b = (p.B + (p.G * (v - p.V))) * (1 - f);
        return (a + ((q.A + (q.G * (v - q.V))) * f), b + ((q.B + (q.G * (v - q.V))) * f));
    }

    /// <summary>Depth inside the slab [m]: distance to the nearer margin along the local normal, negative outside and beyond the ends.</summary>
    public double Depth(float x, float y, float z)
    {
        (double s, double v, double t) = At(x, y, z);
        (double a, double b) = Margins(s, v);
        (int k, double f) = Between(s);
        Knot p = Knots[k], q = Knots[Math.Min(k + 1, Knots.Count - 1)];
        double tilt = (p.G * (1 - f)) + (q.G * f);
        double yaw = q.S > p.S ? (q.A + q.B - p.A - p.B) / 2 / (q.S - p.S) : 0;
        double depth = Math.Min(t - a, b - t) / Math.Sqrt(1 + (tilt * tilt) + (yaw * yaw));
        double beyond = Beyond(s);
        return beyond > 0 ? Math.Min(depth, -beyond) : depth;
    }

    /// <summary>How far a place lies beyond the ends of the sheet [m], negative between them.</summary>
    public double Beyond(double s) => Math.Max(Knots[0].S - Knots[0].HalfM - s, s - Knots[^1].S - Knots[^1].HalfM);

    /// <summary>The pieces as the record keeps them.</summary>
    public SlabWindow[] Windows()
    {
        var windows = new SlabWindow[Knots.Count];
        for (int k = 0; k < windows.Length; k++)
        {
            Knot here = Knots[k], before = Knots[Math.Max(0, k - 1)], after = Knots[Math.Min(Knots.Count - 1, k + 1)];
            double run = after.S - before.S;
            double yaw = run > 0 ? (after.A + after.B - before.A - before.B) / 2 / run : 0;
            Vec3 normal = (N - (U * yaw) - (V * here.G)).Unit();
            double from = k == 0 ? here.S - here.HalfM : (before.S + here.S) / 2, to = k == windows.Length - 1 ? here.S + here.HalfM : (here.S + after.S) / 2;
            double s = (from + to) / 2;
            (double a, double b) = Margins(s, here.V);
            windows[k] = new SlabWindow(Place(s, here.V, (a + b) / 2), normal, (to - from) * Math.Sqrt(1 + (yaw * yaw)), (b - a) * normal.Dot(N));
        }

        return windows;
    }

    private (int Knot, double Share) Between(double s)
    {
        int low = 0, high = Knots.Count - 1;
        if (s <= Knots[0].S) return (0, 0);
        if (s >= Knots[high].S) return (high, 0);
        while (high - low > 1)
        {
            int mid = (low + high) / 2;
            if (Knots[mid].S <= s) low = mid;
            else high = mid;
        }

        return (low, (s - Knots[low].S) / (Knots[high].S - Knots[low].S));
    }
}
