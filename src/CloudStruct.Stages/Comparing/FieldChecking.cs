using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Comparing;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using MathNet.Numerics.Statistics;
using static System.FormattableString;

namespace CloudStruct.Stages.Comparing;

/// <summary>The model against compass readings on the rock.</summary>
/// <remarks>A reading is paired with the nearest face, or contact row, of its kind, by place alone: pairing by attitude would make any
/// model look right. A pair that differs by more than <see cref="OtherFaceDeg"/> is taken for another face and is listed, but counts in no statistic.</remarks>
public static class FieldChecking
{
    /// <summary>A compass on an uneven face does not err by so much (common practice: 2 to 5 deg).</summary>
    public const double OtherFaceDeg = 25;

    private const double Degree = Math.PI / 180;
    private const int Redrawn = 400, FewestForMeans = 4;
    private const ulong Seed = 20260101;

    /// <summary>The comparison.</summary>
    /// <param name="model">Results.</param>
    /// <param name="readings">Readings in map coordinates; only those to check with are used.</param>
    /// <param name="within">How far from a face or contact a reading may lie, beside its own stated error [m].</param>
    /// <exception cref="InputException">A reading counts from another north and nothing ties the two.</exception>
    public static ComparisonRecord Of(MeasuredResults model, FieldReading[] readings, double within)
    {
        var pairs = new List<ComparedPair>();
        var normals = new List<(Vec3 Model, Vec3 Read, double Sigma)>();
        var alone = new Dictionary<string, int> { ["face"] = 0, ["contact"] = 0 };
        foreach (FieldReading reading in readings)
        {
            if (reading.Use != ReadingUse.Check) continue;
            Vec3 normal = reading.NormalInGrid(model.North == North.Model ? null : model.ConvergenceDeg) ?? throw new InputException(
                reading.Id, "a reading counts from true or magnetic north, and the results from another north that nothing ties to it", Invariant($"results from {model.North.ToString().ToLowerInvariant()} north, no convergence"),
                "State the coordinate system of the survey (crs in survey.yaml) and measure again, or give grid azimuths");
            string kind = reading.Kind == ReadingKind.Face ? "face" : "contact";
            (MeasuredPlane? near, double distance) = Nearest(reading.Kind == ReadingKind.Face ? model.Faces : model.Contacts, reading, within);
            if (near is null)
            {
                alone[kind]++;
                continue;
            }

            double angle = Differences.AngleDeg(near.Normal, normal), normalised = angle * Differences.EllipseFactor / Math.Max(0.01, near.ConeTotalDeg);
            bool counts = angle <= OtherFaceDeg;
            pairs.Add(new ComparedPair
            {
                Kind = kind, Group = near.Group, First = near.Id, Second = reading.Id, Place = near.Place, DistanceM = distance, AreaM2 = near.AreaM2,
                AngleDeg = angle, RestDeg = angle, Normalised = normalised, Within95 = normalised <= Differences.EllipseFactor, Counts = counts,
            });
            if (counts) normals.Add((near.Normal, normal, near.ConeTotalDeg * Degree / Differences.EllipseFactor));
        }

        // A compass scatters by some degrees, whatever the cone of the model: readings count alike.
        CommonRotation? rotation = CommonRotation.Of([.. normals.Select(n => n.Model)], [.. normals.Select(n => n.Read)], [.. normals.Select(n => Math.Max(n.Sigma, 2 * Degree))]);
        Vec3 back = rotation is null ? default : -rotation.Vector;
        int next = 0;
        for (int i = 0; i < pairs.Count; i++)
        {
            if (pairs[i].Counts) pairs[i] = pairs[i] with { RestDeg = Differences.AngleDeg(normals[next].Model, CommonRotation.Turn(normals[next++].Read, back)) };
        }

        ComparedGroup[] groups = [.. new[] { Differences.Group("faces", pairs.Where(p => p.Kind == "face")), Differences.Group("contact rows", pairs.Where(p => p.Kind == "contact")) }.OfType<ComparedGroup>()];
        ComparedMean[] means = [.. Means(pairs, normals)];
        (double Value, double Low, double High)? compass = Compass(normals);
        RotationFound? turn = Differences.InWords(rotation);
        return new ComparisonRecord
        {
            Name = "fieldcheck",
            Title = Invariant($"{model.Survey}: model against compass"),
            Pairs = [.. pairs],
            Alone = [("face", 0, alone["face"]), ("contact", 0, alone["contact"])],
            Groups = groups,
            Means = means,
            Rotation = turn,
            Axis = "angle between model and compass (deg)",
            Curves = [.. Curves(pairs, normals, compass)],
            Sentences = [.. Sentences(pairs, alone, within, turn, compass, means)],
        };
    }

