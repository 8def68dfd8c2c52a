using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Simulate;
using static System.FormattableString;

namespace CloudStruct.Accuracy.Scores;

/// <summary>Found faces against true ones, summed over outcrops.</summary>
/// <remarks>
/// Each reported face is matched to the true face that most of its points carry. It is <i>right</i> when that true face
/// exists and holds at least half of its points, and the normals differ by at most 5 deg. Precision: area of right faces over the
/// area of all reported. A true face is <i>found</i> when the faces matched to it hold at least half of its working points.
/// Covered: share of the working points of true faces that lie in faces matched to them. Pieces: faces matched per found face.
/// Joined: reported faces of which a second true face holds a fifth or more. Attitude error: of the largest face matched to a
/// true face, classed by the true area. Coverage: share of right faces whose true normal lies in cone95_deg, classed by
/// reported area. Sharpness: 1 when the median error is what the stated ellipse expects, above when cones are too wide.
/// Floor: plain least squares on the points that truly belong to the face.
/// </remarks>
public sealed partial class FaceScore
{
    private static readonly (string Name, double From, double To)[] Classes =
        [(">= 1 m2", 1, double.PositiveInfinity), ("0.25-1 m2", 0.25, 1), ("0.05-0.25 m2", 0.05, 0.25)];

    private readonly double[] trueArea = new double[3], foundArea = new double[3], pointsTrue = new double[3], pointsCovered = new double[3];
    private readonly int[] trueCount = new int[3], foundCount = new int[3], inside = new int[3], judged = new int[3], pieces = new int[3];
    private readonly List<double>[] error = [[], [], []], floor = [[], [], []], relative = [[], [], []];
    private readonly List<double> areaRatio = [], pointsRatio = [];
    private double reportedArea, rightArea, offArea;
    private int reported, joined;

    /// <summary>Names of the size classes, by falling size; all figures per class are in this order.</summary>
    public static string[] ClassNames { get; } = [.. Classes.Select(c => c.Name)];

    /// <summary>Share of the area of true faces of 0.25 m² or more that was found.</summary>
    public double RecallByArea => (foundArea[0] + foundArea[1]) / (trueArea[0] + trueArea[1]);

    /// <summary>The same, by number.</summary>
    public double RecallByNumber => (double)(foundCount[0] + foundCount[1]) / (trueCount[0] + trueCount[1]);

    /// <summary>Share of the area of true faces of 0.05 m² or more that was found.</summary>
    public double RecallOfAllByArea => foundArea.Sum() / trueArea.Sum();

    /// <summary>Share of the surface of true faces of 0.05 m² or more that lies in faces matched to them.</summary>
    public double Covered => pointsCovered.Sum() / pointsTrue.Sum();

    /// <summary>Share of the reported area that is right.</summary>
    public double Precision => rightArea / reportedArea;

    /// <summary>Share of the reported area that lies on no plane.</summary>
    public double OffPlane => offArea / reportedArea;

    /// <summary>Reported faces per found face of 0.25 m² or more.</summary>
    public double PiecesPerFace => (double)(pieces[0] + pieces[1]) / Math.Max(1, foundCount[0] + foundCount[1]);

    /// <summary>Share of reported faces that hold a fifth or more of a second true face.</summary>
    public double Joined => (double)joined / Math.Max(1, reported);

    /// <summary>Reported faces.</summary>
    public int Reported => reported;

    /// <summary>Median over faces in one piece of reported over true area.</summary>
    public double AreaRatio => Quantile(areaRatio, 0.5);

    /// <summary>The same by working points: true areas are sums over cells that count no more than whole, so that they lose a little by
    /// chance; points do not.</summary>
    public double PointsRatio => Quantile(pointsRatio, 0.5);

    /// <summary>Median attitude error of found faces of 0.25 m² or more [deg].</summary>
    public double MedianErrorDeg => Quantile([.. error[0], .. error[1]], 0.5);

    /// <summary>Share of right faces whose true normal lies in the cone, of all sizes.</summary>
    public double Coverage => (double)inside.Sum() / judged.Sum();

    /// <summary>Quantile of the attitude error of a class, and of its floor [deg].</summary>
    public (double Ours, double Floor) ErrorDeg(int sizeClass, double quantile) =>
        (Quantile(error[sizeClass], quantile), Quantile(floor[sizeClass], quantile));

    /// <summary>Share of right faces of a class whose true normal lies in the cone, and how many were judged.</summary>
    public (double Share, int Count) CoverageOf(int sizeClass) => ((double)inside[sizeClass] / Math.Max(1, judged[sizeClass]), judged[sizeClass]);

    /// <summary>Stated over real error of a class.</summary>
    public double Sharpness(int sizeClass) => 1 / Quantile(relative[sizeClass], 0.5);

    /// <summary>Adds one outcrop.</summary>
    public void Add(SimulatedOutcrop outcrop, WorkingCloud cloud, FaceSet found, int[] nearest)
    {
        int[] truth = [.. nearest.Select(j => j < 0 ? 0 : outcrop.TrueFace[j])];
        var votes = new Dictionary<(int Found, int True), int>();
        var own = new int[outcrop.Faces.Length + 1];
        for (int i = 0; i < truth.Length; i++)
        {
            own[truth[i]]++;
            if (found.FaceOfPoint[i] == 0) continue;
            votes[(found.FaceOfPoint[i], truth[i])] = votes.GetValueOrDefault((found.FaceOfPoint[i], truth[i])) + 1;
        }

        var match = new (int True, int Votes, int Second)[found.Faces.Length + 1];
        foreach (((int f, int t), int n) in votes.OrderBy(v => v.Key))
        {
            if (n > match[f].Votes) match[f] = (t, n, t == 0 ? 0 : match[f].True != 0 ? match[f].Votes : 0);
            else if (t != 0) match[f].Second = Math.Max(match[f].Second, n);
        }

        var covered = new int[own.Length];
        var largest = new Face?[own.Length];
        var count = new int[own.Length];
        for (int f = 0; f < found.Faces.Length; f++) Judge(found.Faces[f], outcrop, match[f + 1], covered, largest, count);
        AddTrue(outcrop, own, covered, largest, count);
        AddFloor(outcrop, cloud, truth);
    }

