using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>A smooth reference surface along the middle of a dike: a level line, straight or gently bent, carried up a constant
/// lean. In its coordinates both margins are nearly flat, so that fits can be linear.</summary>
/// <remarks>The level line is y(x) over a straight axis; it is a straight line unless the dike bends by more than a seventh of
/// its width. Bends beyond about 60 deg from the mean trend are outside what it can follow.</remarks>
internal sealed class Sheet
{
    private const double StepM = 0.5;
    private readonly Vec3 origin, axis, side;      // axis: mean trend; side: level, toward B
    private readonly double firstX;
    private readonly double[] offset, slope, arc;  // per step of x: y, dy/dx, length of the line; empty when straight
    private readonly double sinLean, cosLean;

    private Sheet(Vec3 origin, Vec3 axis, Vec3 side, double lean, double firstX, double[] offset, bool aIsLower)
    {
        this.origin = origin;
        this.axis = axis;
        this.side = side;
        this.firstX = firstX;
        this.offset = offset;
        AIsLower = aIsLower;
        (sinLean, cosLean) = Math.SinCos(lean);
        slope = new double[offset.Length];
        arc = new double[offset.Length];
        for (int i = 0; i < offset.Length; i++)
        {
            int a = Math.Max(0, i - 1), b = Math.Min(offset.Length - 1, i + 1);
            slope[i] = (offset[b] - offset[a]) / ((b - a) * StepM);
            if (i > 0) arc[i] = arc[i - 1] + Math.Sqrt((StepM * StepM) + Math.Pow(offset[i] - offset[i - 1], 2));
        }

        if (arc.Length == 0) return;
        double atOrigin = ArcAt(0);
        for (int i = 0; i < arc.Length; i++) arc[i] -= atOrigin;
    }

    /// <summary>True when the mean dip is below 30 deg and A is the lower side.</summary>
    public bool AIsLower { get; }

    /// <summary>Through what is known so far.</summary>
    /// <param name="pieces">At least one.</param>
    /// <param name="forward">Horizontal direction that increasing chainage must follow; null: azimuths 0 to 180 of the stated north.</param>
    /// <param name="turnDeg">Degrees from grid to the stated north.</param>
    /// <param name="levelTrend">Horizontal direction to use as strike when the sheet is too flat to have one.</param>
    public static Sheet Through(IReadOnlyList<SheetPiece> pieces, Vec3? forward, double turnDeg, Vec3 levelTrend)
    {
        Vec3 sum = default, centre = default;
        double total = 0;
        foreach (SheetPiece p in pieces)
        {
            sum += p.Normal * (p.Weight * (p.Normal.Dot(pieces[0].Normal) < 0 ? -1 : 1));
            centre += p.Middle * p.Weight;
            total += p.Weight;
        }

        Vec3 normal = sum.Unit();
        centre /= total;
        if (normal.Z < 0) normal = -normal;
        double dip = Math.Acos(Math.Clamp(normal.Z, -1, 1)) * 180 / Math.PI;
        Vec3 along = dip < 5 ? new Vec3(levelTrend.X, levelTrend.Y, 0).Unit() : Vec3.Up.Cross(normal).Unit();
        bool backward = forward is { } f ? along.Dot(f) < 0 : Azimuth.Of(along, turnDeg) >= 180;
        if (backward) along = -along;
        Vec3 right = along.Cross(Vec3.Up);
        bool aIsLower = dip < 30;
        if (!aIsLower && normal.Dot(right) < 0) normal = -normal;
        // A lies on the left unless the sheet is so flat that "lower" says more; then the level direction from A to B is
        // that of the upward normal.
        Vec3 side = normal.Dot(right) < 0 ? -right : right;
        double lean = -Math.Asin(Math.Clamp(normal.Z, -1, 1));
        (double first, double[] line) = Bend(pieces, centre, along, side, normal);
        return new Sheet(centre, along, side, lean, first, line, aIsLower);
    }

    /// <summary>Coordinates of a place.</summary>
    public SheetPoint Of(Vec3 p)
    {
        Vec3 d = p - origin;
        double x = d.Dot(axis), y = d.Dot(side), s = x, across = y;
        if (offset.Length > 0)
        {
            double foot = x;
            for (int round = 0; round < 6; round++)
            {
                (double oy, double k) = LineAt(foot);
                foot += ((x - foot) + ((y - oy) * k)) / (1 + (k * k));
            }

            (double fy, double fk) = LineAt(foot);
            double norm = Math.Sqrt(1 + (fk * fk));
            across = ((y - fy) - ((x - foot) * fk)) / norm;
            s = ArcAt(foot);
        }

        return new SheetPoint(s, (across * cosLean) - (d.Z * sinLean), (across * sinLean) + (d.Z * cosLean));
    }

