using CloudStruct.Maths.Directions;
using CloudStruct.Records.Comparing;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Stages.Comparing;

/// <summary>Two surveys of one outcrop: do they agree within their stated regions?</summary>
/// <remarks>The common shift and rotation of the second model are found, reported and taken off; what is left is held against the
/// internal regions of both. What both surveys share cancels: the waviness of the rock, edges that are worn, a mistake that the same rock
/// provokes twice. So true regions hold in 0.95 or more, and a share below that convicts them; a share above it does not. Stations and contact rows of one survey share errors, so that their shares are less certain than stated.</remarks>
public static class Repeating
{
    private const double SlackM = 0.3, StationM = 0.5;

    /// <summary>The comparison.</summary>
    /// <exception cref="InputException">The two have no common frame.</exception>
    public static ComparisonRecord Of(MeasuredResults first, MeasuredResults second)
    {
        if (first.Crs != second.Crs)
        {
            throw new InputException(second.Survey, "the two results are in different coordinate systems", Invariant($"'{first.Crs}' and '{second.Crs}'"),
                "Measure both surveys in one system; 'crs' in survey.yaml states it");
        }

        (MeasuredResults moved, Vec3? shift, CommonRotation? rotation) = Aligned.Onto(first, second);
        List<(int A, int B, double DistanceM)> faces = PlanePairs.Of(first.Faces, moved.Faces, SlackM);
        List<(int A, int B, double DistanceM)> contacts = PlanePairs.Of(first.Contacts, moved.Contacts, SlackM);
        ComparedPair[] pairs =
        [
            .. faces.Select(p => Pair("face", first.Faces[p.A], second.Faces[p.B], moved.Faces[p.B], p.DistanceM)),
            .. contacts.Select(p => Pair("contact", first.Contacts[p.A], second.Contacts[p.B], moved.Contacts[p.B], p.DistanceM)),
            .. Widths(first.Widths, moved.Widths),
        ];
        ComparedGroup[] groups = [.. Groups(pairs)];
        int widths = pairs.Count(p => p.Kind == "width");
        return new ComparisonRecord
        {
            Name = "repeat",
            Title = Invariant($"{first.Survey} measured twice"),
            Pairs = pairs,
            Alone =
            [
                ("face", first.Faces.Length - faces.Count, second.Faces.Length - faces.Count),
                ("contact", first.Contacts.Length - contacts.Count, second.Contacts.Length - contacts.Count),
                ("width", first.Widths.Length - widths, second.Widths.Length - widths),
            ],
            Groups = groups,
            Rotation = Differences.InWords(rotation),
            ShiftM = shift,
            Axis = "difference over its stated standard deviation",
            Curves = [.. Curves(pairs)],
            Sentences = [.. Sentences(groups, Differences.InWords(rotation), shift, faces.Count)],
        };
    }

    private static ComparedPair Pair(string kind, MeasuredPlane a, MeasuredPlane b, MeasuredPlane moved, double distance)
    {
        double normalised = Differences.Normalised(a, moved);
        return new ComparedPair
        {
            Kind = kind, Group = a.Group, First = a.Id, Second = b.Id, Place = a.Place, DistanceM = distance, AreaM2 = a.AreaM2,
            AngleDeg = Differences.AngleDeg(a.Normal, b.Normal), RestDeg = Differences.AngleDeg(a.Normal, moved.Normal),
            Normalised = normalised, Within95 = normalised <= Differences.EllipseFactor,
        };
    }

    private static IEnumerable<ComparedPair> Widths(MeasuredWidth[] first, MeasuredWidth[] second)
    {
        var taken = new HashSet<int>();
        foreach (MeasuredWidth a in first)
        {
            int near = -1;
            double distance = StationM;
            for (int j = 0; j < second.Length; j++)
            {
                Vec3 d = second[j].Place - a.Place;
                double level = Math.Sqrt((d.X * d.X) + (d.Y * d.Y));
                if (level < distance && !taken.Contains(j)) (near, distance) = (j, level);
            }

            if (near < 0) continue;
            taken.Add(near);
            MeasuredWidth b = second[near];
            double sa = (a.High95M - a.Low95M) / 3.919928, sb = (b.High95M - b.Low95M) / 3.919928, difference = b.WidthM - a.WidthM;
            double normalised = Math.Abs(difference) / Math.Max(1e-6, Math.Sqrt((sa * sa) + (sb * sb)));
            yield return new ComparedPair
            {
                Kind = "width", Group = a.Id[..a.Id.IndexOf(" station", StringComparison.Ordinal)], First = a.Id, Second = b.Id, Place = a.Place, DistanceM = distance,
                WidthDifferenceM = difference, Normalised = normalised, Within95 = normalised <= 1.959964,
            };
        }
    }

