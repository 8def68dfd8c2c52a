using System.Text.Json;
using CloudStruct.Whole.Kit;

namespace CloudStruct.Whole;

/// <summary>measure on survey folders, as a user runs it.</summary>
public sealed class MeasureTests : IDisposable
{
    private readonly TempSurvey survey = new();

    public void Dispose() => survey.Dispose();

    [Fact]
    public void A_survey_gives_everything_and_the_same_bytes_on_any_number_of_threads()
    {
        Clouds.Write(survey["s/clouds/rock.LAS"], "demo", 5, 150_000);
        survey.Text("s/survey.yaml", "name: Test cliff\nreference:\n  kind: rtk\nlicence: CC BY 4.0\n");
        Built.Ended one = Built.Run(survey.Root, "measure", "s", "--threads", "1", "--out", "one");
        Assert.Equal("", one.Error.Split('\n').FirstOrDefault(l => l.Contains("fault", StringComparison.Ordinal)) ?? "");
        Assert.Equal(0, one.Code);
        foreach (string file in new[] { "run.json", "run.log", "report.html", "tables/faces.csv", "tables/contacts.csv", "tables/width.csv", "tables/dikes.csv", "tables/sets.csv", "tables/classes.csv", "tables/tables-metadata.json", "clouds/classified.las" })
        {
            Assert.True(File.Exists(survey["one/" + file]), file);
        }

        Assert.NotEmpty(Directory.GetFiles(survey["one/plots"], "*.svg"));
        Assert.NotEmpty(Directory.GetFiles(survey["one/plots"], "*.png"));
        Assert.NotEmpty(Directory.GetFiles(survey["one/plots"], "*.pdf"));
        Built.Ended two = Built.Run(survey.Root, "measure", "s", "--threads", "2", "--out", "two", "--fresh", "--memory-gib", "4");
        Assert.Equal(0, two.Code);
        Assert.Equal(survey.Hashes("one"), survey.Hashes("two"));

        // A third run takes every stage from the store, says the same remarks, and still gives the same bytes.
        Built.Ended three = Built.Run(survey.Root, "measure", "s", "--out", "one", "--json");
        Assert.Equal(0, three.Code);
        Assert.Equal(survey.Hashes("two"), survey.Hashes("one"));
        using JsonDocument run = JsonDocument.Parse(File.ReadAllText(survey["one/run.json"]));
        Assert.All(run.RootElement.GetProperty("timing").GetProperty("stages").EnumerateArray().Where(s => s.GetProperty("stage").GetString() is not ("files" or "products")), s => Assert.True(s.GetProperty("from_store").GetBoolean()));
        using JsonDocument said = JsonDocument.Parse(three.Out);
        Assert.Equal(run.RootElement.GetProperty("run_id").GetString(), said.RootElement.GetProperty("run_id").GetString());
    }

