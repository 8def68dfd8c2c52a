using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Contacts;

/// <summary>One dike from clean trace cells to attitudes along strike.</summary>
internal sealed partial class DikeTracer
{
    private const int FitsPerWindow = 12;

    // Half of the stretch whose cells take part in one attitude, in windows: waves of a margin are told from its mean plane only
    // over several of them. With 0.5 the dip erred by 1.4 times as much; with 2 a bend is taken for waves.
    private const double ReachWindows = 1.25;
    private const double HeightShare = 1.0 / 3;   // least height of a patch, in windows: over less the waves would be all of the dip
    private const double OutlierSigmas = 3.5;
    private const int LargestSet = 240;   // cells: the cost grows with the cube
    private readonly MarginTracker tracker;
    private readonly TraceCell[] cells, steady;   // those of the traces, and those that attitudes rest on
    private readonly double scaleM;
    private readonly SurveyFrame frame;
    private readonly ContactSettings settings;
    private readonly TraceLaws laws;
    private readonly TraceNoise traceNoise;   // for the traces and the widths
    private readonly Func<double, Vec3> groundAt;
    private readonly PriorPoles priors;

    /// <summary>Fits along strike.</summary>
    /// <param name="dike">Number of the dike.</param>
    /// <param name="tracker">After it followed the margins.</param>
    /// <param name="cells">Its cells, refined.</param>
    /// <param name="frame">Survey frame.</param>
    /// <param name="groundAt">Unit normal of the ground about a place along the sheet.</param>
    /// <param name="priors">Compass readings that take part.</param>
    /// <param name="settings">Settings.</param>
    public DikeTracer(int dike, MarginTracker tracker, TraceCell[] cells, SurveyFrame frame, Func<double, Vec3> groundAt, PriorPoles priors, ContactSettings settings)
        : this(dike, tracker, cells, frame, groundAt, priors, settings, null)
    {
    }

