using CloudStruct.Formats.Las;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Simulate;

namespace CloudStruct.Runs;

/// <summary>Writes the demonstration survey as a user would have it on disk.</summary>
internal static class DemoFolder
{
    private const string NotesName = "survey.yaml";

    /// <summary>Writes it into a folder that is new, empty, or holds an earlier demonstration survey.</summary>
    /// <exception cref="UsageException">The folder holds something else.</exception>
    public static void Write(string folder, ulong seed, int threads, CancellationToken stop)
    {
        string full = Path.GetFullPath(folder);
        string mark = DemoSurvey.Mark;
        if (File.Exists(full)) throw new UsageException($"demo {folder}: a file of this name exists. Name a folder.");
        if (Directory.Exists(full) && Directory.EnumerateFileSystemEntries(full).Any() && !IsDemo(full, mark))
        {
            throw new UsageException($"demo {folder}: the folder is not empty and holds no demonstration survey, so nothing in it will be touched. Name a new or empty folder.");
        }

        stop.ThrowIfCancellationRequested();
        DemoSurvey survey = DemoSurvey.Make(seed, threads: threads);
        DateOnly date = DateOnly.ParseExact(DemoSurvey.FlightDate, "yyyy-MM-dd", System.Globalization.CultureInfo.InvariantCulture);
        foreach (DemoTile tile in survey.Tiles) WriteTile(Path.Combine(full, tile.Path), tile.Source, date, stop);
        foreach (DemoFile file in survey.Files)
        {
            Directory.CreateDirectory(Path.GetDirectoryName(Path.Combine(full, file.Path))!);
            File.WriteAllText(Path.Combine(full, file.Path), file.Text);
        }
    }

    private static bool IsDemo(string folder, string mark)
    {
        string notes = Path.Combine(folder, NotesName);
        return File.Exists(notes) && File.ReadLines(notes).FirstOrDefault() == mark;
    }

    private static void WriteTile(string path, IPointSource source, DateOnly date, CancellationToken stop)
    {
        Directory.CreateDirectory(Path.GetDirectoryName(path)!);
        CloudHeader h = source.Header;
        Vec3 min = h.Min!.Value, max = h.Max!.Value;
        using var las = new LasWriter(path, new LasLayout { HasColour = h.HasColour, Wkt = h.Crs.Wkt, Epsg = h.Crs.Epsg, Date = date }.Around(min, max));
        foreach (SourceBlock block in source.Read(stop))
        {
            using (block)
            {
                las.Write(new LasBatch { Count = block.Count, X = block.X, Y = block.Y, Z = block.Z, Red = block.Red, Green = block.Green, Blue = block.Blue, Class = block.Class });
            }
        }
    }
}
