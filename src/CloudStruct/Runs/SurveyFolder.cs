using CloudStruct.Recipes;
using CloudStruct.Records.Complaints;

namespace CloudStruct.Runs;

/// <summary>A survey on disk: which files it has, found by the rules of the survey folder. Nothing but survey.yaml is read.</summary>
/// <remarks>Folders are never walked recursively, and never left through links; hidden files and folders that hold our
/// run.json are passed over.</remarks>
internal sealed record SurveyFolder
{
    /// <summary>Name of the table of decisions.</summary>
    public const string DecisionsName = "decisions.csv";

    private static readonly string[] CloudEndings = [".las", ".laz", ".ply", ".glb", ".gltf", ".xyz"];
    private static readonly string[] LabelEndings = [".csv", ".geojson", ".gpkg", ".las", ".laz"];

    /// <summary>Folder that relative names count from.</summary>
    public required string Root { get; init; }

    /// <summary>Name of the survey.</summary>
    public required string Name { get; init; }

    /// <summary>What survey.yaml says.</summary>
    public required SurveyNotes Notes { get; init; }

    /// <summary>Clouds, full paths in order of their names.</summary>
    public required string[] Clouds { get; init; }

    /// <summary>Label files.</summary>
    public required string[] Labels { get; init; }

    /// <summary>control/checkpoints.csv when there is one.</summary>
    public required string? Checkpoints { get; init; }

    /// <summary>field/readings.csv when there is one.</summary>
    public string? Readings { get; init; }

    /// <summary>The line that fixes chainage when there is one.</summary>
    public required string? Baseline { get; init; }

    /// <summary>Files of zones that the user drew.</summary>
    public string[] Zones { get; init; } = [];

    /// <summary>decisions.csv when there is one.</summary>
    public string? Decisions { get; init; }

    /// <summary>survey.yaml when there is one.</summary>
    public required string? NotesFile { get; init; }

    /// <summary>Where results go unless --out says otherwise.</summary>
    public required string UsualOut { get; init; }

    /// <summary>Files that were passed over, with the reason; for the remarks.</summary>
    public required string[] PassedOver { get; init; }

    /// <summary>All files that a run reads, in order.</summary>
    public IEnumerable<string> Files =>
        new[] { NotesFile, Decisions, Checkpoints, Readings, Baseline }.OfType<string>().Concat(Zones).Concat(Labels).Concat(Clouds);

    /// <summary>Name without the user's folders, with forward slashes.</summary>
    public string Relative(string file) => Path.GetRelativePath(Root, file).Replace('\\', '/');

    /// <summary>Finds out what a folder or file holds.</summary>
    /// <exception cref="InputException">Nothing there to measure.</exception>
    public static SurveyFolder Open(string path)
    {
        string full = Path.TrimEndingDirectorySeparator(Path.GetFullPath(path));
        if (File.Exists(full)) return OfFile(full);
        string shown = Path.GetFileName(full);
        if (!Directory.Exists(full))
        {
            throw new InputException(path, "there is no such folder or file", "nothing at this path", "Check the spelling; a survey is a folder with clouds, or one cloud file");
        }

        if (ResultFolder.IsOurs(full))
        {
            throw new InputException(shown, "this folder holds results, not a survey", "our run.json", "Name the survey folder that the results were made from");
        }

        var passed = new List<string>();
        string clouds = Child(full, "clouds") ?? full;
        string[] found = FilesIn(full, clouds, CloudEndings, passed, other: clouds == full ? null : "is not a cloud that we read");
        if (found.Length == 0)
        {
            throw new InputException(
                shown,
                "no cloud was found",
                clouds == full ? "no file ending in .las, .laz or .ply directly in the folder, and no folder 'clouds'" : "no file ending in .las, .laz or .ply in the folder 'clouds'",
                "Put the clouds into a folder 'clouds' inside the survey (folders further down are not searched)");
        }

        string? notesFile = Present(full, Path.Combine(full, "survey.yaml"), passed);
        SurveyNotes notes = notesFile is null ? new SurveyNotes() : ReadNotes(notesFile);
        return new SurveyFolder
        {
            Root = full,
            Name = notes.Name ?? shown,
            Notes = notes,
            Clouds = found,
            Labels = Child(full, "labels") is { } l ? FilesIn(full, l, LabelEndings, passed, other: "is not a label file that we read") : [],
            Checkpoints = Present(full, Path.Combine(full, "control", "checkpoints.csv"), passed),
            Readings = Present(full, Path.Combine(full, "field", "readings.csv"), passed),
            Baseline = Child(full, "baseline") is { } b ? FilesIn(full, b, [".geojson"], passed, other: null).FirstOrDefault() : null,
            Zones = Child(full, "zones") is { } z ? FilesIn(full, z, [".geojson"], passed, other: "holds no zones that we read") : [],
            NotesFile = notesFile,
            Decisions = Present(full, Path.Combine(full, DecisionsName), passed),
            UsualOut = Path.Combine(full, "results"),
            PassedOver = [.. passed],
        };
    }

