using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;
using CloudStruct.Simulate;

namespace CloudStruct.Accuracy.Scores;

/// <summary>Contacts and widths of one outcrop against its truth.</summary>
public sealed class WidthScore
{
    /// <summary>Signed relative errors of true width at measured stations.</summary>
    public List<double> WidthErrors { get; } = [];

    /// <summary>Errors over the half-length of their interval: within ±1 where the truth lies inside.</summary>
    public List<double> WidthRatios { get; } = [];

    /// <summary>Angles between contact rows with a plane and the truth: the plane nearest to the true margin over the stretch of
    /// the row and the heights that its trace spans, at least a third of its length [deg]. A contact's attitude over a stretch is
    /// that of its surface there; the mean of the normals along the trace, the other definition that was weighed, changes with the
    /// places where the view happens to cross a wave, and no tool could know it better than by a degree.</summary>
    public List<double> ContactErrorsDeg { get; } = [];

    /// <summary>Those over their cones.</summary>
    public List<double> ContactRatios { get; } = [];

    /// <summary>Angles between contact rows and the dike's mean plane over their cones: of sense where the dike does not bend.</summary>
    public List<double> PlaneRatios { get; } = [];

    /// <summary>Angles between contact rows and the mean of the true margin's normals at the trace points of the row [deg].</summary>
    public List<double> NormalErrorsDeg { get; } = [];

    /// <summary>Those over their cones.</summary>
    public List<double> NormalRatios { get; } = [];

    /// <summary>Signed relative errors of the apparent width where only that is known.</summary>
    public List<double> ApparentErrors { get; } = [];

    /// <summary>Distances of trace vertices from the true margin, positive out of the dike [m].</summary>
    public List<double> TraceOffsetsM { get; } = [];

    /// <summary>Stations by status.</summary>
    public Dictionary<StationStatus, int> Stations { get; } = [];

    /// <summary>Measured stations in stretches that are truly hidden.</summary>
    public int HiddenMeasured { get; private set; }

    /// <summary>Measured stations away from them [m].</summary>
    public double MeasuredM { get; private set; }

    /// <summary>Length over which both margins truly show [m].</summary>
    public double ShownM { get; private set; }

    /// <summary>Contact rows, and those with a plane.</summary>
    public (int All, int Plane) Rows { get; private set; }

    /// <summary>Takes in one outcrop.</summary>
    public void Add(SimulatedOutcrop truth, ContactsRecord contacts, WidthRecord width)
    {
        Vec3 origin = truth.Origin;
        int[] which = [.. contacts.Dikes.Select(d => Match(truth, d))];
        foreach (SimulatedDike d in truth.Dikes)
        {
            ShownM += d.Extent.ToM - d.Extent.FromM - d.Hidden.Sum(h => Math.Min(h.ToM, d.Extent.ToM) - Math.Max(h.FromM, d.Extent.FromM));
        }

        foreach (MarginTrace t in contacts.Traces)
        {
            int at = Array.FindIndex(contacts.Dikes, d => d.Dike == t.Dike);
            if (which[at] < 0) continue;
            SimulatedDike dike = truth.Dikes[which[at]];
            bool onA = (t.Margin == Margin.A) == Same(contacts.Dikes[at], dike);
            TraceOffsetsM.AddRange(t.Points.Select(p => onA ? -dike.SignedFromA(p + origin) : dike.SignedFromB(p + origin)));
        }

        foreach (Contact c in contacts.Contacts)
        {
            Rows = (Rows.All + 1, Rows.Plane + (c.Constraint == Constraint.Plane ? 1 : 0));
            int at = Array.FindIndex(contacts.Dikes, d => d.Dike == c.Dike);
            if (c.Normal is not { } normal || which[at] < 0) continue;
            SimulatedDike dike = truth.Dikes[which[at]];
            int side = (c.Margin == Margin.A) == Same(contacts.Dikes[at], dike) ? 0 : 1;
            Vec3 mean = default;
            var own = new List<Vec3>();
            foreach (MarginTrace t in contacts.Traces.Where(t => t.Dike == c.Dike && t.Margin == c.Margin))
            {
                for (int i = 0; i < t.Points.Length; i++)
                {
                    if (t.ChainageM[i] < c.ChainageFromM || t.ChainageM[i] > c.ChainageToM) continue;
                    mean += dike.MarginNormalAt(side, t.Points[i] + origin);
                    own.Add(t.Points[i]);
                }
            }

            if (mean.Length < 1e-9 || PatchPlane(dike, side, [.. own.Select(p => p + origin)]) is not { } patch) continue;
            double error = Math.Acos(Math.Min(1, Math.Abs(patch.Dot(normal)))) * 180 / Math.PI, cone = c.Region!.Cone95Deg;
            ContactErrorsDeg.Add(error);
            ContactRatios.Add(error / cone);
            error = Math.Acos(Math.Min(1, Math.Abs(mean.Unit().Dot(normal)))) * 180 / Math.PI;
            NormalErrorsDeg.Add(error);
            NormalRatios.Add(error / cone);
            PlaneRatios.Add(Math.Acos(Math.Min(1, Math.Abs(dike.Normal.Dot(normal)))) * 180 / Math.PI / c.Region!.Cone95Deg);
        }

        foreach (Station s in width.Stations)
        {
            Stations[s.Status] = Stations.GetValueOrDefault(s.Status) + 1;
            int at = Array.FindIndex(contacts.Dikes, d => d.Dike == s.Dike);
            if (s.Status is not (StationStatus.Measured or StationStatus.Unconstrained) || which[at] < 0) continue;
            SimulatedDike dike = truth.Dikes[which[at]];
            Vec3 place = ((s.AtA!.Value + s.AtB!.Value) / 2) + origin;
            if (s.Status == StationStatus.Unconstrained)
            {
                double level = dike.WidthAt(place) / Math.Sqrt(1 - Math.Pow(dike.NormalAt(place).Z, 2));
                ApparentErrors.Add((s.ApparentWidthM!.Value - level) / level);
                continue;
            }

            if (dike.IsHidden(dike.ChainageAt(place))) HiddenMeasured++;
            else MeasuredM += width.StationM;
            double w = dike.WidthAt(place), error = s.TrueWidthM!.Value - w;
            WidthErrors.Add(error / w);
            WidthRatios.Add(error / ((s.TrueWidthHigh95M!.Value - s.TrueWidthLow95M!.Value) / 2));
        }
    }

