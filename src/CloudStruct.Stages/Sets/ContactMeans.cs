using CloudStruct.Maths.Directions;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>Mean attitude of each margin of each dike, from the windows whose dip is known.</summary>
internal static class ContactMeans
{
    // Of a two-dimensional normal law 95 % lie within 2.4477 standard deviations.
    private const double Cone95Sigmas = 2.4477;

    /// <summary>Margins with at least two independent windows.</summary>
    /// <remarks>Windows overlap: they are worth no more than the length that they cover over the length of one. The variance of
    /// a window is its own error and how windows differ along strike, both.</remarks>
    public static List<MeanToCompare> Of(ContactsRecord contacts)
    {
        var means = new List<MeanToCompare>();
        foreach (var margin in contacts.Contacts
            .Where(c => c.Constraint == Constraint.Plane && c.Evidence != Evidence.Prior && c.Normal is not null && c.Region is not null)
            .GroupBy(c => (c.Dike, c.Margin)).OrderBy(g => g.Key.Dike).ThenBy(g => g.Key.Margin))
        {
            Contact[] windows = [.. margin];
            double[] sigma = [.. windows.Select(c => Math.Max(0.05, c.Region!.Cone95Deg) * Math.PI / 180 / Cone95Sigmas)];
            double[] weights = [.. sigma.Select(s => 1 / ((s * s) + (0.02 * 0.02)))];
            Vec3[] normals = [.. windows.Select(c => c.Normal!.Value)];
            OrientationTensor t = OrientationTensor.Of(normals, weights);
            double covered = windows.Sum(c => c.ChainageToM - c.ChainageFromM), window = windows.Max(c => c.WindowM);
            double n = Math.Min(t.NEffective, window > 0 ? covered / window : 1);
            if (!(n >= 2)) continue;
            double scatter = (1 - t.S1) / 2 * n / (n - 1), own = windows.Select((_, i) => weights[i] * sigma[i] * sigma[i]).Sum() / weights.Sum();
            means.Add(new MeanToCompare(
                Invariant($"dike {margin.Key.Dike} margin {margin.Key.Margin}"), "contact", "", t.MeanAxis, (scatter + own) / n, n));
        }

        return means;
    }
}
