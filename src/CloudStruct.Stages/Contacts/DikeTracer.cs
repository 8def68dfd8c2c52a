using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Contacts;

/// <summary>One dike from clean trace cells to attitudes along strike.</summary>
internal sealed partial class DikeTracer
{
    private const int FitsPerWindow = 16;
    private readonly MarginTracker tracker;
    private readonly TraceCell[] cells;
    private readonly SurveyFrame frame;
    private readonly ContactSettings settings;
    private readonly TraceNoise noise;
    private readonly Func<double, Vec3> groundAt;

    /// <summary>Fits along strike.</summary>
    /// <param name="dike">Number of the dike.</param>
    /// <param name="tracker">After it followed the margins.</param>
    /// <param name="cells">Its cells, refined.</param>
    /// <param name="frame">Survey frame.</param>
    /// <param name="groundAt">Unit normal of the ground about a place along the sheet.</param>
    /// <param name="settings">Settings.</param>
    public DikeTracer(int dike, MarginTracker tracker, TraceCell[] cells, SurveyFrame frame, Func<double, Vec3> groundAt, ContactSettings settings)
    {
        Dike = dike;
        this.tracker = tracker;
        this.cells = [.. cells.OrderBy(c => c.At.S).ThenBy(c => c.At.T)];
        cells = this.cells;
        this.frame = frame;
        this.settings = settings;
        this.groundAt = groundAt;
        FromS = cells[0].At.S;
        ToS = cells[^1].At.S;
        noise = TraceNoise.Estimate(Apart(), tracker.CellM, tracker.WindowM, settings.EdgeErrorM / 3);
        double step = Math.Clamp(tracker.WindowM / FitsPerWindow, 0.5, 5);
        int count = Math.Max(1, (int)Math.Round((ToS - FromS) / step));
        Stretches = new DikeStretch[count + 1];
        for (int i = 0; i <= count; i++) Stretches[i] = At(FromS + ((ToS - FromS) * i / count));
        Settle();
    }

    /// <summary>Number of the dike.</summary>
    public int Dike { get; }

    /// <summary>First place with a trace.</summary>
    public double FromS { get; }

    /// <summary>Last place with a trace.</summary>
    public double ToS { get; }

    /// <summary>Fits at even steps along strike.</summary>
    public DikeStretch[] Stretches { get; }

    /// <summary>Whether strike and dip are fixed, per stretch.</summary>
    public Constraint[] Fixed { get; private set; } = [];

    /// <summary>True when the whole dike gives only a line.</summary>
    public bool LineOnly { get; private set; }

    /// <summary>Margin polylines; after <see cref="Frame"/>.</summary>
    public IEnumerable<MarginTrace> Traces() =>
        from margin in (Margin[])[Margin.A, Margin.B]
        from line in TraceLines.Of(Dike, margin, cells, tracker.CellM, noise.Noise.Sigma, ChainageAt)
        select line;

    /// <summary>Marks faces on the contacts of this dike.</summary>
    public void MarkMargins(FaceSides sides)
    {
        double tolerance = settings.SurfaceToleranceM ?? Math.Max(0.04, 2 * noise.Noise.Sigma);
        sides.MarkMargins(tracker, cells, s => NormalAt(s), settings.SurfaceAngleDeg, tolerance);
    }

    /// <summary>What there is to say about this dike.</summary>
    public Remark Summary(string stage)
    {
        double share = (double)Fixed.Count(c => c == Constraint.Plane) / Fixed.Length;
        string found = LineOnly
            ? "its traces are too straight to give a dip; contact points at other heights (a step, a gully wall, a borehole) would mend that"
            : Invariant($"strike and dip are fixed on {100 * share:0} % of its length");
        return new Remark(stage, Invariant($"Dike {Dike}: followed over {ToS - FromS:0.0} m, {found}."), LineOnly);
    }

