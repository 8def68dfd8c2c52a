using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;

namespace CloudStruct.Accuracy.Scores;

/// <summary>Sets of one domain held against the true mean poles.</summary>
/// <param name="True">True sets that enough faces show.</param>
/// <param name="Found">Of those, sets found within <see cref="NearDeg"/>.</param>
/// <param name="Invented">Sets that lie near no true one, or second ones near one.</param>
/// <param name="ErrorsDeg">Angle of each found mean from its true pole [deg].</param>
/// <param name="ConesDeg">Stated cone of each, in the same order [deg].</param>
public sealed record SetScore(int True, int Found, int Invented, double[] ErrorsDeg, double[] ConesDeg)
{
    /// <summary>Farther than this a set is another set [deg].</summary>
    public const double NearDeg = 15;

    /// <summary>Means that lie inside their cone.</summary>
    public int Covered => ErrorsDeg.Zip(ConesDeg).Count(p => p.First <= p.Second);

    /// <summary>Matches nearest first; each true pole once.</summary>
    /// <param name="sets">Found sets of the domain.</param>
    /// <param name="poles">True mean poles.</param>
    /// <param name="shown">Per pole: whether enough faces show it. One that is found although few do is neither a miss nor invented.</param>
    public static SetScore Of(OrientationSet[] sets, Vec3[] poles, bool[] shown)
    {
        var pairs = new List<(double Deg, int Set, int Pole)>();
        for (int s = 0; s < sets.Length; s++)
        {
            for (int p = 0; p < poles.Length; p++)
            {
                double deg = Math.Acos(Math.Min(1, Math.Abs(sets[s].Normal.Dot(poles[p])))) * 180 / Math.PI;
                if (deg <= NearDeg) pairs.Add((deg, s, p));
            }
        }

        var usedSets = new HashSet<int>();
        var usedPoles = new HashSet<int>();
        List<double> errors = [], cones = [];
        foreach ((double deg, int s, int p) in pairs.OrderBy(p => p.Deg))
        {
            if (usedSets.Contains(s) || usedPoles.Contains(p)) continue;
            usedSets.Add(s);
            usedPoles.Add(p);
            errors.Add(deg);
            cones.Add(sets[s].Cone95Deg);
        }

        return new SetScore(
            shown.Count(x => x), usedPoles.Count(p => shown[p]), sets.Length - usedSets.Count, [.. errors], [.. cones]);
    }

    /// <summary>Both together.</summary>
    public static SetScore operator +(SetScore a, SetScore b) => new(
        a.True + b.True, a.Found + b.Found, a.Invented + b.Invented, [.. a.ErrorsDeg, .. b.ErrorsDeg], [.. a.ConesDeg, .. b.ConesDeg]);

    /// <summary>Nothing yet.</summary>
    public static SetScore None { get; } = new(0, 0, 0, [], []);
}
