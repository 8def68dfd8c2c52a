using CloudStruct.Accuracy.Scores;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Thin;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Single faces that stand apart: are the regions of their poles right, for each size, for strips, for each law of noise?</summary>
/// <remarks>--points: faces in a scene (300 when left out). Fifteen seeds judge 1,500 faces a class.</remarks>
public sealed class PlanesStudy : IStudy
{
    private static readonly string[] Classes = [">= 1 m2", "0.25-1 m2", "0.05-0.25 m2"];

    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        var tally = new SortedDictionary<string, List<(double Off, double Cone, double Expected, bool InEllipse)>>(StringComparer.Ordinal);
        int[] made = new int[3], found = new int[3], pieces = new int[3];
        foreach (ulong seed in options.Seeds) One(seed, options.Points ?? 300, tally, made, found, pieces);
        for (int c = 0; c < 3; c++)
            Console.WriteLine(Invariant($"{Classes[c],-13} {made[c]} made, {found[c] / (double)made[c]:F3} found, {pieces[c] / (double)Math.Max(1, found[c]):F3} pieces"));
        Console.WriteLine("                              n  error med   p95 | in cone in ellipse sharpness");
        foreach ((string name, var of) in tally) Console.WriteLine(Line(name, of));
    }

    /// <summary>Faces of one scene of which at least half was found, and how many of their cones hold the true pole.</summary>
    public static (int Inside, int Judged) Covered(ulong seed, int count)
    {
        var tally = new SortedDictionary<string, List<(double Off, double Cone, double Expected, bool InEllipse)>>(StringComparer.Ordinal);
        One(seed, count, tally, new int[3], new int[3], new int[3]);
        var all = Enumerable.Range(0, 3).SelectMany(c => tally[$"{c} {Classes[c]}"]).ToList();
        return (all.Count(x => x.Off <= x.Cone), all.Count);
    }

    private static string Line(string name, List<(double Off, double Cone, double Expected, bool InEllipse)> of)
    {
        double[] off = [.. of.Select(x => x.Off).Order()], ratio = [.. of.Select(x => x.Off / x.Expected).Order()];
        return Invariant(
            $"{name,-26} {of.Count,5} {off[off.Length / 2],10:F3} {off[(int)(0.95 * off.Length)],5:F2} | {of.Count(x => x.Off <= x.Cone) / (double)of.Count,7:F3} {of.Count(x => x.InEllipse) / (double)of.Count,10:F3} {1 / ratio[ratio.Length / 2],9:F2}");
    }

    private static void One(
        ulong seed,
        int count,
        SortedDictionary<string, List<(double Off, double Cone, double Expected, bool InEllipse)>> tally,
        int[] made,
        int[] found,
        int[] pieces)
    {
        var scene = new SinglePlanes(seed, count);
        StageContext context = StageContext.Plain(seed, Environment.ProcessorCount);
        WorkingCloud cloud = new ThinStage().Run(scene, new ThinSettings(), context);
        DescribedCloud described = new DescribeStage().Run(cloud, new DescribeSettings(), context);
        FaceSet faces = new FacesStage().Run(described, new FaceSettings(), context);
        Console.WriteLine(Invariant(
            $"{seed}: {scene.Shape}, {scene.SharedM * 1000:F1} mm over {scene.LengthM * 100:F0} cm, white {scene.WhiteM * 1000:F1} mm, edges {scene.EdgeRadiusM * 1000:F0} mm; {cloud.Count} points at {cloud.SpacingM * 100:F1} cm; told {faces.NoiseM * 1000:F1} mm over {faces.NoiseLengthM * 100:F0} cm"));
        var seen = new int[scene.Faces.Length];
        foreach (Face f in faces.Faces)
        {
            int t = scene.Nearest(f.Middle + cloud.Frame.Origin);
            (_, Records.Frame.Vec3 normal, double area, double aspect) = scene.Faces[t];
            int c = t % 3 == 0 ? 2 : t % 3 == 1 ? 1 : 0;
            if (seen[t]++ == 0) found[c]++;
            pieces[c]++;
            if (f.AreaM2 < 0.5 * area) continue;   // a splinter: judged by number only
            double off = Math.Atan2(f.Normal.Cross(normal).Length, Math.Abs(f.Normal.Dot(normal))) * 180 / Math.PI;
            double s1 = f.Region.Ellipse95MajorDeg, s2 = f.Region.Ellipse95MinorDeg;
            double expected = f.Region.Cone95Deg * PoleRegions.Circle(s1, s2, 0.5) / PoleRegions.Cone95(s1, s2);
            Records.Frame.Vec3 d = (normal.Dot(f.Normal) < 0 ? -normal : normal) - f.Normal, major = f.Region.MajorAxis, minor = f.Normal.Cross(major);
            double a = d.Dot(major) * 180 / Math.PI / s1, b = d.Dot(minor) * 180 / Math.PI / s2;
            var entry = (off, f.Region.Cone95Deg, expected, (a * a) + (b * b) <= 1);
            foreach (string key in new[] { $"{c} {Classes[c]}", $"{c} {Classes[c]}, {scene.Shape}", aspect > 3.5 ? $"{c} {Classes[c]}, strip" : "", scene.LengthM > 0.12 ? $"{c} {Classes[c]}, long noise" : "" })
            {
                if (key.Length == 0) continue;
                if (!tally.TryGetValue(key, out var list)) tally[key] = list = [];
                list.Add(entry);
            }
        }

        for (int t = 0; t < scene.Faces.Length; t++) made[t % 3 == 0 ? 2 : t % 3 == 1 ? 1 : 0]++;
    }
}
