using System.Runtime.InteropServices;
using System.Text.Json;
using static System.FormattableString;

namespace CloudStruct.Benchmarks;

/// <summary>Puts the results of our kernels and of the libraries on one file side by side.</summary>
internal static class AgainstLibraries
{
    /// <summary>Name of our own lines.</summary>
    public const string Ours = "ours";

    /// <summary>Kernels in the order of the table, with what is asked of the ratio.</summary>
    private static readonly (string Kernel, string What, double Wanted)[] Kernels =
    [
        ("knn16", "16 nearest neighbours", 2), ("radius5cm", "neighbours within 5 cm, counted", 2), ("normals16", "normals of 16 neighbours", 3),
        ("voxel4cm", "one point per 4 cm cube", 1), ("outliers", "stray points dropped", 3), ("faces", "faces, neighbourhoods and normals included", 3),
        ("cut", "two-class graph cut, neighbours included", 5), ("read_ply", "binary PLY from the page cache", 1),
    ];

    /// <summary>Prints the table from the lines that all programs wrote to lines.jsonl and the arrays beside it.</summary>
    public static int Compare(string cloud, string folder)
    {
        var truth = new BlockyTruth(cloud);
        var lines = File.ReadLines(Path.Combine(folder, "lines.jsonl")).Where(l => l.StartsWith('{')).Select(l => JsonSerializer.Deserialize<Line>(l, JsonSerializerOptions.Web)!).ToArray();
        Console.WriteLine(Invariant($"{Path.GetFileName(cloud)}: {truth.Count} points, {truth.Plane.Distinct().Count(p => p > 0)} planes; fastest of {lines.Count(l => l.Library == Ours && l.Kernel == "knn16")} runs each, alternating; {Environment.ProcessorCount} cores\n"));
        Console.WriteLine("| kernel | ours [s] | best library [s] | ratio | wanted | quality, ours | quality, library |\n|---|---|---|---|---|---|---|");
        foreach ((string kernel, string what, double wanted) in Kernels)
        {
            (string Library, double Seconds)[] best = [.. lines.Where(l => l.Kernel == kernel).GroupBy(l => l.Library).Select(g => (g.Key, g.Min(l => l.Seconds))).OrderBy(g => g.Item2)];
            double ours = best.Where(b => b.Library == Ours).Select(b => b.Seconds).FirstOrDefault(double.NaN);
            foreach ((string library, double seconds) in best.Where(b => b.Library != Ours))
            {
                Console.WriteLine(Invariant(
                    $"| {what} | {ours:0.000} | {seconds:0.000} {library} | {seconds / ours:0.0} | {wanted:0} | {Quality(truth, folder, Ours, kernel)} | {Quality(truth, folder, library, kernel)} |"));
            }
        }

        return 0;
    }

    private static string Quality(BlockyTruth truth, string folder, string library, string kernel)
    {
        string file = Path.Combine(folder, library + "." + kernel + ".raw");
        if (!File.Exists(file)) return "";
        byte[] raw = File.ReadAllBytes(file);
        switch (kernel)
        {
            case "knn16":
                float[] last = MemoryMarshal.Cast<byte, float>(raw).ToArray();
                return Invariant($"mean distance of the last {last.Average(d => Math.Sqrt(d)) * 1000:0.0000} mm");
            case "radius5cm":
                return Invariant($"{MemoryMarshal.Cast<byte, int>(raw).ToArray().Average():0.0000} on average");
            case "normals16":
                (double median, double p95) = truth.NormalErrors(MemoryMarshal.Cast<byte, float>(raw));
                return Invariant($"{median:0.00} / {p95:0.0} deg");
            case "faces":
                FaceQuality q = truth.Faces(MemoryMarshal.Cast<byte, int>(raw));
                return Invariant($"recall {q.Recall:0.000} of {q.Planes}, precision {q.Precision:0.000}, {q.MedianDeg:0.00} / {q.P95Deg:0.00} deg");
            case "outliers":
                double strays = 0, dropped = 0, lost = 0;
                for (int i = 0; i < truth.Count; i++)
                {
                    bool stray = truth.Plane[i] == 0;
                    if (stray) strays++;
                    if (raw[i] == 0) (dropped, lost) = stray ? (dropped + 1, lost) : (dropped, lost + 1);
                }

                return Invariant($"{dropped / strays:0.000} of the strays, {lost / (truth.Count - strays):0.0000} of the others");
            case "cut":
                return Invariant($"{Enumerable.Range(0, truth.Count).Average(i => raw[i] == truth.Side[i] ? 1.0 : 0):0.0000} right");
            default:
                return "";
        }
    }

    private sealed record Line(string Library, string Kernel, double Seconds, string Note);
}
