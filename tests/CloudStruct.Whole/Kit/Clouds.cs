using CloudStruct.Formats.Las;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Whole.Kit;

/// <summary>Small simulated outcrops as files.</summary>
internal static class Clouds
{
    /// <summary>Writes an outcrop of a named plan as LAS.</summary>
    public static SimulatedOutcrop Write(string path, string plan, ulong seed, int points)
    {
        SimulatedOutcrop rock = Outcrop.Make(OutcropPlan.ByName(plan), seed, points);
        Directory.CreateDirectory(Path.GetDirectoryName(path)!);
        bool colour = rock.Red.Length > 0;
        var low = new Vec3(rock.X.Min(), rock.Y.Min(), rock.Z.Min());
        var high = new Vec3(rock.X.Max(), rock.Y.Max(), rock.Z.Max());
        using var las = new LasWriter(path, new LasLayout { HasColour = colour, Wkt = rock.Crs.Wkt, Date = new DateOnly(2026, 5, 31) }.Around(low, high));
        las.Write(new LasBatch
        {
            Count = rock.Count,
            X = rock.X,
            Y = rock.Y,
            Z = rock.Z,
            Red = colour ? Wide(rock.Red) : default,
            Green = colour ? Wide(rock.Green) : default,
            Blue = colour ? Wide(rock.Blue) : default,
            Class = new byte[rock.Count],
        });
        return rock;
    }

    private static ushort[] Wide(byte[] values) => [.. values.Select(v => (ushort)(v << 8))];
}
