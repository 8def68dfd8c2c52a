using System.Globalization;
using System.Text;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate;

/// <summary>The demonstration survey: an outcrop cut into two overlapping tiles, and the texts that go with it.</summary>
public sealed record DemoSurvey
{
    /// <summary>How much higher the second tile lies than the first, as two flights differ [m].</summary>
    public const double TileOffsetM = 0.025;

    /// <summary>First line of its survey.yaml: by it an earlier demonstration survey is known.</summary>
    public const string Mark = "# An invented survey: CloudStruct made this outcrop, nobody has stood on it.";

    /// <summary>Invented day of the flight, yyyy-MM-dd.</summary>
    public const string FlightDate = "2026-05-14";

    /// <summary>Extent of the overlap up the slope [m].</summary>
    private const double OverlapM = 3;

    /// <summary>The outcrop with its truth.</summary>
    public SimulatedOutcrop Outcrop { get; init; } = new();

    /// <summary>Tiles to be written as clouds, in order of their names.</summary>
    public DemoTile[] Tiles { get; init; } = [];

    /// <summary>Text files of the survey: survey.yaml, labels.</summary>
    public DemoFile[] Files { get; init; } = [];

    /// <summary>Makes the survey.</summary>
    /// <param name="seed">Which member of the plan.</param>
    /// <param name="points">Points in all; null for the plan's.</param>
    /// <param name="threads">Workers; 0 for one per core.</param>
    public static DemoSurvey Make(ulong seed = 1, int? points = null, int threads = 0) =>
        Of(Simulate.Outcrop.Make(OutcropPlan.ByName("demo"), seed, points, threads));

    /// <summary>The survey of an outcrop that was made already.</summary>
    public static DemoSurvey Of(SimulatedOutcrop outcrop)
    {
        string file = outcrop.Name.ToLowerInvariant().Replace(' ', '-');
        (int[] lower, int[] upper) = Split(outcrop);
        return new DemoSurvey
        {
            Outcrop = outcrop,
            Tiles = [Tile(outcrop, $"{file}-1.las", lower, 0), Tile(outcrop, $"{file}-2.las", upper, TileOffsetM)],
            Files = [new("survey.yaml", Yaml(outcrop)), new("labels/check.csv", Labels(outcrop))],
        };
    }

    private static DemoTile Tile(SimulatedOutcrop outcrop, string name, int[] chosen, double shiftZM) =>
        new($"clouds/{name}", new OutcropSource(outcrop, name, chosen, shiftZM), chosen, shiftZM);

    /// <summary>Lower and upper half; in the overlap each point goes to one of them by lot.</summary>
    private static (int[] Lower, int[] Upper) Split(SimulatedOutcrop outcrop)
    {
        Vec3 uphill = Axes.Toward(outcrop.UphillDeg);
        List<int> lower = [], upper = [];
        for (int i = 0; i < outcrop.Count; i++)
        {
            double a = (outcrop.Place(i) - outcrop.Origin).Dot(uphill);
            bool high = Math.Abs(a) < OverlapM / 2 ? new Dice(outcrop.Seed, Purpose.Keep, ~(ulong)i).Chance(0.5) : a > 0;
            (high ? upper : lower).Add(i);
        }

        return ([.. lower], [.. upper]);
    }

    private static string Yaml(SimulatedOutcrop outcrop) => $"""
        {Mark}
        name: {outcrop.Name}
        crs: EPSG:{outcrop.Crs.Epsg.ToString(CultureInfo.InvariantCulture)}
        reference:
          kind: rtk
          tilt_sigma_deg: 0.15
          azimuth_sigma_deg: 0.10
          scale_sigma: 0.0005
        flight_date: {FlightDate}
        operator: the simulator
        licence: CC0-1.0
        citation: Simulated outcrop of CloudStruct, plan {outcrop.Plan.Name}, seed {outcrop.Seed.ToString(CultureInfo.InvariantCulture)}

        """;

    /// <summary>Check labels as a person would set them: well inside what is labelled, to the centimetre.</summary>
    private static string Labels(SimulatedOutcrop outcrop)
    {
        var text = new StringBuilder("x_m,y_m,z_m,class,use\n");
        (RockClass Class, int Count)[] wanted = [(RockClass.Host, 40), (RockClass.Dike, 40), (RockClass.Cover, 12), (RockClass.Loose, 12)];
        foreach ((RockClass kind, int count) in wanted)
        {
            int set = 0;
            for (ulong lot = 0; lot < 4000 && set < count && outcrop.Count > 0; lot++)
            {
                int i = (int)(new Dice(outcrop.Seed, Purpose.Labels, ((ulong)kind << 32) + lot).Unit() * outcrop.Count);
                Vec3 p = outcrop.Place(i);
                if (outcrop.TrueClass[i] != (byte)kind || NearMargin(outcrop, p)) continue;
                text.Append(CultureInfo.InvariantCulture, $"{p.X:F2},{p.Y:F2},{p.Z:F2},{kind.ToString().ToLowerInvariant()},check\n");
                set++;
            }
        }

        return text.ToString();
    }

    private static bool NearMargin(SimulatedOutcrop outcrop, Vec3 p) =>
        Array.Exists(outcrop.Dikes, d => Math.Abs(d.SignedFromA(p)) < 0.2 || Math.Abs(d.SignedFromB(p)) < 0.2);
}
