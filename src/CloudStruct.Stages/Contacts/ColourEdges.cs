using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Contacts;

/// <summary>Moves trace cells across the margin to the place where the colour changes: labels wander about it, for they were
/// smoothed, and a shift of both margins biases a width by its double.</summary>
/// <remarks>Around each cell the colours are projected on the direction that separates the two flanks best (Fisher 1936, linear
/// discriminant; flanks within some metres along strike, so that shade and wetness cancel). A blurred step from 1 to 0 (an error
/// function) is then fitted to the mean score in slices of a centimetre. All places of the step are weighed by their likelihood
/// and a prior about the labels' own place, and the mean is taken: without contrast nothing moves.</remarks>
internal sealed class ColourEdges
{
    private const double ReachM = 0.32;       // of the points that speak for a cell
    private const double FarM = 0.08;         // nearer to the margin a point may be of either rock
    private const double FlankM = 2.5;        // half the stretch over which the flanks' colours are pooled
    private const double PriorM = 0.04;       // how far labels wander
    private const double StepM = 0.01, LargestM = 0.12;
    private const double Alike = 10;          // points that carry the news of one: blur, mottling, one picture for many

    // A wall along the contact is all of one rock and at distance 0 give or take its noise: it says little of where colour changes.
    // On stepped ground both margins come out about 0.5 cm too far at this weight, at full weight and without such points alike; why
    // is not known (docs/methods-contacts.md).
    private const double LeastWeight = 0.1;
    private const double BlurM = 0.012;
    private const double LeastContrast = 1;   // difference of the flanks in standard deviations below which labels stand
    private const double BlurStepM = 0.0025;
    private const int BlurHalf = 20;          // steps of the table to either side: four blurs
    private static readonly double[] Blurred = MakeBlurred();
    private readonly MarginTracker tracker;
    private readonly List<(double S, Vec3 Place, Vec3 Colour, Vec3 Normal)> points = [];

    /// <summary>Gathers the rock about the margins. Needs a cloud with colour.</summary>
    public ColourEdges(DescribedCloud described, ClassifiedCloud classes, MarginTracker tracker)
    {
        this.tracker = tracker;
        WorkingCloud cloud = described.Cloud;
        for (int i = 0; i < cloud.Count; i++)
        {
            if (classes.Class[i] is not ((byte)RockClass.Host or (byte)RockClass.Dike)) continue;
            Vec3 p = cloud.Place(i);
            SheetPoint at = tracker.Sheet.Of(p);
            if (at.S < tracker.Cells[0].At.S - 1 || at.S > tracker.Cells[^1].At.S + 1) continue;
            if (Math.Abs(tracker.Guess.Distance(Margin.A, at)) > 2 * ReachM && Math.Abs(tracker.Guess.Distance(Margin.B, at)) > 2 * ReachM) continue;
            var colour = new Vec3(described.LStar[i] / 100.0, described.LogRedGreen[i], described.LogBlueGreen[i]);
            if (double.IsFinite(colour.X + colour.Y + colour.Z)) points.Add((at.S, p, colour, described.Normal(i)));
        }

        points.Sort((a, b) => a.S.CompareTo(b.S));
    }

    /// <summary>The cells, moved; in the same order.</summary>
    public TraceCell[] Refine(TraceCell[] cells)
    {
        var near = new List<(double D, Vec3 Colour, double Weight)>[cells.Length];
        for (int i = 0; i < cells.Length; i++) near[i] = Near(cells[i]);
        var moved = new TraceCell[cells.Length];
        foreach (Margin margin in (Margin[])[Margin.A, Margin.B])
        {
            int[] own = [.. Enumerable.Range(0, cells.Length).Where(i => cells[i].Margin == margin)];
            foreach (int i in own)
            {
                TraceCell c = cells[i];
                double shift = Contrast(own.Where(k => Math.Abs(cells[k].At.S - c.At.S) <= FlankM).Select(k => near[k])) is { } contrast ? Shift(near[i], contrast) : 0;
                Vec3 place = c.Place + (Outward(c) * shift);
                moved[i] = c with { Place = place, At = tracker.Sheet.Of(place) };
            }
        }

        return moved;
    }

    private Vec3 Outward(TraceCell c) => tracker.Sheet.At(c.At.S).Normal * (c.Margin == Margin.A ? -1 : 1);

