using CloudStruct.Formats.Las;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Whole.Kit;

/// <summary>Small simulated outcrops as files.</summary>
internal static class Clouds
{
    /// <summary>Writes an outcrop of a named plan as LAS.</summary>
    /// <param name="flight">The same rock flown again.</param>
    /// <param name="turnDeg">The whole model turned clockwise about the vertical through its first point.</param>
    public static SimulatedOutcrop Write(string path, string plan, ulong seed, int points, int flight = 0, double turnDeg = 0)
    {
        SimulatedOutcrop rock = Outcrop.Make(OutcropPlan.ByName(plan), seed, points, flight: flight);
        if (turnDeg != 0) Turn(rock, turnDeg);
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

    private static void Turn(SimulatedOutcrop rock, double turnDeg)
    {
        (double s, double c) = Math.SinCos(turnDeg * Math.PI / 180);
        (double x0, double y0) = (rock.Origin.X, rock.Origin.Y);
        for (int i = 0; i < rock.Count; i++)
        {
            (double x, double y) = (rock.X[i] - x0, rock.Y[i] - y0);
            (rock.X[i], rock.Y[i]) = (x0 + (c * x) + (s * y), y0 + (c * y) - (s * x));
        }
    }

    private static ushort[] Wide(byte[] values) => [.. values.Select(v => (ushort)(v << 8))];
}
