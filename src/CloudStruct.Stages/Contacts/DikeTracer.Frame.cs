using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <content>Centre line, chainage, rows and polylines.</content>
internal sealed partial class DikeTracer
{
    private static readonly string[] Compass = ["N", "NE", "E", "SE", "S", "SW", "W", "NW"];
    private const double PriorLargestConeDeg = 25;   // a hand reading alone leaves 12 deg; what is wider says nothing
    private double[] chainage = [];

    /// <summary>Centre line with normals; fixes chainage for everything else.</summary>
    /// <param name="baseline">Line that fixes chainage, local; empty for none.</param>
    public DikeFrame Frame(Vec3[] baseline)
    {
        int n = Stretches.Length;
        var line = new Vec3[n];
        var normal = new Vec3[n];
        var sigma = new double[n];
        double[] height = Heights();
        for (int i = 0; i < n; i++)
        {
            double s = Stretches[i].S;
            SheetAxes axes = tracker.Sheet.At(s);
            double middle = -(tracker.Guess.Distance(Margin.A, new SheetPoint(s, 0, height[i])) + tracker.Guess.Distance(Margin.B, new SheetPoint(s, 0, height[i]))) / 2;
            line[i] = axes.Origin + (axes.Normal * middle) + (axes.Up * height[i]);
            normal[i] = LineOnly ? Level(axes) : Stretches[i].Chosen is { } fit ? fit.Pole(axes).Normal : axes.Normal;
            sigma[i] = Fixed[i] == Constraint.Plane ? Math.Min(90, Math.Sqrt(DipVariance(Stretches[i].Chosen!, axes)) * 180 / Math.PI) : 90;
        }

        chainage = Chainage.Along(line, [.. Stretches.Select(s => s.S)], baseline);
        return new DikeFrame
        {
            Dike = Dike, CentreLine = line, ChainageM = chainage, Normal = normal, DipSigmaDeg = sigma, Constraint = Fixed, AIsLower = tracker.Sheet.AIsLower,
            WindowM = tracker.WindowM, TraceScatterM = traceNoise.Noise.Sigma, TraceRangeM = traceNoise.Noise.Range, TraceWhiteShare = traceNoise.Noise.WhiteShare,
            TraceShared = traceNoise.Shared, WaveM = traceNoise.WaveM, WaveRangeM = traceNoise.WaveRangeM,
        };
    }

    /// <summary>Chainage of a place along the sheet [m]; after <see cref="Frame"/>.</summary>
    public double ChainageAt(double s)
    {
        if (Stretches.Length < 2) return chainage[0] + s - FromS;
        double u = (s - FromS) / (ToS - FromS) * (Stretches.Length - 1);
        int i = Math.Clamp((int)Math.Floor(u), 0, Stretches.Length - 2);
        return chainage[i] + ((u - i) * (chainage[i + 1] - chainage[i]));
    }

    /// <summary>Rows of contacts.csv: every half window, each margin by its best evidence.</summary>
    public IEnumerable<Contact> Rows()
    {
        int count = Math.Max(1, (int)Math.Round((ToS - FromS) / (tracker.WindowM / 2)) - 1);
        foreach (Margin margin in (Margin[])[Margin.A, Margin.B])
        {
            int segment = 0;
            double? lastTrend = null;
            for (int i = 0; i < count; i++)
            {
                int at = (int)Math.Round((Stretches.Length - 1) * (i + 1.0) / (count + 1));
                if (Row(margin, at, segment + 1, lastTrend) is not { } row) continue;
                segment++;
                lastTrend = row.TrendAlongDeg ?? lastTrend;
                yield return row;
                if (WithPrior(row, margin, at, lastTrend) is { } informed) yield return informed;
            }
        }
    }

    private Contact? Row(Margin margin, int at, int segment, double? lastTrend)
    {
        DikeStretch stretch = Stretches[at];
        if (stretch.Fits[margin == Margin.A ? 0 : 1] is not { } fit) return null;
        SheetAxes axes = tracker.Sheet.At(stretch.S);
        double half = tracker.WindowM / 2;
        Vec3 line = fit.Line.Z > 0 ? -fit.Line : fit.Line, facing = axes.Normal * (margin == Margin.A ? -1 : 1);
        var row = new Contact
        {
            Dike = Dike, Margin = margin, Segment = segment,
            ChainageFromM = ChainageAt(Math.Max(FromS, stretch.S - half)), ChainageToM = ChainageAt(Math.Min(ToS, stretch.S + half)),
            Middle = fit.Middle, ReliefM = fit.ReliefM, RmsM = fit.LineRmsM, Points = fit.Cells,
            Evidence = OnSurface(margin, stretch.S) ? Evidence.Surface : stretch.Both ? Evidence.BothMargins : Evidence.Trace, WindowM = tracker.WindowM,
            LineTrendDeg = Azimuth.Of(line, frame.TurnDeg),
            LinePlungeDeg = Math.Atan2(-line.Z, Math.Sqrt((line.X * line.X) + (line.Y * line.Y))) * 180 / Math.PI,
            MarginFacing = Compass[(int)Math.Round(Azimuth.Of(facing, frame.TurnDeg) / 45) % 8],
            Constraint = Constraint.Line,
        };
        if (Fixed[at] != Constraint.Plane || Cone(fit) > settings.LargestConeDeg) return row;
        (Vec3 normal, Symmetric3 covariance) = fit.Pole(axes);
        return Plane(row, margin, normal, covariance, axes, lastTrend) with { RmsM = fit.RmsM };
    }