    private static SurveyFolder OfFile(string full) => new()
    {
        Root = Path.GetDirectoryName(full)!,
        Name = Path.GetFileNameWithoutExtension(full),
        Notes = new SurveyNotes(),
        Clouds = [full],
        Labels = [],
        Checkpoints = null,
        Baseline = null,
        NotesFile = null,
        UsualOut = Path.Combine(Path.GetDirectoryName(full)!, Path.GetFileNameWithoutExtension(full) + "-results"),
        PassedOver = [],
    };

    private static SurveyNotes ReadNotes(string file)
    {
        var faults = new List<SettingFault>();
        SurveyNotes notes = new SurveyNotesReader(faults).Read(YamlText.Parse(File.ReadAllText(file), "survey.yaml"));
        RecipeShelf.Refuse(faults);
        return notes;
    }

    private static string? Child(string folder, string name) =>
        Directory.GetDirectories(folder).FirstOrDefault(d => string.Equals(Path.GetFileName(d), name, StringComparison.OrdinalIgnoreCase)) is { } found &&
        StaysInside(folder, new DirectoryInfo(found)) ? found : null;

    private static string? Present(string root, string file, List<string> passed)
    {
        if (!File.Exists(file)) return null;
        if (StaysInside(root, new FileInfo(file))) return file;
        passed.Add($"{Path.GetFileName(file)} is a link out of the survey and was not followed.");
        return null;
    }

    private static string[] FilesIn(string root, string folder, string[] endings, List<string> passed, string? other)
    {
        if (ResultFolder.IsOurs(folder)) return [];
        var found = new List<string>();
        foreach (string file in Directory.GetFiles(folder).Order(StringComparer.Ordinal))
        {
            string name = Path.GetFileName(file);
            if (name.StartsWith('.') || (File.GetAttributes(file) & FileAttributes.Hidden) != 0) continue;
            if (!endings.Contains(Path.GetExtension(name).ToLowerInvariant(), StringComparer.Ordinal))
            {
                if (other is not null) passed.Add($"{name} {other} and was passed over.");
            }
            else if (StaysInside(root, new FileInfo(file)))
            {
                found.Add(file);
            }
            else
            {
                passed.Add($"{name} is a link out of the survey and was not followed.");
            }
        }

        return [.. found];
    }

    // A link may stay inside the survey; a broken or circular link leads nowhere and is not followed either.
    private static bool StaysInside(string root, FileSystemInfo entry)
    {
        if (entry.LinkTarget is null) return true;
        try
        {
            return entry.ResolveLinkTarget(returnFinalTarget: true) is { Exists: true } target &&
                Path.GetFullPath(target.FullName).StartsWith(root + Path.DirectorySeparatorChar, StringComparison.Ordinal);
        }
        catch (IOException)
        {
            return false;
        }
    }
}