    private List<(double D, Vec3 Colour, double Weight)> Near(TraceCell c)
    {
        var near = new List<(double D, Vec3 Colour, double Weight)>();
        Vec3 outward = Outward(c);
        int lo = 0, hi = points.Count;
        while (lo < hi)
        {
            int mid = (lo + hi) / 2;
            if (points[mid].S < c.At.S - ReachM) lo = mid + 1;
            else hi = mid;
        }

        for (; lo < points.Count && points[lo].S <= c.At.S + ReachM; lo++)
        {
            Vec3 d = points[lo].Place - c.Place;
            if (d.Dot(d) > ReachM * ReachM) continue;
            double facing = points[lo].Normal.Dot(outward);
            near.Add((d.Dot(outward), points[lo].Colour, Math.Max(LeastWeight, 1 - (facing * facing))));
        }

        near.Sort((a, b) => a.D.CompareTo(b.D));
        return near;
    }

    // Direction w with w·x = 1 on the mean dike colour and 0 on the mean host colour, and the scatter of that score.
    private static (Vec3 Way, double Zero, double Sigma)? Contrast(IEnumerable<List<(double D, Vec3 Colour, double Weight)>> cells)
    {
        Moments inside = new(default), outside = new(default);
        foreach (List<(double D, Vec3 Colour, double Weight)> cell in cells)
        {
            foreach ((double d, Vec3 c, double w) in cell)
            {
                if (d < -FarM) inside.Add(c.X, c.Y, c.Z, w);
                else if (d > FarM) outside.Add(c.X, c.Y, c.Z, w);
            }
        }

        if (inside.Weight < 30 || outside.Weight < 30) return null;
        Eigen3 e = ((inside.Covariance * 0.5) + (outside.Covariance * 0.5)).Eigen();
        Vec3 difference = inside.Centroid - outside.Centroid, way = default;
        double floor = (1e-4 * e.L1) + 1e-12;
        foreach ((double l, Vec3 v) in (ReadOnlySpan<(double, Vec3)>)[(e.L1, e.V1), (e.L2, e.V2), (e.L3, e.V3)]) way += v * (v.Dot(difference) / (l + floor));
        double squared = way.Dot(difference);   // Mahalanobis distance of the flanks, squared
        if (!(squared >= LeastContrast * LeastContrast)) return null;
        way /= squared;
        return (way, way.Dot(outside.Centroid), 1 / Math.Sqrt(squared));
    }

    private static double Shift(List<(double D, Vec3 Colour, double Weight)> near, (Vec3 Way, double Zero, double Sigma) contrast)
    {
        if (near.Count < 12) return 0;
        int slices = (int)Math.Round(2 * ReachM / StepM);
        double[] weight = new double[slices], score = new double[slices];
        foreach ((double d, Vec3 colour, double w) in near)
        {
            int at = Math.Clamp((int)Math.Floor((d + ReachM) / StepM), 0, slices - 1);
            weight[at] += w;
            score[at] += w * Math.Clamp(contrast.Way.Dot(colour) - contrast.Zero, -1, 2);
        }

        // No slice counts more than the usual one: walls are thick with points.
        double[] filled = [.. weight.Where(w => w > 0).Order()];
        double usual = filled[filled.Length / 2];
        double best = double.NegativeInfinity;
        var value = new List<(double At, double Log)>();
        for (double at = -LargestM; at <= LargestM + 1e-9; at += StepM / 2)
        {
            double log = -at * at / (2 * PriorM * PriorM);
            for (int k = 0; k < slices; k++)
            {
                if (weight[k] == 0) continue;
                double off = (score[k] / weight[k]) - Blurred[Math.Clamp((int)Math.Round((at - ((k + 0.5) * StepM) + ReachM) / BlurStepM) + BlurHalf, 0, 2 * BlurHalf)];
                log -= Math.Min(weight[k], usual) * off * off / (2 * contrast.Sigma * contrast.Sigma * Alike);
            }

            value.Add((at, log));
            best = Math.Max(best, log);
        }

        double sum = 0, moment = 0;
        foreach ((double at, double log) in value)
        {
            double w = Math.Exp(log - best);
            sum += w;
            moment += w * at;
        }

        return moment / sum;
    }

    // The blurred step, 1 inside: its value by the distance from the step inward.
    private static double[] MakeBlurred()
    {
        var table = new double[(2 * BlurHalf) + 1];
        for (int i = 0; i < table.Length; i++) table[i] = 0.5 * MathNet.Numerics.SpecialFunctions.Erfc(-(i - BlurHalf) * BlurStepM / (BlurM * Math.Sqrt(2)));
        return table;
    }
}
