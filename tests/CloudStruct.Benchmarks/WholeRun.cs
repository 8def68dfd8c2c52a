using System.Diagnostics;
using System.Text.Json;
using CloudStruct.Formats.Las;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;
using static System.FormattableString;

namespace CloudStruct.Benchmarks;

/// <summary>A survey like the demonstration, of any size at the same density, measured by the program as a child process.</summary>
internal static class WholeRun
{
    /// <summary>Makes the survey, measures it some times with nothing stored, prints wall time and peak memory.</summary>
    public static int Measure(int points, int runs)
    {
        string folder = Directory.CreateTempSubdirectory("whole-").FullName;
        try
        {
            Write(Path.Combine(folder, "rock.las"), points);
            for (int run = 1; run <= runs; run++)
            {
                var clock = Stopwatch.StartNew();
                var info = new ProcessStartInfo("dotnet") { WorkingDirectory = folder, RedirectStandardOutput = true };
                foreach (string a in new[] { Path.Combine(AppContext.BaseDirectory, "cloudstruct.dll"), "measure", ".", "--fresh", "--profile" }) info.ArgumentList.Add(a);
                using Process child = Process.Start(info)!;
                child.StandardOutput.ReadToEnd();
                child.WaitForExit();
                using JsonDocument record = JsonDocument.Parse(File.ReadAllText(Path.Combine(folder, "results", "run.json")));
                double peak = record.RootElement.GetProperty("timing").GetProperty("memory_peak_gib").GetDouble();
                Console.WriteLine(Invariant(
                    $"run {run}: {points / 1e6:0.0} M points, {clock.Elapsed.TotalSeconds:0.0} s from files to results, peak memory {peak:0.00} GiB, exit code {child.ExitCode}, {Environment.ProcessorCount} cores"));
            }

            return 0;
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static void Write(string path, int points)
    {
        OutcropPlan plan = OutcropPlan.ByName("demo");
        double scale = Math.Sqrt((double)points / plan.Points);
        SimulatedOutcrop rock = Outcrop.Make(plan with { Points = points, LengthM = plan.LengthM * scale, BreadthM = plan.BreadthM * scale }, 77);
        using var las = new LasWriter(path, new LasLayout { Wkt = rock.Crs.Wkt }.Around(
            new Vec3(rock.X.Min(), rock.Y.Min(), rock.Z.Min()), new Vec3(rock.X.Max(), rock.Y.Max(), rock.Z.Max())));
        las.Write(new LasBatch { Count = rock.Count, X = rock.X, Y = rock.Y, Z = rock.Z, Red = Wide(rock.Red), Green = Wide(rock.Green), Blue = Wide(rock.Blue), Class = new byte[rock.Count] });
    }

    private static ushort[] Wide(byte[] values) => [.. values.Select(v => (ushort)(v << 8))];
}