    private Vec3 NormalAt(double s)
    {
        int i = Stretches.Length < 2 ? 0 : (int)Math.Round(Math.Clamp((s - FromS) / (ToS - FromS), 0, 1) * (Stretches.Length - 1));
        SheetAxes axes = tracker.Sheet.At(s);
        return Stretches[i].Chosen is { } fit ? fit.Pole(axes).Normal : axes.Normal;
    }

    // Stretches side by side, each a window long.
    private List<TraceCell[]> Apart()
    {
        int count = Math.Max(1, (int)Math.Floor((ToS - FromS) / tracker.WindowM)), every = Math.Max(1, count / 6);
        var apart = new List<TraceCell[]>();
        for (int i = 0; i < count; i += every)
        {
            double middle = FromS + ((ToS - FromS) * (i + 0.5) / count);
            TraceCell[] near = Near(middle);
            if (near.Length >= 8) apart.Add(near);
        }

        return apart;
    }

    private TraceCell[] Near(double s) => [.. cells.Where(c => Math.Abs(c.At.S - s) <= tracker.WindowM / 2)];

    private DikeStretch At(double s)
    {
        TraceCell[] near = Near(s);
        TraceCell[] a = [.. near.Where(c => c.Margin == Margin.A)], b = [.. near.Where(c => c.Margin == Margin.B)];
        if (a.Length < 4) near = b;
        else if (b.Length < 4) near = a;
        Vec3 ground = groundAt(s);
        StretchFit?[] fits = [StretchFit.Of(a, s, noise, ground), StretchFit.Of(b, s, noise, ground), StretchFit.Of(near, s, noise, ground)];
        int best = -1;
        for (int i = 0; i < fits.Length; i++)
        {
            if (fits[i] is { } f && (best < 0 || f.TiltVariance <= fits[best]!.TiltVariance)) best = i;
        }

        return new DikeStretch(s, fits, best, best >= 0 && Passes(fits[best]!));
    }

    // The gates of a dip: relief against the trace's own error, both in the sheet and out of the ground, and the cone.
    private bool Passes(StretchFit fit)
    {
        double least = settings.ReliefFactor * Math.Sqrt(Math.Pow(settings.EdgeErrorM, 2) + Math.Pow(fit.RmsM / 4, 2));
        return fit.ReliefM >= least && fit.GroundReliefM >= least && Cone(fit) <= settings.LargestConeDeg;
    }

    private double Cone(StretchFit fit)
    {
        (Vec3 n, Symmetric3 covariance) = fit.Pole(tracker.Sheet.At(fit.S));
        return PoleRegions.From(n, covariance, frame.Reference).Cone95Deg;
    }

    // Draws the stretches toward their common dip and decides what is fixed.
    private void Settle()
    {
        LineOnly = 2 * Stretches.Count(s => s.Passes) <= Stretches.Length;
        Fixed = new Constraint[Stretches.Length];
        Array.Fill(Fixed, Constraint.Line);
        if (LineOnly) return;
        int every = Math.Max(1, (int)Math.Round(tracker.WindowM / ((ToS - FromS) / Math.Max(1, Stretches.Length - 1))));
        var apart = new List<StretchFit>();
        for (int i = every / 2; i < Stretches.Length; i += every)
        {
            if (Stretches[i] is { Passes: true, Chosen: { } f }) apart.Add(f);
        }

        TiltPool? pool = TiltPool.Of(apart);
        for (int i = 0; i < Stretches.Length; i++)
        {
            DikeStretch stretch = Stretches[i];
            if (stretch.Best < 0) continue;
            if (pool is { } common) stretch = Stretches[i] = stretch with { Fits = [.. stretch.Fits.Select(f => f is null ? null : common.Steady(f))] };
            if (Cone(stretch.Chosen!) <= settings.LargestConeDeg && (stretch.Passes || pool is not null)) Fixed[i] = Constraint.Plane;
        }
    }
}
