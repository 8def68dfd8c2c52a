using System.Text.Json;

namespace CloudStruct.Runs;

/// <summary>Results appear whole or not at all: written to a folder beside, then swapped. Files that users added are kept.</summary>
/// <remarks>The swap is two renames. A run killed between them leaves the old results under the name .old; the next
/// run puts them back before it starts.</remarks>
internal sealed class ResultFolder : IDisposable
{
    private readonly FileStream held;
    private bool swapped;

    private ResultFolder(string final, string building, FileStream held)
    {
        Final = final;
        Building = building;
        this.held = held;
    }

    /// <summary>Where the results will be.</summary>
    public string Final { get; }

    /// <summary>Where they are written.</summary>
    public string Building { get; }

    /// <summary>Whether a folder holds results of ours.</summary>
    public static bool IsOurs(string folder)
    {
        string record = Path.Combine(folder, RunRecord.FileName);
        if (!File.Exists(record)) return false;
        try
        {
            using JsonDocument json = JsonDocument.Parse(File.ReadAllBytes(record));
            return json.RootElement.ValueKind == JsonValueKind.Object &&
                json.RootElement.TryGetProperty("tool", out JsonElement tool) && tool.GetString() == RunRecord.Tool;
        }
        catch (Exception e) when (e is JsonException or IOException or InvalidOperationException)
        {
            return false;
        }
    }

    /// <summary>Refuses a place that holds something else; to be called before any work.</summary>
    /// <exception cref="UsageException">The folder is not empty and not ours, or a file stands there.</exception>
    public static void CheckPlace(string final)
    {
        if (File.Exists(final)) throw new UsageException($"--out {Path.GetFileName(final)}: a file of this name exists. Name a folder.");
        if (!Directory.Exists(final) || IsOurs(final) || !Directory.EnumerateFileSystemEntries(final).Any()) return;
        throw new UsageException(
            $"--out {Path.GetFileName(final)}: the folder is not empty and holds no run.json of ours, so nothing in it will be touched. " +
            "Name a new or empty folder, or one with earlier results.");
    }

    /// <summary>Starts to write results.</summary>
    /// <exception cref="MachineException">Another run is writing there, or the folder cannot be made.</exception>
    public static ResultFolder Begin(string final)
    {
        CheckPlace(final);
        string old = final + ".old", building = final + ".new";
        try
        {
            Directory.CreateDirectory(Path.GetDirectoryName(final)!);
            var held = new FileStream(final + ".lock", FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None, 1, FileOptions.DeleteOnClose);
            if (Directory.Exists(old))
            {
                if (Directory.Exists(final)) Directory.Delete(old, recursive: true);
                else Directory.Move(old, final);
            }

            if (Directory.Exists(building)) Directory.Delete(building, recursive: true);
            Directory.CreateDirectory(building);
            return new ResultFolder(final, building, held);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new MachineException($"{Path.GetFileName(final)}: results cannot be written there ({Reason(e)}). Is another run writing to it, or is the folder read-only?", e);
        }
    }

    /// <summary>Puts the new results in place of the old.</summary>
    public void Swap()
    {
        string old = Final + ".old";
        if (Directory.Exists(Final))
        {
            KeepUserFiles();
            Directory.Move(Final, old);
        }

        Directory.Move(Building, Final);
        swapped = true;
        if (Directory.Exists(old)) Directory.Delete(old, recursive: true);
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        if (!swapped && Directory.Exists(Building)) Directory.Delete(Building, recursive: true);
        held.Dispose();
    }

    // Ours are the files that the old run.json lists; whatever else lies there was added by hand.
    private void KeepUserFiles()
    {
        HashSet<string> ours = RunRecord.FilesOf(Final);
        foreach (string file in Directory.EnumerateFiles(Final, "*", SearchOption.AllDirectories))
        {
            string relative = Path.GetRelativePath(Final, file);
            string target = Path.Combine(Building, relative);
            if (ours.Contains(relative.Replace('\\', '/')) || File.Exists(target)) continue;
            Directory.CreateDirectory(Path.GetDirectoryName(target)!);
            File.Copy(file, target);
        }
    }

    private static string Reason(Exception e) => e is UnauthorizedAccessException ? "no permission" : e.GetType().Name;
}