    private static IEnumerable<ComparedGroup> Groups(ComparedPair[] pairs)
    {
        ComparedPair[] faces = [.. pairs.Where(p => p.Kind == "face")];
        return new[]
        {
            Differences.Group("faces above 1 m2", faces.Where(p => p.AreaM2 > 1)),
            Differences.Group("faces of 0.25 to 1 m2", faces.Where(p => p.AreaM2 is > 0.25 and <= 1)),
            Differences.Group("faces up to 0.25 m2", faces.Where(p => p.AreaM2 <= 0.25)),
            Differences.Group("contact rows", pairs.Where(p => p.Kind == "contact")),
            Differences.Group("true widths", pairs.Where(p => p.Kind == "width")),
        }.OfType<ComparedGroup>();
    }

    private static IEnumerable<ShareCurve> Curves(ComparedPair[] pairs)
    {
        foreach ((string kind, string label) in new[] { ("face", "faces"), ("contact", "contact rows"), ("width", "true widths") })
        {
            ComparedPair[] own = [.. pairs.Where(p => p.Kind == kind)];
            if (own.Length >= 5) yield return Differences.Found(Invariant($"{label} ({own.Length})"), own.Select(p => p.Normalised));
        }

        double[] x = [.. Enumerable.Range(0, 101).Select(i => i * 0.05)];
        yield return new ShareCurve("true regions, attitudes", true, x, [.. x.Select(v => 1 - Math.Exp(-v * v / 2))]);
        if (pairs.Count(p => p.Kind == "width") >= 5)
            yield return new ShareCurve("true intervals, widths", true, x, [.. x.Select(v => MathNet.Numerics.SpecialFunctions.Erf(v / Math.Sqrt(2)))]);
    }

    private static IEnumerable<string> Sentences(ComparedGroup[] groups, RotationFound? r, Vec3? shift, int faces)
    {
        if (groups.Length == 0) yield return "Nothing that both surveys measured lies in the same place.";
        if (shift is { } s) yield return Invariant($"The second model lies {s.Length * 100:0.0} cm off the first ({s.X * 100:0.0} east, {s.Y * 100:0.0} north, {s.Z * 100:0.0} up); that was taken off before pairing.");
        if (r is not null)
        {
            yield return Invariant($"It is turned by {r.AzimuthDeg:0.00} deg in azimuth ({r.AzimuthLow95Deg:0.00} to {r.AzimuthHigh95Deg:0.00}, clockwise positive) and tilted by {r.TiltDeg:0.00} deg ({r.TiltLow95Deg:0.00} to {r.TiltHigh95Deg:0.00}); that was taken off before the regions were judged.");
        }
        else
        {
            yield return Invariant($"A common rotation could not be found from {faces} paired faces, so that none was taken off.");
        }

        if (groups.Any(g => g.ShareLow95 > 0.97)) yield return "What both surveys share, such as the waviness of the rock, cancels in their difference: regions that are true may hold more often than 0.95 here, never less.";
        foreach (ComparedGroup g in groups)
        {
            string verdict = g.ShareLow95 > 0.97 ? "wider than two flights need" : g.ShareHigh95 < 0.93 ? "too narrow" : "in keeping with 0.95";
            yield return Invariant($"Of {g.Pairs} {g.Name}, {g.Share95:0.000} ({g.ShareLow95:0.000} to {g.ShareHigh95:0.000}) differ by no more than their 95 % regions allow: {verdict}; real over stated spread {g.Spread:0.00}.");
        }
    }
}
