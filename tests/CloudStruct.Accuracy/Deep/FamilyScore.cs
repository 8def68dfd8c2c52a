using CloudStruct.Accuracy.Scores;
using CloudStruct.Simulate;

namespace CloudStruct.Accuracy.Deep;

/// <summary>All figures of one family of outcrops, filled scene by scene.</summary>
public sealed class FamilyScore
{
    private static readonly (string Name, double Median, double P95)[] Sizes = [("above 1 m²", 0.12, 0.5), ("0.25 to 1 m²", 0.4, 1.5), ("0.05 to 0.25 m²", 1.1, 4.2)];

    private readonly Figure found = Share("faces of 0.25 m² or more found, by area", 0.97, unit: "m²"), foundNumber = Share("the same, by number", 0.95), foundSmall = Share("faces of 0.05 m² or more found, by area", 0.94, unit: "m²");
    private readonly Figure covered = Share("covered area of true faces", 0.86, unit: "points"), precision = Share("precision by area", 0.95, unit: "m²"), off = Share("reported area off any plane", null, 0.03, "m²");
    private readonly Figure pieces = new("pieces per face", Figure.Mean, 2, null, 1.25), joined = Share("joined faces", null, 0.04);
    private readonly Figure[] medians, p95s, cones, sharpness;
    private readonly Figure iou, contactMedian, contactP95, contactCone, widthMedian, widthP95, widthBias, widthCover, measured, hidden, falseRows, dikesFound, extra, lines;
    private readonly Figure setsFound = Share("orientation sets found", 1), setsInvented = new("sets invented per outcrop", Figure.Mean, 2, null, 0), setCone = Share("true mean pole in the set's cone95", 0.93, 0.97);
    private readonly Figure totalCone = Share("true pole in cone95_total", 0.93, 0.97);
    private readonly bool turned;

    /// <summary>Of one plan.</summary>
    public FamilyScore(Family family)
    {
        Family = family;
        turned = OutcropPlan.ByName(family.Plan).ModelTiltSigmaDeg > 0;
        medians = [.. Sizes.Select(s => new Figure($"attitude error, {s.Name}, median [deg]", Figure.Median, 2, null, s.Median) { Floor = new("", Figure.Median, 2) })];
        p95s = [.. Sizes.Select(s => new Figure($"attitude error, {s.Name}, 95th percentile [deg]", Figure.P95, 2, null, s.P95) { Floor = new("", Figure.P95, 2) })];
        cones = [.. Sizes.Select(s => Share($"true pole in cone95, {s.Name}", 0.93, 0.97))];
        sharpness = [.. Sizes.Select(s => new Figure($"sharpness (stated over real), {s.Name}", Figure.OneOverMedian, 2, 0.8, 1.25))];
        bool pavement = family.Plan == "pavement";
        iou = new("dike IoU, mean of outcrops", Figure.Mean, 3, family.Iou);
        dikesFound = new("dikes found of those there", Figure.Mean, 2, family.Iou is null ? null : 1);
        extra = new("dikes reported beyond those there, per outcrop", Figure.Mean, 2, null, 0);
        contactMedian = new("contact attitude error, median [deg]", Figure.Median, 2, null, family.ContactDeg?.Item1) { Floor = new("", Figure.Median, 2) };
        contactP95 = new("contact attitude error, 95th percentile [deg]", Figure.P95, 2, null, family.ContactDeg?.Item2) { Floor = new("", Figure.P95, 2) };
        contactCone = Share("true normal in the contact's cone95", 0.93, 0.97);
        widthMedian = new("true width error, median", Figure.Median, 4, null, family.Width?.Item1);
        widthP95 = new("true width error, 95th percentile", Figure.P95, 4, null, family.Width?.Item2);
        widthBias = new("true width bias", Figure.Median, 4, -0.01, 0.01);
        widthCover = Share("true width in its interval", 0.93, 0.97);
        measured = Share("measured share of the length that shows both margins", pavement ? null : 0.9, unit: "m");
        hidden = new("stations measured in hidden stretches, per outcrop", Figure.Mean, 2, null, 0);
        falseRows = new("contact rows where there is no dike, per outcrop", Figure.Mean, 2, null, 0);
        lines = Share("contact rows that state only a line", pavement ? 0.95 : null);
    }

    /// <summary>The family.</summary>
    public Family Family { get; }