    /// <summary>Least squares through the true margin on an even grid over the rectangle that a trace spans, a twentieth cut off at
    /// the top and the bottom: its unit normal.</summary>
    /// <param name="dike">The dike.</param>
    /// <param name="side">Margin A (0) or B (1).</param>
    /// <param name="trace">Map coordinates; null is returned for fewer than three points.</param>
    internal static Vec3? PatchPlane(SimulatedDike dike, int side, Vec3[] trace)
    {
        if (trace.Length < 3) return null;
        const int columns = 17, rows = 9;
        Vec3 up = dike.Normal.Cross(dike.Along), middle = trace.Aggregate(default(Vec3), (sum, p) => sum + p) / trace.Length;
        double[] s = [.. trace.Select(p => (p - middle).Dot(dike.Along)).Order()], v = [.. trace.Select(p => (p - middle).Dot(up)).Order()];
        (double low, double high) = (v[v.Length / 20], v[^(1 + (v.Length / 20))]);
        double more = ((s[^1] - s[0]) / 3) - (high - low);   // over a smaller height the waves would be all of the dip
        if (more > 0) (low, high) = (low - (more / 2), high + (more / 2));
        var sums = new Moments(default);
        for (int i = 0; i < columns * rows; i++)
        {
            Vec3 p = middle + (dike.Along * (s[0] + ((s[^1] - s[0]) * (i % columns) / (columns - 1)))) + (up * (low + ((high - low) * (i / columns) / (rows - 1))));
            for (int round = 0; round < 3; round++) p -= dike.MarginNormalAt(side, p) * (side == 0 ? dike.SignedFromA(p) : dike.SignedFromB(p));
            sums.Add(p.X - middle.X, p.Y - middle.Y, p.Z - middle.Z);
        }

        return PlaneFit.From(sums).Normal;
    }

    internal static bool Same(DikeFrame frame, SimulatedDike dike) => frame.Normal[frame.Normal.Length / 2].Dot(dike.Normal) > 0;

    internal static int Match(SimulatedOutcrop truth, DikeFrame frame)
    {
        int best = -1;
        double least = double.PositiveInfinity;
        for (int k = 0; k < truth.Dikes.Length; k++)
        {
            // All along: dikes that cross are equally near to either middle.
            double off = frame.CentreLine.Average(p => Math.Abs(truth.Dikes[k].SignedFromA(p + truth.Origin) + truth.Dikes[k].SignedFromB(p + truth.Origin)) / 2);
            if (off < least) (best, least) = (k, off);
        }

        return least < 3 ? best : -1;
    }
}
