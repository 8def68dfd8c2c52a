using System.Text.Json;
using CloudStruct.Whole.Kit;

namespace CloudStruct.Whole;

/// <summary>What is said to wrong usage and bad input.</summary>
public sealed class UsageTests : IDisposable
{
    private readonly TempSurvey survey = new();

    public void Dispose() => survey.Dispose();

    [Theory]
    [InlineData("measure")]
    [InlineData("measure", "x", "--no-such-option")]
    [InlineData("measure", "x", "--threads", "0")]
    [InlineData("measure", "x", "--memory-gib", "-1")]
    [InlineData("frobnicate")]
    public void Wrong_usage_ends_with_2(params string[] args) => Assert.Equal(2, Built.Run(survey.Root, args).Code);

    [Theory, InlineData("--help"), InlineData("measure", "--help"), InlineData("demo", "--help"), InlineData("inspect", "--help")]
    public void Help_shows_examples(params string[] args)
    {
        Built.Ended run = Built.Run(survey.Root, args);
        Assert.Equal(0, run.Code);
        Assert.Contains("Examples:", run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public void All_wrong_settings_are_told_together()
    {
        Clouds.Write(survey["s/rock.las"], "no-dike", 1, 2_000);
        survey.Text("mine.yaml", "faces:\n  tolerence_m: 1\nwidth:\n  station_m: -2\nclouds: zip\n");
        Built.Ended run = Built.Run(survey.Root, "measure", "s", "--recipe", "mine.yaml");
        Assert.Equal(3, run.Code);
        Assert.Contains("line 2: faces.tolerence_m", run.Error, StringComparison.Ordinal);
        Assert.Contains("tolerance_m?", run.Error, StringComparison.Ordinal);
        Assert.Contains("width.station_m", run.Error, StringComparison.Ordinal);
        Assert.Contains("line 5: clouds", run.Error, StringComparison.Ordinal);
        Assert.False(Directory.Exists(survey["s/results"]));
    }

    [Theory]
    [InlineData("empty.las", "")]
    [InlineData("words.las", "this is not a cloud at all, only words, and they go on for more than a header of two hundred bytes would need. this is not a cloud at all, only words, and they go on for more than a header of two hundred bytes would need.")]
    [InlineData("none.ply", "ply\nformat ascii 1.0\nelement vertex 0\nproperty float x\nproperty float y\nproperty float z\nend_header\n")]
    [InlineData("torn.ply", "ply\nformat ascii 1.0\nelement vertex 3\nproperty float x\nproperty float y\nproperty float z\nend_header\n0 0 0\n")]
    [InlineData("nan.ply", "ply\nformat ascii 1.0\nelement vertex 2\nproperty float x\nproperty float y\nproperty float z\nend_header\nnan nan nan\nnan 0 0\n")]
    [InlineData("mesh.glb", "glTF")]
    [InlineData("packed.laz", "LASF")]
    public void A_bad_file_is_refused_in_one_paragraph_with_3_and_leaves_nothing(string name, string content)
    {
        survey.Text("s/" + name, content);
        Built.Ended run = Built.Run(survey.Root, "measure", "s");
        Assert.Equal(3, run.Code);
        Assert.Contains(name, run.Error, StringComparison.Ordinal);
        string[] lines = [.. run.Error.Split('\n', StringSplitOptions.RemoveEmptyEntries).Where(l => !l.StartsWith("files ", StringComparison.Ordinal))];
        Assert.Single(lines);
        Assert.DoesNotContain("   at ", run.Error, StringComparison.Ordinal);
        Assert.False(Directory.Exists(survey["s/results"]));
    }

    [Fact]
    public void A_folder_without_clouds_and_a_path_without_anything_are_bad_input()
    {
        Directory.CreateDirectory(survey["s/clouds"]);
        Assert.Equal(3, Built.Run(survey.Root, "measure", "s").Code);
        Assert.Equal(3, Built.Run(survey.Root, "measure", "nowhere").Code);
    }

    [Fact]
    public void Inspect_tells_facts_and_goes_on_after_a_bad_file()
    {
        Clouds.Write(survey["a.las"], "no-dike", 2, 2_000);
        survey.Text("b.las", "LASF");
        Built.Ended run = Built.Run(survey.Root, "inspect", "a.las", "b.las", "--json");
        Assert.Equal(4, run.Code);
        using JsonDocument json = JsonDocument.Parse(run.Out);
        Assert.Equal(2, json.RootElement.GetArrayLength());
        Assert.True(json.RootElement[0].GetProperty("points").GetInt64() > 1000);
        Assert.True(json.RootElement[1].TryGetProperty("refused", out _));
        Assert.Equal(3, Built.Run(survey.Root, "inspect", "b.las").Code);
        Assert.Equal(0, Built.Run(survey.Root, "inspect", "a.las").Code);
    }
}