    /// <summary>Axes at a place along strike.</summary>
    public SheetAxes At(double s)
    {
        Vec3 at = origin + (axis * s), along = axis, across = side;
        if (offset.Length > 0)
        {
            double x = XAt(s);
            (double y, double k) = LineAt(x);
            double norm = Math.Sqrt(1 + (k * k));
            at = origin + (axis * x) + (side * y);
            along = (axis + (side * k)) / norm;
            across = (side - (axis * k)) / norm;
        }

        return new SheetAxes(at, along, (across * cosLean) - (Vec3.Up * sinLean), (across * sinLean) + (Vec3.Up * cosLean));
    }

    /// <summary>Place with these coordinates, local [m].</summary>
    public Vec3 Place(SheetPoint p)
    {
        SheetAxes a = At(p.S);
        return a.Origin + (a.Normal * p.Q) + (a.Up * p.T);
    }

    private static (double First, double[] Offsets) Bend(
        IReadOnlyList<SheetPiece> pieces, Vec3 centre, Vec3 along, Vec3 side, Vec3 normal)
    {
        // A flat sheet's level line cannot be told from middles at different heights: a small error of dip moves it far.
        double level = Math.Sqrt(1 - (normal.Z * normal.Z));
        if (pieces.Count < 4 || level < 0.5) return (0, []);
        var x = new double[pieces.Count];
        var y = new double[pieces.Count];
        double width = 0;
        for (int i = 0; i < x.Length; i++)
        {
            Vec3 d = pieces[i].Middle - centre;
            x[i] = d.Dot(along);
            y[i] = d.Dot(side) + (d.Z * normal.Z / level);   // moved along the sheet to the level of the centre
            width += pieces[i].WidthM / x.Length;
        }

        double from = x.Min() - 5, to = x.Max() + 5, reach = Math.Max(2 * width, 4);
        var line = new double[(int)Math.Ceiling((to - from) / StepM) + 1];
        double largest = 0;
        (double mean, double trend) = LocalLine(x, y, pieces, 0, double.PositiveInfinity);
        for (int i = 0; i < line.Length; i++)
        {
            double at = from + (i * StepM), inside = Math.Clamp(at, x.Min(), x.Max());
            (double value, double k) = LocalLine(x, y, pieces, inside, reach);
            line[i] = value + (k * (at - inside));
            largest = Math.Max(largest, Math.Abs(line[i] - mean - (trend * at)));
        }

        return largest < width / 7 ? (0, []) : (from, line);
    }

    private static (double Value, double Slope) LocalLine(double[] x, double[] y, IReadOnlyList<SheetPiece> pieces, double at, double reach)
    {
        double w = 0, mx = 0, my = 0, xx = 0, xy = 0;
        for (int i = 0; i < x.Length; i++)
        {
            double d = x[i] - at, k = pieces[i].Weight * Math.Exp(-0.5 * d * d / (reach * reach));
            w += k;
            mx += k * d;
            my += k * y[i];
            xx += k * d * d;
            xy += k * d * y[i];
        }

        double spread = xx - (mx * mx / w), slope = spread > 1e-6 * w ? (xy - (mx * my / w)) / spread : 0;
        return ((my / w) - (slope * mx / w), slope);
    }

    private (double Y, double Slope) LineAt(double x)
    {
        double u = (x - firstX) / StepM;
        int i = (int)Math.Clamp(Math.Floor(u), 0, offset.Length - 2);
        double f = u - i;
        if (f is < 0 or > 1)   // beyond the ends it runs on straight
        {
            int end = f < 0 ? 0 : offset.Length - 1;
            return (offset[end] + (slope[end] * (u - end) * StepM), slope[end]);
        }

        return (offset[i] + (f * (offset[i + 1] - offset[i])), slope[i] + (f * (slope[i + 1] - slope[i])));
    }

    private double ArcAt(double x)
    {
        double u = (x - firstX) / StepM;
        int i = (int)Math.Clamp(Math.Floor(u), 0, arc.Length - 2);
        return arc[i] + ((u - i) * (arc[i + 1] - arc[i]));
    }

    private double XAt(double s)
    {
        int i = Array.BinarySearch(arc, s);
        if (i < 0) i = ~i - 1;
        i = Math.Clamp(i, 0, arc.Length - 2);
        return firstX + ((i + ((s - arc[i]) / (arc[i + 1] - arc[i]))) * StepM);
    }
}
