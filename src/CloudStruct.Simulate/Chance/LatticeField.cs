using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate.Chance;

/// <summary>A smooth random field of mean 0 and variance 1 everywhere in space.</summary>
/// <remarks>Two lattices of independent normal numbers, turned against each other and against the axes so that no lattice
/// direction shows, each interpolated over the eight corners of a cell and divided by the root of the sum of squared
/// weights, which makes the variance 1 at every place and not only at the corners.</remarks>
internal sealed class LatticeField
{
    /// <summary>Cell over the distance at which the correlation has fallen to 1/e: from integrating the weights over all
    /// places of a cell and all directions, in which it differs by less than two parts in a hundred.</summary>
    private const double LengthsPerCell = 1.224;

    private const int TableSize = 4096;
    private static readonly float[] Normals = MakeNormals();
    private readonly ulong firstKey, secondKey;
    private readonly double scale;

    /// <summary>A field of its own for a seed and a key.</summary>
    /// <param name="seed">Seed of the outcrop.</param>
    /// <param name="key">A constant per use.</param>
    /// <param name="lengthM">Distance at which the correlation has fallen to 1/e [m].</param>
    public LatticeField(ulong seed, ulong key, double lengthM)
    {
        var dice = new Dice(seed, Purpose.Noise, key);
        firstKey = dice.Bits();
        secondKey = dice.Bits();
        scale = 1 / (LengthsPerCell * lengthM);
    }

    /// <summary>Value at a place: normal with mean 0 and variance 1.</summary>
    public double At(Vec3 p)
    {
        double x = p.X * scale, y = p.Y * scale, z = p.Z * scale;
        // Rows of two rotation matrices with simple rational entries: (2,3,6)/7 and (1,4,8)/9 families.
        double first = Lattice(
            ((2 * x) + (3 * y) + (6 * z)) / 7, ((3 * x) - (6 * y) + (2 * z)) / 7, ((6 * x) + (2 * y) - (3 * z)) / 7, firstKey);
        double second = Lattice(
            ((x) - (4 * y) + (8 * z)) / 9, ((8 * x) + (4 * y) + z) / 9, ((4 * x) - (7 * y) - (4 * z)) / 9, secondKey);
        return (first + second) * 0.70710678118654752;
    }

    private static double Lattice(double x, double y, double z, ulong key)
    {
        double fx = Math.Floor(x), fy = Math.Floor(y), fz = Math.Floor(z);
        double u = Smooth(x - fx), v = Smooth(y - fy), w = Smooth(z - fz);
        ulong ix = (ulong)(long)fx * 0x8DA6B343D9D3A58DUL, iy = (ulong)(long)fy * 0xD8163841C2B2AE3DUL, iz = (ulong)(long)fz * 0xCB1AB31F165667B1UL;
        ulong jx = ix + 0x8DA6B343D9D3A58DUL, jy = iy + 0xD8163841C2B2AE3DUL, jz = iz + 0xCB1AB31F165667B1UL;
        double u0 = 1 - u, v0 = 1 - v, w0 = 1 - w;
        double sum = (w0 * ((v0 * ((u0 * Corner(ix, iy, iz, key)) + (u * Corner(jx, iy, iz, key))))
                          + (v * ((u0 * Corner(ix, jy, iz, key)) + (u * Corner(jx, jy, iz, key))))))
                   + (w * ((v0 * ((u0 * Corner(ix, iy, jz, key)) + (u * Corner(jx, iy, jz, key))))
                         + (v * ((u0 * Corner(ix, jy, jz, key)) + (u * Corner(jx, jy, jz, key))))));
        return sum / Math.Sqrt(((u * u) + (u0 * u0)) * ((v * v) + (v0 * v0)) * ((w * w) + (w0 * w0)));
    }

    private static double Smooth(double f) => f * f * (3 - (2 * f));

    private static float Corner(ulong x, ulong y, ulong z, ulong key)
    {
        ulong h = (x ^ (y << 21 | y >> 43) ^ (z << 42 | z >> 22)) + key;
        h = (h ^ (h >> 32)) * 0xD6E8FEB86659FD93UL;
        h = (h ^ (h >> 32)) * 0xD6E8FEB86659FD93UL;
        return Normals[(int)(h >> 52)];
    }

    /// <summary>Normal numbers from a fixed stream, brought to mean 0 and variance 1 exactly.</summary>
    private static float[] MakeNormals()
    {
        var dice = new Dice(20260101, Purpose.Noise);
        var values = new double[TableSize];
        for (int i = 0; i < TableSize; i++) values[i] = dice.Normal();
        double mean = values.Average(), sigma = Math.Sqrt(values.Average(v => (v - mean) * (v - mean)));
        return [.. values.Select(v => (float)((v - mean) / sigma))];
    }
}
