using CloudStruct.Maths.Directions;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Sheets of several nets: dike against host, and every set by itself.</summary>
internal static class NetSheets
{
    // More sets than these would not be read on one sheet.
    private const int MostSets = 12;

    /// <summary>The sheets that there is something to show on.</summary>
    /// <param name="input">What was found.</param>
    /// <param name="nets">Nets of the domains, by equal area.</param>
    public static IEnumerable<NetSheet> Of(Findings input, NetDrawing[] nets)
    {
        NetDrawing? dike = nets.FirstOrDefault(n => n.Name == "net-dike"), host = nets.FirstOrDefault(n => n.Name == "net-host");
        if (dike is not null && host is not null)
        {
            yield return new NetSheet { Name = "nets-dike-host", Title = "Faces in the dike and in the host rock", Columns = 2, Nets = [dike, host] };
        }

        OrientationSet[] sets = [.. input.Sets.Sets.Where(s => s.Zone == "")];
        if (sets.Length == 0) yield break;
        SurveyFrame frame = input.Described.Cloud.Frame;
        string more = sets.Length > MostSets ? Invariant($" The {MostSets} first of {sets.Length} sets.") : "";
        yield return new NetSheet
        {
            Name = "nets-sets",
            Title = "Orientation sets",
            Columns = 3,
            Nets = [.. sets.Take(MostSets).Select(s => One(input, sets, s))],
            Sentence = Invariant($"Equal area, lower hemisphere. Poles of the faces of each set, its mean plane and the 95 % cone of the mean (internal errors).{more} {Words.North(frame)}"),
        };
    }

    private static NetDrawing One(Findings input, OrientationSet[] sets, OrientationSet set)
    {
        Face[] faces = input.Faces.Faces;
        double turn = input.Described.Cloud.Frame.TurnDeg;
        string[] setOf = input.Sets.SetOfFace;
        int[] own = [.. Enumerable.Range(0, faces.Length).Where(i => setOf.Length == faces.Length && setOf[i] == set.Set)];
        var curves = new List<NetCurve> { new("great_circle", set.Set, 0, NetCurves.GreatCircle(set.Normal, turn)) };
        if (set.Cone95Deg < 89)
        {
            foreach (Point2[] ring in NetCurves.SmallCircle(set.Normal, set.Cone95Deg, turn)) curves.Add(new NetCurve("cone", set.Set, 0, ring));
        }

        string mean = set.Mean.DipDeg < 5
            ? Invariant($"dip {set.Mean.DipDeg:0} deg") : Invariant($"{(int)Math.Round(set.Mean.StrikeDeg) % 360:000}/{set.Mean.DipDeg:00}");
        string cone = double.IsFinite(set.Cone95Deg) ? Invariant($" ± {set.Cone95Deg:0.0} deg") : "";
        return new NetDrawing
        {
            Name = "net-" + set.Set,
            Title = set.Set,
            Poles = [.. own.Select(i => new NetPole(EqualAreaNet.OfAxis(faces[i].Normal, turn), faces[i].AreaM2, set.Set, faces[i].FaceId))],
            Curves = [.. curves],
            Groups = [.. sets.Where(s => s.Domain == set.Domain).Select(s => s.Set)],
            Sentence = Invariant($"{Words.Count(own.Length, "face", "faces")}, mean {mean}{cone}."),
            HasNorth = input.Described.Cloud.Frame.North != North.Model,
        };
    }
}
