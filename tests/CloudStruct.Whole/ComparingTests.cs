using System.Globalization;
using System.Text;
using System.Text.Json;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;
using CloudStruct.Whole.Kit;

namespace CloudStruct.Whole;

/// <summary>repeat and fieldcheck, as a user runs them.</summary>
public sealed class ComparingTests : IDisposable
{
    private readonly TempSurvey survey = new();

    public void Dispose() => survey.Dispose();

    [Fact]
    public void Two_flights_of_one_outcrop_agree_within_their_regions_once_the_turn_between_them_is_taken_off()
    {
        Clouds.Write(survey["a/rock.las"], "demo", 31, 250_000);
        Clouds.Write(survey["b/rock.las"], "demo", 31, 250_000, flight: 1, turnDeg: 1.5);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "a").Code);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "b").Code);
        Built.Ended run = Built.Run(survey.Root, "repeat", "a/results", "b", "--out", "both", "--json");
        Assert.Equal("", run.Error);
        Assert.Equal(0, run.Code);
        foreach (string file in new[] { "tables/repeat.csv", "tables/repeat-summary.csv", "plots/repeat.svg", "plots/repeat.pdf", "plots/repeat.png" }) Assert.True(File.Exists(survey["both/" + file]), file);
        using JsonDocument json = JsonDocument.Parse(run.Out);
        JsonElement turn = json.RootElement.GetProperty("rotation");
        double half = (turn.GetProperty("azimuth_high95_deg").GetDouble() - turn.GetProperty("azimuth_low95_deg").GetDouble()) / 2;
        // Twice the interval: a test that fails once in twenty runs by chance would teach nothing; one seed is one draw.
        Assert.InRange(turn.GetProperty("azimuth_deg").GetDouble(), 1.5 - (2 * half), 1.5 + (2 * half));
        Assert.InRange(half, 0.001, 0.15);
        JsonElement[] faces = [.. json.RootElement.GetProperty("groups").EnumerateArray().Where(g => g.GetProperty("name").GetString()!.StartsWith("faces", StringComparison.Ordinal))];
        Assert.True(faces.Sum(g => g.GetProperty("pairs").GetInt32()) > 150);
        // The waviness of the rock is in both flights and cancels, so that true regions hold in 0.95 or more; less, beyond the error of
        // counting, would convict them.
        Assert.All(faces.Where(g => g.GetProperty("pairs").GetInt32() >= 40), g =>
        {
            Assert.True(g.GetProperty("share_high95").GetDouble() > 0.95, g.ToString());
            Assert.InRange(g.GetProperty("real_over_stated_spread").GetDouble(), 0.3, 1.25);
        });
    }

    [Fact]
    public void A_wrong_declination_shows_as_a_turn_and_is_named()
    {
        SimulatedOutcrop rock = Clouds.Write(survey["s/rock.las"], "no-dike", 32, 250_000);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "s").Code);
        // Readings on the true faces: a compass that scatters by 2 deg and was set 6 deg wrong.
        var dice = new Random(5);
        var csv = new StringBuilder("id,x_m,y_m,z_m,sigma_m,kind,strike_deg,dip_deg,north\n");
        int n = 0;
        foreach (SimulatedFace face in rock.Faces.Where(f => f.AreaM2 > 0.5 && f.InPlace).Take(60))
        {
            Vec3 tilt = new(dice.NextDouble() - 0.5, dice.NextDouble() - 0.5, dice.NextDouble() - 0.5);
            Attitude read = Attitude.FromNormal((face.Normal + (tilt * 0.12)).Unit(), 6);
            csv.Append(CultureInfo.InvariantCulture, $"r{++n},{face.Middle.X:0.000},{face.Middle.Y:0.000},{face.Middle.Z:0.000},0.1,face,{read.StrikeDeg:0},{read.DipDeg:0},grid\n");
        }

        survey.Text("s/field/readings.csv", csv.ToString());
        Built.Ended run = Built.Run(survey.Root, "fieldcheck", "s", "s/field/readings.csv");
        Assert.Equal("", run.Error);
        Assert.Equal(0, run.Code);
        Assert.Contains("declination", run.Out, StringComparison.Ordinal);
        Assert.True(File.Exists(survey["s/results/tables/fieldcheck.csv"]));
        string azimuth = File.ReadLines(survey["s/results/tables/fieldcheck-summary.csv"]).Single(l => l.StartsWith("azimuth_deg", StringComparison.Ordinal));
        double[] values = [.. azimuth.Split(',')[^3..].Select(v => double.Parse(v, CultureInfo.InvariantCulture))];
        Assert.InRange(6, values[1] - (values[2] - values[1]) / 2, values[2] + (values[2] - values[1]) / 2);
        Assert.True(values[1] > 3, azimuth);
    }

    [Fact]
    public void A_table_of_attitudes_becomes_a_net_whatever_its_way_of_writing_them()
    {
        // Five planes about 040/60: the same ones as strike and dip, as quadrants and as poles.
        survey.Text("a.csv", "strike_deg,dip_deg,set\n40,60,x\n42,61,x\n38,59,x\n41,58,x\n39,62,x\n");
        survey.Text("b.csv", "attitude\nN40E/60SE\nN42E/61SE\nN38E/59SE\nN41E/58SE\nN39E/62SE\n");
        survey.Text("c.csv", "pole_trend_deg;pole_plunge_deg\n310;30\n312;29\n308;31\n311;32\n309;28\n");
        string[] said = [.. new[] { "a", "b", "c" }.Select(t => Built.Run(survey.Root, "net", t + ".csv", "--north", "true", "--json").Out)];
        Assert.Equal(said[0], said[1]);
        Assert.Equal(said[0], said[2]);
        using JsonDocument json = JsonDocument.Parse(said[0]);
        Assert.Equal(40, json.RootElement[0].GetProperty("strike_deg").GetDouble(), 0.2);
        Assert.Equal(60, json.RootElement[0].GetProperty("dip_deg").GetDouble(), 0.1);
        foreach (string end in new[] { "svg", "pdf", "png" }) Assert.True(File.Exists(survey["a-net." + end]), end);
        survey.Text("d.csv", "attitude\n065/40\n");
        Built.Ended two = Built.Run(survey.Root, "net", "d.csv");
        Assert.Equal(3, two.Code);
        Assert.Contains("notation", two.Error, StringComparison.Ordinal);
    }

    [Fact]
    public void What_cannot_be_compared_is_refused_in_one_paragraph()
    {
        Directory.CreateDirectory(survey["empty"]);
        Built.Ended none = Built.Run(survey.Root, "repeat", "empty", "empty");
        Assert.Equal(3, none.Code);
        Assert.Single(none.Error.Trim().Split('\n'));
        Built.Ended usage = Built.Run(survey.Root, "fieldcheck", "empty", "x.csv", "--within-m", "-1");
        Assert.Equal(2, usage.Code);
    }
}
