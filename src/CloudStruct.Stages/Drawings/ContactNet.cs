using CloudStruct.Maths.Directions;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Stereonet of the contacts: poles where strike and dip are fixed, directions of the trace where only those are.</summary>
internal static class ContactNet
{
    // More cones than this hide each other; then only those of the means are drawn.
    private const int MostCones = 12;

    /// <summary>The net, or nothing when there is no contact.</summary>
    public static IEnumerable<NetDrawing> Of(Findings input)
    {
        Contact[] contacts = input.Contacts.Contacts;
        if (contacts.Length == 0) yield break;
        SurveyFrame frame = input.Described.Cloud.Frame;
        double turn = frame.TurnDeg;
        int planes = contacts.Count(c => c.Normal is not null), lines = contacts.Length - planes;
        bool cones = planes <= MostCones;
        var poles = new List<NetPole>();
        var curves = new List<NetCurve>();
        var groups = new List<string>();
        foreach (Contact c in contacts)
        {
            string group = Invariant($"dike {c.Dike} margin {c.Margin}") + (c.Normal is null ? ", trace" : "");
            if (!groups.Contains(group)) groups.Add(group);
            poles.Add(new NetPole(EqualAreaNet.OfAxis(c.Normal ?? Trace(c, turn), turn), 0, group, 0));
            if (cones && c is { Normal: { } n, Region: { } r }) AddCone(curves, n, r.Cone95Deg, turn, group);
        }

        foreach (DikeSummary d in input.Width.Dikes)
        {
            if (d is not { Normal: { } n }) continue;
            string group = Invariant($"dike {d.Dike} mean");
            groups.Add(group);
            poles.Add(new NetPole(EqualAreaNet.OfAxis(n, turn), 0, group, 0));
            curves.Add(new NetCurve("great_circle", group, 0, NetCurves.GreatCircle(n, turn)));
            if (d.Region is { } r) AddCone(curves, n, r.Cone95Deg, turn, group);
        }

        yield return new NetDrawing
        {
            Name = "net-contacts",
            Title = "Contacts of the " + (input.Contacts.Dikes.Length == 1 ? "dike" : "dikes"),
            Poles = [.. poles],
            Curves = [.. curves],
            Groups = [.. groups],
            Sentence = Sentence(frame, planes, lines, cones, curves.Exists(c => c.Kind == "great_circle")),
            HasNorth = frame.North != North.Model,
        };
    }

    private static Vec3 Trace(Contact c, double turn) => new TrendPlunge(c.LineTrendDeg - turn, c.LinePlungeDeg).ToVector();

    private static void AddCone(List<NetCurve> curves, Vec3 normal, double coneDeg, double turn, string group)
    {
        // A cone of half the sphere or more says that nothing is known; there is no ring to draw.
        if (!(coneDeg < 89)) return;
        foreach (Point2[] ring in NetCurves.SmallCircle(normal, coneDeg, turn)) curves.Add(new NetCurve("cone", group, 0, ring));
    }

    private static string Sentence(SurveyFrame frame, int planes, int lines, bool cones, bool mean)
    {
        var text = new List<string> { "Equal area, lower hemisphere." };
        if (planes > 0)
        {
            string ring = cones ? ", each with its 95 % cone (internal errors)" : "";
            text.Add(Invariant($"{Words.Count(planes, "stretch", "stretches")} of contact shown by {(planes == 1 ? "its pole" : "their poles")}{ring}."));
        }

        if (lines > 0)
        {
            string those = lines == 1 ? "stretch whose trace is too straight to give a dip is" : "stretches whose traces are too straight to give a dip are";
            text.Add(Invariant($"{lines} {those} shown by the direction of the trace, not by a pole."));
        }

        if (mean) text.Add("Great circles are mean planes over the constrained length" + (cones ? "." : "; only their cones are drawn."));
        text.Add(Words.North(frame));
        return string.Join(" ", text);
    }
}