    /// <summary>Outcrops taken in.</summary>
    public int Scenes { get; private set; }

    /// <summary>Figures that have samples, in the order of the page.</summary>
    public IEnumerable<Figure> Figures
    {
        get
        {
            IEnumerable<Figure> all =
            [
                found, foundNumber, foundSmall, covered, precision, off, pieces, joined, .. medians, .. p95s, .. turned ? [totalCone] : cones, .. turned ? Array.Empty<Figure>() : sharpness,
                dikesFound, extra, iou, contactMedian, contactP95, contactCone, lines, widthMedian, widthP95, widthBias, widthCover, measured, hidden, falseRows, setsFound, setsInvented, setCone,
            ];
            return all.Where(f => f.Count > 0);
        }
    }

    /// <summary>Takes in one outcrop.</summary>
    public void Add(WholeScene s)
    {
        Scenes++;
        AddFaces(s.Faces);
        bool dike = s.Outcrop.Dikes.Length > 0;
        if (!dike) falseRows.Add([new Sample(s.Contacts.Contacts.Length + s.WidthRecord.Stations.Length)]);
        else AddDike(s);
        setsFound.Add(Enumerable.Range(0, s.SetScore.True).Select(i => Sample.Of(i < s.SetScore.Found)));
        setsInvented.Add([new Sample(s.SetScore.Invented)]);
        setCone.Add(s.SetScore.ErrorsDeg.Zip(s.SetScore.ConesDeg).Select(p => Sample.Of(p.First <= p.Second)));
    }

    private void AddDike(WholeScene s)
    {
        WidthScore w = s.Width;
        dikesFound.Add([new Sample(Math.Min(s.Classes.Found, s.Classes.True) / (double)s.Classes.True, s.Classes.True)]);
        extra.Add([new Sample(Math.Max(0, s.Classes.Found - s.Classes.True))]);
        iou.Add([new Sample(double.IsNaN(s.Classes.DikeIou) ? 0 : s.Classes.DikeIou)]);
        contactMedian.Add(w.ContactErrorsDeg.Select(e => new Sample(e)));
        contactP95.Add(w.ContactErrorsDeg.Select(e => new Sample(e)));
        contactMedian.Floor!.Add(s.ContactFloorsDeg.Select(e => new Sample(e)));
        contactP95.Floor!.Add(s.ContactFloorsDeg.Select(e => new Sample(e)));
        contactCone.Add(w.ContactRatios.Select(r => Sample.Of(r <= 1)));
        lines.Add(Enumerable.Range(0, w.Rows.All).Select(i => Sample.Of(i >= w.Rows.Plane)));
        widthMedian.Add(w.WidthErrors.Select(e => new Sample(Math.Abs(e))));
        widthP95.Add(w.WidthErrors.Select(e => new Sample(Math.Abs(e))));
        widthBias.Add(w.WidthErrors.Select(e => new Sample(e)));
        widthCover.Add(w.WidthRatios.Select(r => Sample.Of(Math.Abs(r) <= 1)));
        if (w.ShownM > 0) measured.Add([new Sample(Math.Min(1, w.MeasuredM / w.ShownM), w.ShownM)]);
        hidden.Add([new Sample(w.HiddenMeasured)]);
    }

    private void AddFaces(FaceScore s)
    {
        found.Add(s.Found(0, 1));
        foundNumber.Add(s.FoundByNumber(0, 1));
        foundSmall.Add(s.Found(0, 1, 2));
        covered.Add(s.CoveredOf(0, 1, 2));
        precision.Add(s.PrecisionOf());
        off.Add(s.OffOf());
        pieces.Add(s.PiecesOf(0, 1));
        joined.Add(s.JoinedOf());
        for (int c = 0; c < Sizes.Length; c++)
        {
            medians[c].Add(s.Errors(c));
            p95s[c].Add(s.Errors(c));
            medians[c].Floor!.Add(s.Floors(c));
            p95s[c].Floor!.Add(s.Floors(c));
            cones[c].Add(s.InCone(c));
            sharpness[c].Add(s.RealOverStated(c));
        }

        totalCone.Add(s.InTotalCone(0, 1, 2));
    }

    private static Figure Share(string name, double? least, double? most = null, string unit = "") => new(name, Figure.Mean, 3, least, most) { Unit = unit };
}