    /// <summary>Prints the table.</summary>
    public void Print(string title)
    {
        Console.WriteLine(
            Invariant($"{title}: {reported} reported; recall >= 0.25 m2 {RecallByArea:F3} by area {RecallByNumber:F3} by number, >= 0.05 m2 {RecallOfAllByArea:F3}, covered {Covered:F3}; ") +
            Invariant($"precision {Precision:F3}, off any plane {OffPlane:F3}, pieces {PiecesPerFace:F2}, joined {Joined:F3}, area ratio {AreaRatio:F3}, points ratio {PointsRatio:F3}"));
        Console.WriteLine("  class          true  recall(area) recall(number) covered pieces |  error med   p95  floor med   p95 | coverage      n sharpness");
        for (int c = 0; c < 3; c++)
        {
            Console.WriteLine(Invariant(
                $"  {Classes[c].Name,-13} {trueCount[c],5} {foundArea[c] / trueArea[c],13:F3} {(double)foundCount[c] / trueCount[c],14:F3} {pointsCovered[c] / pointsTrue[c],7:F3} {(double)pieces[c] / Math.Max(1, foundCount[c]),6:F2} |") + Invariant(
                $" {Quantile(error[c], 0.5),10:F3} {Quantile(error[c], 0.95),5:F2} {Quantile(floor[c], 0.5),10:F3} {Quantile(floor[c], 0.95),5:F2} | {(double)inside[c] / Math.Max(1, judged[c]),8:F3} {judged[c],6} {Sharpness(c),9:F2}"));
        }
    }

    private static int ClassOf(double area) => area >= 1 ? 0 : area >= 0.25 ? 1 : area >= 0.05 ? 2 : -1;

    private static double Angle(Vec3 a, Vec3 b) => Math.Atan2(a.Cross(b).Length, Math.Abs(a.Dot(b))) * 180 / Math.PI;

    private static double Quantile(List<double> values, double q) => Quantiles.Of(values, q);

    private void Judge(Face f, SimulatedOutcrop outcrop, (int True, int Votes, int Second) m, int[] covered, Face?[] largest, int[] count)
    {
        reported++;
        reportedArea += f.AreaM2;
        if (m.True == 0)
        {
            offArea += f.AreaM2;
            return;
        }

        if (m.Second >= 0.2 * f.Points) joined++;
        covered[m.True] += m.Votes;
        count[m.True]++;
        if (largest[m.True] is not { } other || f.AreaM2 > other.AreaM2) largest[m.True] = f;
        double off = Angle(f.Normal, outcrop.Faces[m.True - 1].Normal);
        if (m.Votes < 0.5 * f.Points || off > 5) return;
        rightArea += f.AreaM2;
        int c = ClassOf(f.AreaM2);
        if (c < 0) return;
        judged[c]++;
        if (off <= f.Region.Cone95Deg) inside[c]++;
        if (off <= f.Region.Cone95TotalDeg) insideTotal[c]++;
        double s1 = f.Region.Ellipse95MajorDeg, s2 = f.Region.Ellipse95MinorDeg;
        relative[c].Add(off / f.Region.Cone95Deg * PoleRegions.Cone95(s1, s2) / PoleRegions.Circle(s1, s2, 0.5));
    }

    private void AddTrue(SimulatedOutcrop outcrop, int[] own, int[] covered, Face?[] largest, int[] count)
    {
        foreach (SimulatedFace t in outcrop.Faces)
        {
            int c = ClassOf(t.AreaM2);
            if (c < 0) continue;
            trueCount[c]++;
            trueArea[c] += t.AreaM2;
            pointsTrue[c] += own[t.Id];
            pointsCovered[c] += covered[t.Id];
            if (covered[t.Id] < 0.5 * own[t.Id] || covered[t.Id] == 0) continue;
            foundCount[c]++;
            foundArea[c] += t.AreaM2;
            pieces[c] += count[t.Id];
            error[c].Add(Angle(largest[t.Id]!.Normal, t.Normal));
            if (count[t.Id] != 1) continue;
            areaRatio.Add(largest[t.Id]!.AreaM2 / t.AreaM2);
            pointsRatio.Add((double)largest[t.Id]!.Points / own[t.Id]);
        }
    }

    private void AddFloor(SimulatedOutcrop outcrop, WorkingCloud cloud, int[] truth)
    {
        var sums = new Moments[outcrop.Faces.Length + 1];
        for (int f = 0; f < outcrop.Faces.Length; f++) sums[f + 1] = new Moments(outcrop.Faces[f].Middle - cloud.Frame.Origin);
        for (int i = 0; i < truth.Length; i++)
        {
            if (truth[i] != 0) sums[truth[i]].Add(cloud.X[i], cloud.Y[i], cloud.Z[i]);
        }

        foreach (SimulatedFace t in outcrop.Faces)
        {
            int c = ClassOf(t.AreaM2);
            if (c >= 0 && sums[t.Id].Weight >= 6) floor[c].Add(Angle(PlaneFit.From(sums[t.Id]).Normal, t.Normal));
        }
    }
}
