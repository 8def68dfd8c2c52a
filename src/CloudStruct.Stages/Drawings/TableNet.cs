using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>A stereonet of attitudes that came from a table, with the statistics of each group.</summary>
public static class TableNet
{
    private const int FewestForContours = 10, FewestForMean = 3;

    /// <summary>The statistics of one group of axes.</summary>
    /// <param name="Group">Its name; "all" without groups.</param>
    /// <param name="Count">Attitudes.</param>
    /// <param name="Mean">Attitude square to the mean axis of the orientation tensor.</param>
    /// <param name="Cone95Deg">95 % cone of Fisher's mean of the axes turned to one side [deg]; NaN below three.</param>
    /// <param name="Kappa">Fisher's (N - 1)/(N - R).</param>
    /// <param name="S1">Largest eigenvalue of the tensor, the three summing to 1.</param>
    /// <param name="S2">Middle one.</param>
    /// <param name="S3">Smallest one.</param>
    /// <param name="Shape">Woodcock's K: ln(S1/S2)/ln(S2/S3).</param>
    /// <param name="Strength">Woodcock's C: ln(S1/S3).</param>
    public sealed record GroupStatistics(string Group, int Count, Attitude Mean, double Cone95Deg, double Kappa, double S1, double S2, double S3, double Shape, double Strength);

    /// <summary>Draws and counts.</summary>
    /// <param name="rows">Attitudes with their groups and areas (0 for none).</param>
    /// <param name="name">File stem.</param>
    /// <param name="north">What the azimuths count from, in words: "true north".</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Stops the contours.</param>
    public static (NetDrawing Net, GroupStatistics[] Statistics) Of((Attitude Attitude, string Group, double AreaM2)[] rows, string name, string north, int threads, CancellationToken stop)
    {
        Vec3[] normals = [.. rows.Select(r => r.Attitude.UpwardNormal())];
        string[] groups = [.. rows.Select(r => r.Group).Where(g => g.Length > 0).Distinct().Order(StringComparer.Ordinal)];
        GroupStatistics[] statistics =
        [
            .. groups.Select(g => Of(g, [.. Enumerable.Range(0, rows.Length).Where(i => rows[i].Group == g).Select(i => normals[i])])),
            Of("all", normals),
        ];
        var curves = new List<NetCurve>();
        foreach (GroupStatistics s in statistics.Where(s => groups.Length == 0 || s.Group != "all"))
        {
            if (s.Count < FewestForMean || !(s.Cone95Deg < 60)) continue;
            string group = groups.Length == 0 ? "" : s.Group;
            Vec3 mean = s.Mean.UpwardNormal();
            curves.Add(new NetCurve("great_circle", group, 0, NetCurves.GreatCircle(mean)));
            foreach (Point2[] ring in NetCurves.SmallCircle(mean, s.Cone95Deg)) curves.Add(new NetCurve("cone", group, 0, ring));
        }

        double[] levels = [];
        SmoothDensity density = SmoothDensity.ForDrawing(rows.Length);
        if (rows.Length >= FewestForContours)
        {
            NetContours contours = NetContours.Of(normals, density, threads, stop);
            levels = contours.Levels();
            foreach (double level in levels) curves.AddRange(contours.Curves(level).Select(c => new NetCurve("contour", "", level, c)));
        }

        var net = new NetDrawing
        {
            Name = name,
            Title = Invariant($"Poles of {Words.Count(rows.Length, "plane", "planes")}"),
            Poles = [.. rows.Select((r, i) => new NetPole(EqualAreaNet.OfAxis(normals[i]), r.AreaM2, r.Group, 0))],
            Curves = [.. curves],
            Groups = groups,
            Sentence = Sentence(statistics, groups.Length, levels, density, north),
        };
        return (net, statistics);
    }

    private static GroupStatistics Of(string group, Vec3[] normals)
    {
        OrientationTensor tensor = OrientationTensor.Of(normals);
        FisherMean fisher = FisherMean.OfAxes(normals);
        (double shape, double strength) = tensor.Woodcock;
        bool enough = normals.Length >= FewestForMean;
        return new GroupStatistics(
            group, normals.Length, Attitude.FromNormal(tensor.MeanAxis), enough ? fisher.Cone95Deg : double.NaN, enough ? fisher.K : double.NaN, tensor.S1, tensor.S2, tensor.S3, shape, strength);
    }

    private static string Sentence(GroupStatistics[] statistics, int groups, double[] levels, SmoothDensity density, string north)
    {
        GroupStatistics all = statistics[^1];
        var text = new List<string> { Invariant($"Equal area, lower hemisphere; {Words.Count(all.Count, "plane", "planes")}, each counted once, azimuths from {north}.") };
        foreach (GroupStatistics s in groups == 0 ? [all] : statistics[..^1])
        {
            string who = groups == 0 ? "Mean plane" : s.Group + ": mean plane";
            text.Add(s.Cone95Deg < 60
                ? Invariant($"{who} {s.Mean.StrikeDeg:000}/{s.Mean.DipDeg:00} (strike/dip) ±{s.Cone95Deg:0.0} deg (Fisher's 95 % cone, κ = {s.Kappa:0.0}, n = {s.Count}).")
                : Invariant($"{who} not stated: {(s.Count < FewestForMean ? "too few planes" : "the poles do not cluster")} (n = {s.Count})."));
        }

        text.Add(Invariant($"Eigenvalues {all.S1:0.000}, {all.S2:0.000}, {all.S3:0.000}; Woodcock (1977) K = {all.Shape:0.00}, C = {all.Strength:0.00}."));
        if (levels.Length > 0)
            text.Add(Invariant($"Contours: exponential kernel after Vollmer (1995), k = {density.K:0.0}, at {Words.List([.. levels.Select(l => Invariant($"{l:0}"))])} standard deviations above uniform."));
        return string.Join(" ", text);
    }
}
