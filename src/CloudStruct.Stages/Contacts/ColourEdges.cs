using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Contacts;

/// <summary>Moves trace cells across the margin to the place where the colour changes: labels wander about it, for they were
/// smoothed, and a shift of both margins biases a width by its double.</summary>
/// <remarks>Around each cell the colours are projected on the direction that separates the two flanks best (Fisher 1936, linear
/// discriminant; flanks within some metres along strike, so that shade and wetness cancel). A step from 1 to 0 is then fitted to
/// the score against signed distance. All places of the step are weighed by their likelihood and a prior about the labels' own
/// place, and the mean is taken: without contrast nothing moves.</remarks>
internal sealed class ColourEdges
{
    private const double ReachM = 0.32;       // of the points that speak for a cell
    private const double FarM = 0.08;         // nearer to the margin a point may be of either rock
    private const double FlankM = 2.5;        // half the stretch over which the flanks' colours are pooled
    private const double PriorM = 0.04;       // how far labels wander
    private const double StepM = 0.01, LargestM = 0.12;
    private const double Alike = 10;          // points that carry the news of one: blur, mottling, one picture for many
    private const double LeastContrast = 1;   // difference of the flanks in standard deviations below which labels stand
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
            // A wall along the contact is all of one rock and at distance 0 give or take its noise: it would draw the step to
            // its far side. Only surfaces that cross the margin tell where the colour changes.
            double facing = points[lo].Normal.Dot(outward), weight = 1 - (facing * facing);
            if (weight > 0.25) near.Add((d.Dot(outward), points[lo].Colour, weight));
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
        int n = near.Count;
        var gain = new double[n + 1];   // sum over the first k points of what it costs less to call them dike than host
        for (int k = 0; k < n; k++)
        {
            double z = Math.Clamp(contrast.Way.Dot(near[k].Colour) - contrast.Zero, -1, 2);
            gain[k + 1] = gain[k] + (near[k].Weight * ((z * z) - ((z - 1) * (z - 1))) / (2 * contrast.Sigma * contrast.Sigma * Alike));
        }

        double best = double.NegativeInfinity;
        var value = new List<(double At, double Log)>();
        int inside = 0;
        for (double at = -LargestM; at <= LargestM + 1e-9; at += StepM)
        {
            while (inside < n && near[inside].D < at) inside++;
            double log = gain[inside] - (at * at / (2 * PriorM * PriorM));
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
}