    // Law of the cells' scatter when strays are out already; null: strays are still among them.
    private DikeTracer(int dike, MarginTracker tracker, TraceCell[] cells, SurveyFrame frame, Func<double, Vec3> groundAt, PriorPoles priors, ContactSettings settings, TraceLaws? rough)
    {
        Dike = dike;
        this.tracker = tracker;
        this.cells = [.. cells.OrderBy(c => c.At.S).ThenBy(c => c.At.T)];
        cells = steady = this.cells;
        this.frame = frame;
        this.settings = settings;
        this.groundAt = groundAt;
        this.priors = priors;
        (FromS, ToS) = (cells[0].At.S, cells[^1].At.S);
        double least = settings.EdgeErrorM / 3;
        if (rough is null)
        {
            rough = TraceLaws.Estimate(Apart(steady), tracker.CellM, tracker.WindowM, least);
            this.cells = cells = WithoutOutliers(rough.Best);
            (steady, scaleM) = SteadyCells.Of(cells, tracker.CellM);
            laws = rough;
            traceNoise = rough.Best;
        }
        else
        {
            (steady, scaleM) = SteadyCells.Of(cells, tracker.CellM);
            laws = TraceLaws.Estimate(Apart(steady), tracker.CellM, tracker.WindowM, least);

            // One law for all cells, stretches astray among them, and short waves. With that of the steady cells width intervals held
            // the truth in 0.88 on the plan tilted (seeds 1-7), with that of the traces before strays were out they were twice as long.
            traceNoise = TraceLaws.Estimate(Apart([.. cells.Select(c => c with { Surface = false })]), tracker.CellM, tracker.WindowM, least, true).Best;
        }

        double step = Math.Clamp(tracker.WindowM / FitsPerWindow, 0.5, 5);
        int count = Math.Max(1, (int)Math.Round((ToS - FromS) / step));
        Stretches = new DikeStretch[count + 1];
        int sets = Math.Max(1, (int)Math.Ceiling((ToS - FromS) / tracker.WindowM));   // one model for stretches half a window to either side
        var models = new (TraceCell[] Cells, MarginModel? Model)[sets];
        for (int i = 0; i < sets; i++)
        {
            double middle = FromS + ((ToS - FromS) * (i + 0.5) / sets);
            TraceCell[] own = Thinned(Steady(middle, ReachWindows * tracker.WindowM));
            models[i] = (own, own.Length >= 8 ? MarginModel.Of(own, middle, laws) : null);
        }

        for (int i = 0; i <= count; i++)
        {
            double s = FromS + ((ToS - FromS) * i / count);
            Stretches[i] = At(s, models[Math.Min(sets - 1, i * sets / (count + 1))].Model);
        }

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
        from line in TraceLines.Of(Dike, margin, cells.Where(c => !c.Surface), tracker.CellM, traceNoise.Noise.Sigma, ChainageAt)
        select line;

    /// <summary>Marks faces on the contacts of this dike.</summary>
    /// <returns>Those faces as cells of their margins.</returns>
    public TraceCell[] MarkMargins(FaceSides sides)
    {
        double tolerance = settings.SurfaceToleranceM ?? Math.Max(0.04, 2 * scaleM);
        return sides.MarkMargins(Dike, tracker, cells, s => NormalAt(s), settings.SurfaceAngleDeg, tolerance);
    }

    /// <summary>The same dike with cells on exposed contact surfaces besides those of the traces.</summary>
    public DikeTracer With(TraceCell[] surface) => new(Dike, tracker, [.. cells, .. surface.Where(c => c.At.S >= FromS && c.At.S <= ToS)], frame, groundAt, priors, settings, laws);

    /// <summary>What there is to say about this dike.</summary>
    /// <param name="stage">Name of the stage.</param>
    /// <param name="ends">What lies beyond its ends.</param>
    public Remark Summary(string stage, string ends)
    {
        double share = (double)Fixed.Count(c => c == Constraint.Plane) / Fixed.Length;
        const string mend = "contact points at other heights (a step, a gully wall, a borehole) or a compass reading of the contact in field/readings.csv with use prior would mend that";
        string found = LineOnly ? "its traces are too straight to give a dip; " + mend
            : share < 0.995 ? Invariant($"strike and dip are fixed on {100 * share:0} % of its length; elsewhere the traces are too straight; {mend}")
            : "strike and dip are fixed on all of its length";
        string priorsUsed = priors.Ids.Any() ? Invariant($" Compass readings that take part in the rows of evidence prior: {string.Join(", ", priors.Ids)}.") : "";
        return new Remark(stage, Invariant($"Dike {Dike}: followed over {ToS - FromS:0.0} m, {found}.{ends}{priorsUsed}"), LineOnly);
    }

    /// <summary>What lies beyond its ends, in words.</summary>
    public string Ends(WorkingCloud cloud, ClassifiedCloud classes) => DikeEnds.Said(cloud, classes, tracker, FromS, ToS);

    private Vec3 NormalAt(double s)
    {
        int i = Stretches.Length < 2 ? 0 : (int)Math.Round(Math.Clamp((s - FromS) / (ToS - FromS), 0, 1) * (Stretches.Length - 1));
        SheetAxes axes = tracker.Sheet.At(s);
        return Stretches[i].Chosen is { } fit ? fit.Pole(axes).Normal : axes.Normal;
    }

    // Stretches side by side, three windows long at the most, spread over the length.
    private List<TraceCell[]> Apart(TraceCell[] from)
    {
        double length = Math.Min(ToS - FromS, 2 * ReachWindows * tracker.WindowM);
        int count = Math.Max(1, (int)Math.Floor((ToS - FromS) / Math.Max(length, 1e-9))), every = (count + 2) / 3;
        var apart = new List<TraceCell[]>();
        for (int i = 0; i < count; i += every)
        {
            double middle = FromS + ((ToS - FromS) * (i + 0.5) / count);
            TraceCell[] near = [.. from.Where(c => Math.Abs(c.At.S - middle) <= length / 2)];
            if (near.Length >= 8) apart.Add(near);
        }

        return apart;
    }

    // Cells that their neighbours do not believe: corners of islands that touch the margin, soil that hides a foot of it.
    private TraceCell[] WithoutOutliers(TraceNoise law)
    {
        int count = Math.Max(1, (int)Math.Round((ToS - FromS) / tracker.WindowM));
        double length = (ToS - FromS) / count;
        var keep = new List<TraceCell>();
        for (int i = 0; i < count; i++)
        {
            double from = FromS + (i * length), to = i == count - 1 ? double.PositiveInfinity : from + length;
            TraceCell[] own = [.. cells.Where(c => c.At.S >= from && c.At.S < to)];
            double[]? off = own.Length is >= 12 and <= 2 * LargestSet ? MarginModel.Solve(own, from + (length / 2), law)?.LeaveOneOut() : null;
            keep.AddRange(off is null ? own : own.Where((_, k) => Math.Abs(off[k]) <= OutlierSigmas));
        }

        return keep.Count < 8 ? cells : [.. keep];
    }

    private TraceCell[] Near(double s, double reach) => [.. cells.Where(c => Math.Abs(c.At.S - s) <= reach)];

    private TraceCell[] Steady(double s, double reach) => [.. steady.Where(c => Math.Abs(c.At.S - s) <= reach)];

    private static TraceCell[] Thinned(TraceCell[] near)
    {
        int k = (near.Length + LargestSet - 1) / LargestSet;
        return k <= 1 ? near : [.. near.Where((_, i) => i / 2 % k == 0)];
    }

    private DikeStretch At(double s, MarginModel? model)
    {
        if (model is null) return new DikeStretch(s, [null, null, null], false, false);
        double half = tracker.WindowM / 2, from = Math.Max(FromS, s - half), to = Math.Min(ToS, s + half);
        TraceCell[] near = Near(s, half), wide = Near(s, 2 * half);
        TraceCell[] a = [.. near.Where(c => c.Margin == Margin.A)], b = [.. near.Where(c => c.Margin == Margin.B)];
        if (near.Length < 4) return new DikeStretch(s, [null, null, null], false, false);
        Vec3 ground = groundAt(s);
        StretchFit? Fit(Margin? margin, TraceCell[] own)
        {
            if (own.Length < 4) return null;
            (double fromS, double toS, double low, double high) = margin is null ? Rectangle(near, from, to) : Rectangle(own, from, to);
            return StretchFit.Of(s, model.Patch(margin, fromS, toS, low, high), own, ground);
        }

        StretchFit?[] fits = [Fit(Margin.A, a), Fit(Margin.B, b), Fit(a.Length < 4 ? Margin.B : b.Length < 4 ? Margin.A : null, near)];
        bool passes = fits[2] is { } middle && Passes(StretchFit.Of(s, new PatchSlopes(middle.Tilt, middle.TiltVariance, middle.Slope, middle.SlopeVariance, middle.SlopeTilt), wide, ground));
        return new DikeStretch(s, fits, wide.Any(c => c.Margin == Margin.A) && wide.Any(c => c.Margin == Margin.B), passes);
    }

    // Where a plane is to lie nearest to the margin: as far along strike and up dip as its trace reaches in the stretch (a twentieth
    // of the cells cut off above and below), at least a third of that length high.
    private (double FromS, double ToS, double Low, double High) Rectangle(TraceCell[] cells, double from, double to)
    {
        TraceCell[] trace = [.. cells.Where(c => !c.Surface)];
        if (trace.Length < 3) trace = cells;
        else if (trace.Max(c => c.At.S) - trace.Min(c => c.At.S) is var reach && reach > HeightShare * tracker.WindowM) (from, to) = (trace.Min(c => c.At.S), trace.Max(c => c.At.S));
        double[] heights = [.. trace.Select(c => c.At.T).Order()];
        double low = heights[heights.Length / 20], high = heights[^(1 + (heights.Length / 20))], more = (HeightShare * (to - from)) - (high - low);
        return more > 0 ? (from, to, low - (more / 2), high + (more / 2)) : (from, to, low, high);
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

    // Decides what is fixed. Drawing the stretches toward their common dip was tried: two or three stretches do not show how much
    // a dip varies, and cones on a long dike then held the truth in 0.69 (least variation half a degree) to 0.81 (one and a half)
    // of the rows, without it in 0.90, at the same errors.
    private void Settle()
    {
        LineOnly = 2 * Stretches.Count(s => s.Passes) <= Stretches.Length;
        Fixed = [.. Stretches.Select(s => !LineOnly && s is { Passes: true, Chosen: { } fit } && Cone(fit) <= settings.LargestConeDeg ? Constraint.Plane : Constraint.Line)];
    }
}
