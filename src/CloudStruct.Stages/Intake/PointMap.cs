using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Intake;

/// <summary>From file coordinates to map coordinates in metres: axes first, then units, then the offset.</summary>
internal sealed class PointMap
{
    private readonly int ix, iy, iz;
    private readonly double sx, sy, sz;
    private readonly Vec3 offset;

    /// <summary>A map; complains about axes that are no order of x, y and z.</summary>
    /// <param name="axes">"x y z", "x -z y", ...: which file axis becomes east, north, up.</param>
    /// <param name="horizontalUnitM">Metres per file unit, east and north.</param>
    /// <param name="verticalUnitM">Metres per file unit, up.</param>
    /// <param name="offsetM">Added at the end [m].</param>
    public PointMap(string axes, double horizontalUnitM, double verticalUnitM, Vec3 offsetM)
    {
        string[] words = axes.Split([' ', ',', '\t'], StringSplitOptions.RemoveEmptyEntries);
        if (words.Length != 3) throw BadAxes(axes);
        (ix, sx) = Axis(words[0], axes);
        (iy, sy) = Axis(words[1], axes);
        (iz, sz) = Axis(words[2], axes);
        if (ix == iy || iy == iz || ix == iz) throw BadAxes(axes);
        int turns = (ix == 0 && iy == 1) || (ix == 1 && iy == 2) || (ix == 2 && iy == 0) ? 1 : -1;
        Mirrors = turns * sx * sy * sz < 0;
        sx *= horizontalUnitM;
        sy *= horizontalUnitM;
        sz *= verticalUnitM;
        offset = offsetM;
    }

    /// <summary>True when the axes turn the model into its mirror image.</summary>
    public bool Mirrors { get; }

    /// <summary>Metres per file unit along the wider of the two units.</summary>
    public double UnitM => Math.Max(Math.Abs(sx), Math.Abs(sz));

    /// <summary>Map coordinates [m].</summary>
    public Vec3 this[double x, double y, double z] => new(
        (sx * Pick(ix, x, y, z)) + offset.X, (sy * Pick(iy, x, y, z)) + offset.Y, (sz * Pick(iz, x, y, z)) + offset.Z);

    private static double Pick(int axis, double x, double y, double z) => axis == 0 ? x : axis == 1 ? y : z;

    private static (int Axis, double Sign) Axis(string word, string axes)
    {
        double sign = word[0] == '-' ? -1 : 1;
        return word.TrimStart('+', '-').ToLowerInvariant() switch
        {
            "x" => (0, sign),
            "y" => (1, sign),
            "z" => (2, sign),
            _ => throw BadAxes(axes),
        };
    }

    private static InputException BadAxes(string axes) => new(
        "survey.yaml, axes",
        "the axes are not an order of x, y and z",
        $"\"{axes}\"",
        "Write which file axis points east, north and up, for example \"x y z\" or, for a model with y up, \"x -z y\"");
}
