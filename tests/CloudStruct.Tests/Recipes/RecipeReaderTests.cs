using CloudStruct.Recipes;
using CloudStruct.Records.Complaints;
using CloudStruct.Runs;

namespace CloudStruct.Tests.Recipes;

public class RecipeReaderTests
{
    [Fact]
    public void All_faults_are_told_together_with_lines_and_the_nearest_key()
    {
        const string text = "north: true\nfaces:\n  tolerence_m: 0.02\n  smallest_face_m2: big\nwidht:\n  station_m: 1\nskip_bad_files: perhaps\n";
        var faults = new List<SettingFault>();
        new RecipeReader("mine.yaml", faults).Lay(new Recipe(), YamlText.Parse(text, "mine.yaml"));
        Assert.Collection(
            faults,
            f => Assert.Equal((3L, "faces.tolerence_m"), (f.Line, f.Key)),
            f => Assert.Equal((4L, "faces.smallest_face_m2"), (f.Line, f.Key)),
            f => Assert.Equal((5L, "widht"), (f.Line, f.Key)),
            f => Assert.Equal((7L, "skip_bad_files"), (f.Line, f.Key)));
        Assert.Contains("did you mean faces.tolerance_m?", faults[0].Problem, StringComparison.Ordinal);
        Assert.Contains("did you mean width?", faults[2].Problem, StringComparison.Ordinal);
    }

    [Fact]
    public void Later_layers_win_and_leave_the_rest()
    {
        var faults = new List<SettingFault>();
        var reader = new RecipeReader("x", faults);
        Recipe one = reader.Lay(new Recipe(), YamlText.Parse("faces:\n  smallest_face_m2: 0.2\n  tolerance_m: 0.03\n", "x"));
        Recipe two = reader.Lay(one, YamlText.Parse("faces:\n  tolerance_m: auto\n", "x"));
        Assert.Empty(faults);
        Assert.Equal(0.2, two.Faces.SmallestFaceM2);
        Assert.Null(two.Faces.ToleranceM);
        Assert.Equal(0.03, one.Faces.ToleranceM);
    }

    [Fact]
    public void Settings_in_survey_yaml_win_over_the_recipe_it_names_and_lose_to_the_option()
    {
        var notes = new SurveyNotes { Recipe = "dike-survey", Settings = YamlText.Parse("faces:\n  smallest_face_m2: 0.3\nclouds: none\n", "survey.yaml") };
        Assert.Equal(0.3, RecipeShelf.Compose(notes, ".", null).Faces.SmallestFaceM2);
        string file = Path.GetTempFileName();
        File.WriteAllText(file, "faces:\n  smallest_face_m2: 0.4\n");
        Recipe both = RecipeShelf.Compose(notes, ".", file);
        Assert.Equal(0.4, both.Faces.SmallestFaceM2);
        Assert.Equal(CloudsWanted.None, both.Clouds);
        File.Delete(file);
    }

    [Theory, InlineData("faces: 3"), InlineData("[a, b]"), InlineData("faces:\n  smallest_face_m2: -1"), InlineData("a: b: c"), InlineData("faces:\n  smallest_face_m2: .nan")]
    public void What_cannot_be_used_is_refused(string text)
    {
        string file = Path.GetTempFileName();
        File.WriteAllText(file, text);
        Assert.Throws<InputException>(() => RecipeShelf.Compose(new SurveyNotes(), ".", file));
        File.Delete(file);
    }

    [Theory, InlineData("TrueWidthLow95M", "true_width_low95_m"), InlineData("SmallestFaceM2", "smallest_face_m2"), InlineData("Cone95Deg", "cone95_deg"), InlineData("BHidden", "b_hidden"), InlineData("P32PerM", "p32_per_m")]
    public void Names_become_snake_case(string name, string key) => Assert.Equal(key, Words.Snake(name));
}
