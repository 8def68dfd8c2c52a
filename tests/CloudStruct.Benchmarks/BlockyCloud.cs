using System.Buffers.Binary;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Benchmarks;

/// <summary>Blocks with plane sides, sunk into a plane ground: the cloud on which kernels are held against libraries.</summary>
/// <remarks>Boxes 0.56 to 0.81 m wide lie anyhow, one in each cell of a square grid, each with the sides that do not face down. Points lie
/// 2 cm apart by lot within their small square, 5 mm of independent noise along the normal, one in two hundred up to 0.3 m off. The
/// middle fifth of the field is the second class; its shade differs by as much as the noise of the shade.</remarks>
internal static class BlockyCloud
{
    /// <summary>Point spacing [m].</summary>
    public const double SpacingM = 0.02;

    private const double CellM = 1.4, NoiseM = 0.005, StrayShare = 0.005, StrayM = 0.3;

    /// <summary>Writes about so many points as binary PLY: x y z, true normal, shade, plane (0 for strays), class.</summary>
    public static void Write(string path, int points)
    {
        var lots = new Random(20260101);
        // A cell shows about 1.5 square metres of ground and 2 of a block.
        int cells = Math.Max(1, (int)Math.Round(Math.Sqrt(points * SpacingM * SpacingM / 3.5)));
        var rows = new List<byte[]>();
        double half = cells * CellM / 2;
        Box[] boxes = new Box[cells * cells];
        for (int k = 0; k < boxes.Length; k++) boxes[k] = Box.Draw(lots, ((k % cells) + 0.5) * CellM - half, ((k / cells) + 0.5) * CellM - half);
        int plane = 1;
        Rectangle(new(0, 0, 0), new(half, 0, 0), new(0, half, 0), new(0, 0, 1), plane, p => !boxes[Cell(p.X, half, cells) + (cells * Cell(p.Y, half, cells))].Holds(p));
        foreach (Box box in boxes)
        {
            foreach ((Vec3 middle, Vec3 u, Vec3 v, Vec3 n) in box.Sides())
            {
                if (n.Z < -0.2) continue;
                Rectangle(middle, u, v, n, ++plane, p => p.Z > 0);
            }
        }

        using FileStream file = File.Create(path);
        file.Write(System.Text.Encoding.ASCII.GetBytes(Invariant(
            $"ply\nformat binary_little_endian 1.0\nelement vertex {rows.Count}\nproperty float x\nproperty float y\nproperty float z\nproperty float nx\nproperty float ny\nproperty float nz\nproperty float shade\nproperty int plane\nproperty uchar side\nend_header\n")));
        // Files of surveys are not sorted by face: rows by lot within stretches, as the pixels of many photographs come.
        for (int from = 0; from < rows.Count; from += 4096) lots.Shuffle(System.Runtime.InteropServices.CollectionsMarshal.AsSpan(rows).Slice(from, Math.Min(4096, rows.Count - from)));
        foreach (byte[] row in rows) file.Write(row);
        Console.WriteLine(Invariant($"{path}: {rows.Count} points, {plane} planes"));

        void Rectangle(Vec3 middle, Vec3 u, Vec3 v, Vec3 n, int number, Func<Vec3, bool> there)
        {
            int across = (int)(2 * u.Length / SpacingM), along = (int)(2 * v.Length / SpacingM);
            for (int i = 0; i < across; i++)
            {
                for (int j = 0; j < along; j++)
                {
                    Vec3 p = middle + (u * ((2 * (i + lots.NextDouble()) / across) - 1)) + (v * ((2 * (j + lots.NextDouble()) / along) - 1));
                    if (!there(p)) continue;
                    bool stray = lots.NextDouble() < StrayShare;
                    bool second = Math.Abs(p.X) < half / 5;
                    Vec3 shown = p + (n * (stray ? StrayM * ((2 * lots.NextDouble()) - 1) : NoiseM * Normal()));
                    var row = new byte[33];
                    float[] values = [(float)shown.X, (float)shown.Y, (float)shown.Z, (float)n.X, (float)n.Y, (float)n.Z, (float)((second ? 0.5 : -0.5) + Normal())];
                    for (int k = 0; k < values.Length; k++) BinaryPrimitives.WriteSingleLittleEndian(row.AsSpan(4 * k), values[k]);
                    BinaryPrimitives.WriteInt32LittleEndian(row.AsSpan(28), stray ? 0 : number);
                    row[32] = second ? (byte)1 : (byte)0;
                    rows.Add(row);
                }
            }
        }

        double Normal() => Math.Sqrt(-2 * Math.Log(1 - lots.NextDouble())) * Math.Cos(2 * Math.PI * lots.NextDouble());
    }

    private static int Cell(double x, double half, int cells) => Math.Clamp((int)((x + half) / CellM), 0, cells - 1);

    private sealed record Box(Vec3 Middle, Vec3 A, Vec3 B, Vec3 C, double HalfA, double HalfB, double HalfC)
    {
        public static Box Draw(Random lots, double x, double y)
        {
            Vec3 a = Direction(lots), b = a.Cross(Direction(lots)).Unit(), c = a.Cross(b);
            double HalfEdge() => 0.28 + (0.125 * lots.NextDouble());
            return new(new(x, y, 0.1 + (0.2 * lots.NextDouble())), a, b, c, HalfEdge(), HalfEdge(), HalfEdge());
        }

        public bool Holds(Vec3 p)
        {
            Vec3 d = p - Middle;
            return Math.Abs(d.Dot(A)) < HalfA && Math.Abs(d.Dot(B)) < HalfB && Math.Abs(d.Dot(C)) < HalfC;
        }

        public IEnumerable<(Vec3 Middle, Vec3 U, Vec3 V, Vec3 Normal)> Sides()
        {
            foreach (int sign in new[] { 1, -1 })
            {
                yield return (Middle + (A * (sign * HalfA)), B * HalfB, C * HalfC, A * sign);
                yield return (Middle + (B * (sign * HalfB)), A * HalfA, C * HalfC, B * sign);
                yield return (Middle + (C * (sign * HalfC)), A * HalfA, B * HalfB, C * sign);
            }
        }

        private static Vec3 Direction(Random lots)
        {
            double z = (2 * lots.NextDouble()) - 1, turn = 2 * Math.PI * lots.NextDouble(), level = Math.Sqrt(1 - (z * z));
            return new(level * Math.Cos(turn), level * Math.Sin(turn), z);
        }
    }
}
