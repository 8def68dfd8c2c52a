using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Intake;

/// <summary>Collects all points of a few hundred small cubes spread over a survey, to learn the spacing at full density.</summary>
internal sealed class LocalCubes
{
    private const int MostCubes = 200;
    private const int MostInCube = 3000;
    private const double EdgeSpacings = 20;
    private const double RimSpacings = 4;
    private const int ShortBits = 13;

    private readonly double guessM;
    private readonly double edgeM;
    private readonly bool[] maybe = new bool[1 << ShortBits];   // false: surely in no cube
    private readonly Dictionary<(int X, int Y, int Z), List<Vec3>> cubes = [];

    /// <summary>Cubes about some of the given places.</summary>
    /// <param name="seeds">Places in the cloud, local [m].</param>
    /// <param name="guessM">Rough spacing [m].</param>
    public LocalCubes(Vec3[] seeds, double guessM)
    {
        this.guessM = guessM;
        edgeM = EdgeSpacings * guessM;
        int step = Math.Max(1, seeds.Length / MostCubes);
        for (int i = 0; i < seeds.Length && cubes.Count < MostCubes; i += step) cubes[CubeOf(seeds[i])] = [];
        foreach ((int X, int Y, int Z) cube in cubes.Keys) maybe[Short(cube)] = true;
    }

    /// <summary>Takes what of a block lies in a cube.</summary>
    public void Add(PointBlock block)
    {
        Span<float> x = block.X, y = block.Y, z = block.Z;
        for (int i = 0; i < block.Count; i++)
        {
            var p = new Vec3(x[i], y[i], z[i]);
            if (!maybe[Short(CubeOf(p))]) continue;
            if (cubes.TryGetValue(CubeOf(p), out List<Vec3>? cube) && cube.Count < MostInCube) cube.Add(p);
        }
    }

    /// <summary>Median spacing in the cubes [m], the points near their walls left out; 0 when it cannot be told.</summary>
    public double SpacingM(int threads, CancellationToken stop)
    {
        // A full cube was cut off by number, not by place: its density would still be right only by luck.
        Vec3[] places = [.. cubes.OrderBy(c => c.Key).Where(c => c.Value.Count < MostInCube).SelectMany(c => c.Value)];
        return InputSpacing.Of(places, guessM, Central, threads, stop);
    }

    private bool Central(Vec3 p) => Central(p.X) && Central(p.Y) && Central(p.Z);

    private bool Central(double v)
    {
        double inCube = v - (Math.Floor(v / edgeM) * edgeM);
        return inCube > RimSpacings * guessM && inCube < edgeM - (RimSpacings * guessM);
    }

    private static int Short((int X, int Y, int Z) cube) =>
        unchecked((int)((((uint)cube.X * 0x9E3779B1u) ^ ((uint)cube.Y * 0x85EBCA77u) ^ ((uint)cube.Z * 0xC2B2AE3Du)) >> (32 - ShortBits)));

    private (int X, int Y, int Z) CubeOf(Vec3 p) =>
        ((int)Math.Floor(p.X / edgeM), (int)Math.Floor(p.Y / edgeM), (int)Math.Floor(p.Z / edgeM));
}