    private static (MeasuredPlane? Plane, double DistanceM) Nearest(MeasuredPlane[] planes, FieldReading reading, double within)
    {
        MeasuredPlane? best = null;
        double nearest = Math.Sqrt((within * within) + (reading.SigmaM * reading.SigmaM));
        foreach (MeasuredPlane p in planes)
        {
            double d = Distance(p, reading.Place);
            if (d < nearest || (d == nearest && best is not null && p.AreaM2 > best.AreaM2)) (best, nearest) = (p, d);
        }

        return (best, nearest);
    }

    /// <summary>Distance from the rectangle of a plane's extent along strike and dip; in plan where a reading has no height.</summary>
    private static double Distance(MeasuredPlane p, Vec3 place)
    {
        Vec3 d = place - p.Place;
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(p.Normal);
        if (double.IsNaN(place.Z))
        {
            // Height unknown: the point of the plane that is nearest in plan.
            double across = (d.X * down.X) + (d.Y * down.Y), level = Math.Sqrt((down.X * down.X) + (down.Y * down.Y));
            double reach = 0.5 * p.HeightM * level, s = (d.X * along.X) + (d.Y * along.Y);
            return Math.Sqrt(Square(Beyond(level > 1e-9 ? across / level : 0, reach)) + Square(Beyond(s, 0.5 * p.LengthM)));
        }

        return Math.Sqrt(Square(Beyond(d.Dot(along), 0.5 * p.LengthM)) + Square(Beyond(d.Dot(down), 0.5 * p.HeightM)) + Square(d.Dot(p.Normal)));
    }

    private static double Beyond(double at, double half) => Math.Max(0, Math.Abs(at) - half);

    private static double Square(double v) => v * v;

    /// <summary>Scatter of the compass in one direction [deg] that makes the median difference what model and compass together predict.</summary>
    private static (double Value, double Low, double High)? Compass(List<(Vec3 Model, Vec3 Read, double Sigma)> normals)
    {
        if (normals.Count < 8) return null;
        (double Angle, double Sigma)[] all = [.. normals.Select(n => (Differences.AngleDeg(n.Model, n.Read), n.Sigma / Degree))];
        double value = One(all);
        // Whole pairs drawn anew; a fixed seed, so that the same input gives the same table.
        var dice = new Draws(Seed, 1, 0);
        var drawn = new double[Redrawn];
        var sample = new (double, double)[all.Length];
        for (int k = 0; k < Redrawn; k++)
        {
            for (int i = 0; i < sample.Length; i++) sample[i] = all[dice.NextBelow(all.Length)];
            drawn[k] = One(sample);
        }

        Array.Sort(drawn);
        return (value, drawn[(int)(0.025 * Redrawn)], drawn[(int)(0.975 * Redrawn)]);

        static double One((double Angle, double Sigma)[] pairs)
        {
            double low = 0, high = OtherFaceDeg;
            for (int i = 0; i < 40; i++)
            {
                double middle = (low + high) / 2;
                double below = Statistics.Median(pairs.Select(p => p.Angle / Math.Sqrt((p.Sigma * p.Sigma) + (middle * middle) + 1e-12)));
                if (below > 1.177410) low = middle;
                else high = middle;
            }

            return (low + high) / 2;
        }
    }

