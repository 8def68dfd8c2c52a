using System.Reflection;
using System.Text.RegularExpressions;
using CloudStruct.Records.Stages;
using CloudStruct.Recipes;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Rules;

/// <summary>Every setting is explained where people look for it.</summary>
public class SettingsTests
{
    private static IEnumerable<string> Keys =>
        from section in RecipeReader.Known(typeof(Recipe))
        let isStage = typeof(IStageSettings).IsAssignableFrom(section.Value.PropertyType)
        from key in isStage ? RecipeReader.Known(section.Value.PropertyType).Keys.Select(k => $"{section.Key}.{k}") : [section.Key]
        select key;

    [Fact]
    public void The_usual_recipe_shows_every_setting_with_its_default_and_a_comment()
    {
        string text = File.ReadAllText(Repo.Path("pipelines/dike-survey.yaml"));
        foreach (string key in Keys)
        {
            string name = key.Split('.')[^1];
            Assert.True(Regex.IsMatch(text, $@"^\s*#.*\n(\s*#.*\n)*\s*{name}:", RegexOptions.Multiline), $"{key} is not explained in pipelines/dike-survey.yaml");
        }

        var faults = new List<SettingFault>();
        Recipe read = new RecipeReader("dike-survey", faults).Lay(new Recipe(), YamlText.Parse(text, "dike-survey"));
        Assert.Empty(faults);
        Assert.Equal(new Recipe() with { Description = read.Description }, read);
    }

    [Fact]
    public void Every_built_in_recipe_is_usable()
    {
        Assert.Equal(["dike-survey", "fractures-only", "quick-look"], RecipeShelf.Names);
        foreach (string name in RecipeShelf.Names)
        {
            var faults = new List<SettingFault>();
            Recipe read = new RecipeReader(name, faults).Lay(new Recipe(), YamlText.Parse(RecipeShelf.Read(name, ".").Text, name));
            Assert.Empty(faults);
            Assert.Empty(read.Check());
            Assert.NotEmpty(read.Description);
        }
    }

    [Fact]
    public void Defaults_pass_their_own_checks_and_numbers_name_their_unit()
    {
        Assert.Empty(new Recipe().Check());
        string[] units = ["_m", "_m2", "_deg", "_per_m", "_gib"];
        string[] bare = [];
        foreach (PropertyInfo section in RecipeReader.Known(typeof(Recipe)).Values.Where(p => typeof(IStageSettings).IsAssignableFrom(p.PropertyType)))
        {
            foreach ((string key, PropertyInfo property) in RecipeReader.Known(section.PropertyType))
            {
                Type type = Nullable.GetUnderlyingType(property.PropertyType) ?? property.PropertyType;
                bool ratio = Regex.IsMatch(key, "share|ratio|factor|weight|probability|widths|spacings|levels|odds|depth$");
                if (type == typeof(double) && !units.Any(u => key.EndsWith(u, StringComparison.Ordinal)) && !ratio) bare = [.. bare, $"{section.Name}.{key}"];
            }
        }

        Assert.Empty(bare);
    }
}
