using CloudStruct.Records.Complaints;
using CloudStruct.Records.Stages;

namespace CloudStruct.Recipes;

/// <summary>Recipes by name (built in) or by file, and the checks that come before any work.</summary>
internal static class RecipeShelf
{
    /// <summary>The recipe when nothing names one.</summary>
    public const string Usual = "dike-survey";

    /// <summary>Names of the built-in recipes.</summary>
    public static string[] Names { get; } =
    [
        .. typeof(RecipeShelf).Assembly.GetManifestResourceNames()
            .Where(n => n.StartsWith("pipelines/", StringComparison.Ordinal))
            .Select(n => Path.GetFileNameWithoutExtension(n)).Order(StringComparer.Ordinal),
    ];

    /// <summary>Text of a built-in recipe or of a file, with the name to use in messages.</summary>
    /// <param name="nameOrFile">A built-in name, or the path of a YAML file.</param>
    /// <param name="folder">Folder that relative paths count from.</param>
    public static (string Text, string File) Read(string nameOrFile, string folder)
    {
        if (Names.Contains(nameOrFile, StringComparer.Ordinal))
        {
            using Stream s = typeof(RecipeShelf).Assembly.GetManifestResourceStream($"pipelines/{nameOrFile}.yaml")!;
            return (new StreamReader(s).ReadToEnd(), $"built-in recipe {nameOrFile}");
        }

        string path = Path.GetFullPath(nameOrFile, folder);
        if (File.Exists(path)) return (File.ReadAllText(path), Path.GetFileName(path));
        string? near = Words.Nearest(nameOrFile, Names);
        throw new InputException(
            $"recipe '{nameOrFile}'",
            "there is no built-in recipe and no file of this name",
            $"built in are {string.Join(", ", Names)}",
            near is null ? "Name one of these, or the path of a YAML file" : $"Did you mean {near}? Otherwise name the path of a YAML file");
    }

    /// <summary>The recipe of a run: default, then the recipe that survey.yaml names, its settings, then --recipe.</summary>
    /// <exception cref="InputException">All faults of all layers in one message.</exception>
    public static Recipe Compose(Runs.SurveyNotes notes, string surveyFolder, string? recipeOption)
    {
        var faults = new List<SettingFault>();
        Recipe recipe = new();
        string named = notes.Recipe ?? (recipeOption is null ? Usual : "");
        if (named.Length > 0) recipe = LayText(recipe, Read(named, surveyFolder), faults);
        if (notes.Settings is not null) recipe = new RecipeReader("survey.yaml", faults).Lay(recipe, notes.Settings);
        if (recipeOption is not null) recipe = LayText(recipe, Read(recipeOption, Directory.GetCurrentDirectory()), faults);
        foreach (SettingComplaint c in recipe.Check())
        {
            faults.Add(new SettingFault("settings", 0, c.Key, $"{c.Rule} (it is {c.Found})"));
        }

        Refuse(faults);
        return recipe;
    }

    /// <summary>Throws when there are faults, naming all of them.</summary>
    public static void Refuse(List<SettingFault> faults)
    {
        if (faults.Count == 0) return;
        throw new InputException(
            faults.Select(f => f.File).Distinct(StringComparer.Ordinal).Count() == 1 ? faults[0].File : "settings",
            faults.Count == 1 ? "a setting cannot be used" : FormattableString.Invariant($"{faults.Count} settings cannot be used"),
            string.Join("; ", faults),
            "Mend these lines; 'cloudstruct measure --help' and docs/settings.md explain every setting");
    }

    private static Recipe LayText(Recipe under, (string Text, string File) recipe, List<SettingFault> faults) =>
        new RecipeReader(recipe.File, faults).Lay(under, YamlText.Parse(recipe.Text, recipe.File));
}