    private static IEnumerable<ComparedMean> Means(List<ComparedPair> pairs, List<(Vec3 Model, Vec3 Read, double Sigma)> normals)
    {
        ComparedPair[] counted = [.. pairs.Where(p => p.Counts)];
        foreach (IGrouping<string, int> group in Enumerable.Range(0, counted.Length).Where(i => counted[i].Group.Length > 0).GroupBy(i => counted[i].Group).OrderBy(g => g.Key, StringComparer.Ordinal))
        {
            int[] own = [.. group];
            if (own.Length < FewestForMeans) continue;
            FisherMean a = FisherMean.OfAxes([.. own.Select(i => normals[i].Model)]), b = FisherMean.OfAxes([.. own.Select(i => normals[i].Read)]);
            if (!(a.K * a.R > 0) || !(b.K * b.R > 0) || double.IsInfinity(a.K) || double.IsInfinity(b.K)) continue;
            CommonMeanTest test = CommonMeanTest.Of(a.Mean, 1 / (a.K * a.R), a.N, b.Mean, 1 / (b.K * b.R), b.N);
            yield return new ComparedMean(group.Key, own.Length, test.AngleDeg, test.CriticalDeg, test.P);
        }
    }

    private static IEnumerable<ShareCurve> Curves(List<ComparedPair> pairs, List<(Vec3 Model, Vec3 Read, double Sigma)> normals, (double Value, double Low, double High)? compass)
    {
        foreach ((string kind, string label) in new[] { ("face", "faces"), ("contact", "contact rows") })
        {
            ComparedPair[] own = [.. pairs.Where(p => p.Kind == kind && p.Counts)];
            if (own.Length > 0) yield return Differences.Found(Invariant($"{label} ({own.Length})"), own.Select(p => p.AngleDeg));
        }

        if (normals.Count == 0) yield break;
        double most = Math.Max(5, pairs.Where(p => p.Counts).Max(p => p.AngleDeg));
        double[] x = [.. Enumerable.Range(0, 121).Select(i => i * most / 120)];
        yield return Expected("the model's cones alone", 0);
        if (compass is { } c) yield return Expected(Invariant($"cones and a compass of ±{c.Value:0.0} deg"), c.Value);

        ShareCurve Expected(string label, double compassDeg) => new(
            label, true, x, [.. x.Select(v => normals.Average(n => 1 - Math.Exp(-v * v / (2 * (Square(n.Sigma / Degree) + (compassDeg * compassDeg) + 1e-9)))))]);
    }

    private static IEnumerable<string> Sentences(
        List<ComparedPair> pairs, Dictionary<string, int> alone, double within, RotationFound? turn, (double Value, double Low, double High)? compass, ComparedMean[] means)
    {
        int counted = pairs.Count(p => p.Counts), others = pairs.Count - counted, lost = alone.Values.Sum();
        yield return Invariant($"{counted} of {pairs.Count + lost} readings pair with a face or contact within {within:0.##} m; {lost} lie farther from any, and {others} differ by more than {OtherFaceDeg:0} deg and are taken for another face.");
        if (counted == 0) yield break;
        yield return Invariant($"Median difference {Statistics.Median(pairs.Where(p => p.Counts).Select(p => p.AngleDeg)):0.0} deg; {pairs.Where(p => p.Counts).Average(p => p.Within95 ? 1.0 : 0):0.00} lie within the model's 95 % cones, which know nothing of the compass.");
        if (compass is { } c) yield return Invariant($"The cones and a compass that scatters by {c.Value:0.0} deg ({c.Low:0.0} to {c.High:0.0}) in each direction predict this median; 2 to 3 deg are usual on uneven rock (common practice).");
        if (turn is not null)
        {
            bool biased = turn.AzimuthLow95Deg > 0 || turn.AzimuthHigh95Deg < 0;
            yield return Invariant($"The readings are turned against the model by {turn.AzimuthDeg:+0.0;-0.0} deg in azimuth ({turn.AzimuthLow95Deg:+0.0;-0.0} to {turn.AzimuthHigh95Deg:+0.0;-0.0}, clockwise positive) and tilted by {turn.TiltDeg:0.0} deg ({turn.TiltLow95Deg:0.0} to {turn.TiltHigh95Deg:0.0}).")
                + (biased ? " A wrong declination, a wrong north of the readings, iron near the compass or a model turned as a whole would show like this." : " No bias in azimuth shows.");
        }
        else
        {
            yield return "Too few readings, or readings on planes too much alike, to find a common rotation.";
        }

        foreach (ComparedMean m in means.Where(m => m.P < 0.05))
            yield return Invariant($"{m.Group}: the means of model and compass differ by {m.AngleDeg:0.0} deg, more than chance allows ({m.CriticalDeg:0.0} deg; {m.Pairs} pairs, Watson's test, p = {m.P:0.000}).");
    }
}
