using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Sets;

/// <summary>Faces kept by place, each reaching as far as its size lets it, to be asked which of them a smaller one fits.</summary>
/// <remarks>Twenty thousand faces make two hundred million pairs; by place a few million are left.</remarks>
internal sealed class NearFaces(Face[] faces, double? reachM)
{
    // Cells as wide as the usual reach; the few faces that reach farther are asked by everyone.
    private const double CellM = 8;

    // However uncertain, faces this far from parallel are not called one plane.
    private static readonly double CosineOfFarthest = Math.Cos(10 * Math.PI / 180);

    private readonly Dictionary<(int X, int Y, int Z), List<int>> cells = [];
    private readonly List<int> far = [];
    private readonly List<int> kept = [];

    /// <summary>Keeps a face.</summary>
    public void Add(int face)
    {
        int number = kept.Count;
        kept.Add(face);
        if (JointPlanes.ReachOf(faces[face], reachM) > CellM)
        {
            far.Add(number);
            return;
        }

        (int, int, int) cell = Cell(faces[face].Middle);
        if (!cells.TryGetValue(cell, out List<int>? own)) cells[cell] = own = [];
        own.Add(number);
    }

    /// <summary>The kept face (by order of keeping) with the least misfit below a limit; the earlier on a tie; -1 when there is none.</summary>
    public int Best(int face, Func<int, double> misfit, double limit)
    {
        (int best, double least) = (-1, limit);
        foreach (int f in far) Try(f);
        (int x, int y, int z) = Cell(faces[face].Middle);
        for (int i = x - 1; i <= x + 1; i++)
        {
            for (int j = y - 1; j <= y + 1; j++)
            {
                for (int k = z - 1; k <= z + 1; k++)
                {
                    if (!cells.TryGetValue((i, j, k), out List<int>? own)) continue;
                    foreach (int f in own) Try(f);
                }
            }
        }

        return best;

        void Try(int number)
        {
            if (Math.Abs(faces[kept[number]].Normal.Dot(faces[face].Normal)) < CosineOfFarthest) return;
            double m = misfit(kept[number]);
            if (m < least || (m == least && best >= 0 && number < best)) (best, least) = (number, m);
        }
    }

    private static (int X, int Y, int Z) Cell(Vec3 p) =>
        ((int)Math.Floor(p.X / CellM), (int)Math.Floor(p.Y / CellM), (int)Math.Floor(p.Z / CellM));
}