    // Whether most of what stands for a margin in a stretch lies on its exposed surface.
    private bool OnSurface(Margin margin, double s)
    {
        int surface = 0, trace = 0;
        foreach (TraceCell c in Near(s, tracker.WindowM / 2))
        {
            if (c.Margin != margin) continue;
            if (c.Surface) surface++;
            else trace++;
        }

        return surface > trace;
    }

    // The same stretch with the compass readings about it; none where they leave the dip as open as before.
    private Contact? WithPrior(Contact row, Margin margin, int at, double? lastTrend)
    {
        StretchFit fit = Stretches[at].Fits[margin == Margin.A ? 0 : 1]!;
        SheetAxes axes = tracker.Sheet.At(Stretches[at].S);
        (Vec3 normal, Symmetric3 covariance) = fit.Pole(axes);
        // A trace that fixes no dip says one thing only: the contact holds its direction. On level ground the fit may even lie down
        // in the ground and claim to know it well.
        double alongError = Math.Max(0.01, fit.LineRmsM / (tracker.WindowM / Math.Sqrt(12)));
        BinghamAxis trace = row.Constraint == Constraint.Plane
            ? BinghamAxis.FromNormal(normal, covariance)
            : new BinghamAxis(Symmetric3.Outer(fit.Line, -0.5 / (alongError * alongError)));
        if (priors.With(fit.S, trace) is not { } axis) return null;
        Vec3 mode = axis.Mode, side = Level(axes);
        if (mode.Dot(side) < 0) mode = -mode;
        Contact informed = Plane(row, margin, mode, axis.Covariance(), axes, lastTrend) with { Evidence = Evidence.Prior };
        return informed.Region!.Cone95Deg <= PriorLargestConeDeg ? informed : null;
    }

    private Contact Plane(Contact row, Margin margin, Vec3 normal, Symmetric3 covariance, SheetAxes axes, double? lastTrend)
    {
        Vec3 facing = normal * (margin == Margin.A ? -1 : 1), up = Vec3.Up - (normal * normal.Z);
        double lean = -Math.Asin(Math.Clamp(normal.Z, -1, 1)) * 180 / Math.PI;
        double error = 1.96 * Math.Sqrt(covariance.Form(up.Length > 1e-9 ? up.Unit() : axes.Up)) * 180 / Math.PI;
        return row with
        {
            Constraint = Constraint.Plane, Normal = normal.Z < 0 ? -normal : normal, Attitude = Attitude.FromNormal(normal, frame.TurnDeg),
            Region = PoleRegions.From(normal, covariance, frame.Reference),
            TrendAlongDeg = Continue(Trend(normal, axes), lastTrend), LeanToBDeg = lean, LeanLow95Deg = Math.Max(-90, lean - error),
            LeanHigh95Deg = Math.Min(90, lean + error), MarginFacing = Compass[(int)Math.Round(Azimuth.Of(facing, frame.TurnDeg) / 45) % 8],
        };
    }

    // Azimuth of strike in the direction of increasing chainage.
    private double Trend(Vec3 normal, SheetAxes axes)
    {
        Vec3 along = Vec3.Up.Cross(normal);
        if (along.Length < 1e-9) along = axes.Along;
        return Azimuth.Of(along.Dot(axes.Along) < 0 ? -along : along, frame.TurnDeg);
    }

    private static double Continue(double trend, double? last)
    {
        if (last is not { } before) return trend;
        return before + (((trend - before) % 360 + 540) % 360) - 180;
    }

    private static double DipVariance(StretchFit fit, SheetAxes axes)
    {
        (Vec3 n, Symmetric3 covariance) = fit.Pole(axes);
        return covariance.Form((Vec3.Up - (n * n.Z)) is { Length: > 1e-9 } up ? up.Unit() : axes.Up);
    }

    private static Vec3 Level(SheetAxes axes)
    {
        Vec3 right = axes.Along.Cross(Vec3.Up);
        return axes.Normal.Dot(right) < 0 ? -right : right;
    }

    // Height up dip at which the traces run, per stretch, carried over gaps.
    private double[] Heights()
    {
        var height = new double[Stretches.Length];
        double reach = Math.Max(1, tracker.CellM * 2);
        for (int i = 0; i < height.Length; i++)
        {
            double sum = 0, weight = 0;
            foreach (TraceCell c in cells)
            {
                double d = Math.Abs(c.At.S - Stretches[i].S);
                if (d > reach) continue;
                double w = 1.01 - (d / reach);
                sum += w * c.At.T;
                weight += w;
            }

            height[i] = weight > 0 ? sum / weight : double.NaN;
        }

        int last = -1;
        for (int i = 0; i < height.Length; i++)
        {
            if (double.IsNaN(height[i])) continue;
            for (int k = last + 1; k < i; k++)
            {
                height[k] = last < 0 ? height[i] : height[last] + ((height[i] - height[last]) * (k - last) / (i - last));
            }

            last = i;
        }

        for (int k = last + 1; k < height.Length; k++) height[k] = last < 0 ? 0 : height[last];
        return height;
    }
}
