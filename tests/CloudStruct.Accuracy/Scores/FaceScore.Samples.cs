using CloudStruct.Accuracy.Deep;

namespace CloudStruct.Accuracy.Scores;

/// <content>The same figures as samples of one outcrop, weighted by what they count, so that outcrops can be drawn anew.</content>
public sealed partial class FaceScore
{
    private readonly int[] insideTotal = new int[3];

    /// <summary>Share of the area found, of these size classes.</summary>
    public IEnumerable<Sample> Found(params int[] classes) => Ratio(classes.Sum(c => foundArea[c]), classes.Sum(c => trueArea[c]));

    /// <summary>Share of the number found.</summary>
    public IEnumerable<Sample> FoundByNumber(params int[] classes) => Ratio(classes.Sum(c => foundCount[c]), classes.Sum(c => trueCount[c]));

    /// <summary>Share of the points of true faces that lie in faces matched to them.</summary>
    public IEnumerable<Sample> CoveredOf(params int[] classes) => Ratio(classes.Sum(c => pointsCovered[c]), classes.Sum(c => pointsTrue[c]));

    /// <summary>Share of the reported area that is right.</summary>
    public IEnumerable<Sample> PrecisionOf() => Ratio(rightArea, reportedArea);

    /// <summary>Share of the reported area off any plane.</summary>
    public IEnumerable<Sample> OffOf() => Ratio(offArea, reportedArea);

    /// <summary>Reported faces per found face.</summary>
    public IEnumerable<Sample> PiecesOf(params int[] classes) => Ratio(classes.Sum(c => pieces[c]), classes.Sum(c => foundCount[c]));

    /// <summary>Share of reported faces that hold a fifth or more of a second one.</summary>
    public IEnumerable<Sample> JoinedOf() => Ratio(joined, reported);

    /// <summary>Attitude errors of a class [deg].</summary>
    public IEnumerable<Sample> Errors(int sizeClass) => error[sizeClass].Select(e => new Sample(e));

    /// <summary>Those of plain least squares on the true points [deg].</summary>
    public IEnumerable<Sample> Floors(int sizeClass) => floor[sizeClass].Select(e => new Sample(e));

    /// <summary>Share of true poles in cone95 of a class.</summary>
    public IEnumerable<Sample> InCone(int sizeClass) => Ratio(inside[sizeClass], judged[sizeClass]);

    /// <summary>Share of true poles in cone95_total.</summary>
    public IEnumerable<Sample> InTotalCone(params int[] classes) => Ratio(classes.Sum(c => insideTotal[c]), classes.Sum(c => judged[c]));

    /// <summary>Errors over what the stated region expects in the median.</summary>
    public IEnumerable<Sample> RealOverStated(int sizeClass) => relative[sizeClass].Select(r => new Sample(r));

    private static IEnumerable<Sample> Ratio(double part, double whole) => whole > 0 ? [new Sample(part / whole, whole)] : [];
}