    [Fact]
    public void Nothing_written_holds_a_path_or_name_of_the_machine()
    {
        Clouds.Write(survey["s/rock.las"], "no-dike", 6, 60_000);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "s").Code);
        string[] secrets = [survey.Root, Path.GetTempPath(), Environment.MachineName];
        foreach (string file in Directory.GetFiles(survey["s/results"], "*", SearchOption.AllDirectories))
        {
            string text = System.Text.Encoding.Latin1.GetString(File.ReadAllBytes(file));
            foreach (string secret in secrets.Where(s => s.Length > 4)) Assert.False(text.Contains(secret, StringComparison.Ordinal), $"{Path.GetFileName(file)} holds {secret}");
        }
    }

    [Fact]
    public void No_dike_is_a_result()
    {
        Clouds.Write(survey["bare/rock.las"], "no-dike", 7, 120_000);
        Built.Ended run = Built.Run(survey.Root, "measure", "bare");
        Assert.Equal(0, run.Code);
        Assert.Single(File.ReadAllLines(survey["bare/results/tables/contacts.csv"]));
        Assert.Single(File.ReadAllLines(survey["bare/results/tables/width.csv"]));
        Assert.Contains("No dike was found", run.Out, StringComparison.Ordinal);
        Assert.True(File.ReadAllLines(survey["bare/results/tables/faces.csv"]).Length > 10);
    }

    [Fact]
    public void A_cloud_without_colour_is_measured_and_says_so()
    {
        Clouds.Write(survey["s/rock.las"], "no-colour", 8, 80_000);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "s").Code);
        Assert.Contains("colour", File.ReadAllText(survey["s/results/run.log"]), StringComparison.OrdinalIgnoreCase);
    }

    [Fact]
    public void Old_results_are_replaced_and_what_the_user_added_is_kept()
    {
        Clouds.Write(survey["s/rock.las"], "no-dike", 9, 40_000);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "s").Code);
        survey.Text("s/results/my notes.txt", "mine");
        survey.Text("s/results/tables/faces.csv", "damaged");
        Assert.Equal(0, Built.Run(survey.Root, "measure", "s").Code);
        Assert.Equal("mine", File.ReadAllText(survey["s/results/my notes.txt"]));
        Assert.NotEqual("damaged", File.ReadAllText(survey["s/results/tables/faces.csv"]));
        Assert.False(Directory.Exists(survey["s/results.old"]));
        Assert.False(Directory.Exists(survey["s/results.new"]));
    }

    [Fact]
    public void A_folder_that_is_not_ours_is_not_touched()
    {
        Clouds.Write(survey["s/rock.las"], "no-dike", 10, 5_000);
        survey.Text("precious/thesis.txt", "years");
        Built.Ended run = Built.Run(survey.Root, "measure", "s", "--out", "precious");
        Assert.Equal(2, run.Code);
        Assert.Equal(["thesis.txt"], Directory.GetFileSystemEntries(survey["precious"]).Select(Path.GetFileName));
    }

    [Fact]
    public void A_damaged_tile_is_refused_unless_the_recipe_lets_it_be_left_out()
    {
        Clouds.Write(survey["s/clouds/good.las"], "no-dike", 11, 40_000);
        byte[] whole = File.ReadAllBytes(survey["s/clouds/good.las"]);
        File.WriteAllBytes(survey["s/clouds/torn.las"], whole[..(whole.Length / 2)]);
        Built.Ended refused = Built.Run(survey.Root, "measure", "s");
        Assert.Equal(3, refused.Code);
        Assert.Contains("torn.las", refused.Error, StringComparison.Ordinal);
        Assert.False(Directory.Exists(survey["s/results"]));
        survey.Text("s/survey.yaml", "settings:\n  skip_bad_files: true\n");
        Built.Ended part = Built.Run(survey.Root, "measure", "s");
        Assert.Equal(4, part.Code);
        Assert.Contains("torn.las", part.Out, StringComparison.Ordinal);
        using JsonDocument run = JsonDocument.Parse(File.ReadAllText(survey["s/results/run.json"]));
        Assert.Equal("done_in_part", run.RootElement.GetProperty("status").GetString());
    }

    [Fact]
    public void Interrupted_it_ends_with_130_and_harms_nothing()
    {
        Clouds.Write(survey["s/clouds/rock.las"], "demo", 12, 250_000);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "s", "--recipe", "quick-look").Code);
        SortedDictionary<string, string> before = survey.Hashes("s/results");
        using System.Diagnostics.Process p = Built.Start(survey.Root, "measure", "s", "--fresh");
        Thread.Sleep(3000);   // some stage is under way; which one must not matter
        using (var kill = System.Diagnostics.Process.Start("kill", ["-TERM", p.Id.ToString(System.Globalization.CultureInfo.InvariantCulture)])) kill!.WaitForExit();
        Built.Ended ended = Built.End(p);
        Assert.Equal(130, ended.Code);
        Assert.Equal(before, survey.Hashes("s/results"));
        Assert.False(Directory.Exists(survey["s/results.new"]));
    }

    [Fact]
    public void Results_are_not_measured_and_links_out_of_the_survey_are_not_followed()
    {
        Clouds.Write(survey["elsewhere/far.las"], "no-dike", 13, 5_000);
        Clouds.Write(survey["s/clouds/near.las"], "no-dike", 13, 30_000);
        File.CreateSymbolicLink(survey["s/clouds/linked.las"], survey["elsewhere/far.las"]);
        File.Copy(survey["elsewhere/far.las"], survey["s/clouds/.hidden.las"]);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "s").Code);
        using JsonDocument run = JsonDocument.Parse(File.ReadAllText(survey["s/results/run.json"]));
        Assert.Equal(["clouds/near.las"], run.RootElement.GetProperty("inputs").EnumerateArray().Select(i => i.GetProperty("name").GetString()));
        Assert.Contains("linked.las", File.ReadAllText(survey["s/results/run.log"]), StringComparison.Ordinal);
        Assert.Equal(3, Built.Run(survey.Root, "measure", "s/results").Code);
    }

    [Fact]
    public void A_budget_that_is_too_small_is_refused_with_the_figure_needed()
    {
        Clouds.Write(survey["s/rock.las"], "no-dike", 14, 20_000);
        Built.Ended run = Built.Run(survey.Root, "measure", "s", "--memory-gib", "0.01");
        Assert.Equal(1, run.Code);
        Assert.Matches(@"needs about \d", run.Error);
        Assert.False(Directory.Exists(survey["s/results"]));
    }
}
