using CloudStruct.Records.Points;

namespace CloudStruct.Formats.Meshes;

/// <summary>Points spread over a mesh in proportion to area, the same each time.</summary>
/// <remarks>Samples stand at even steps of cumulative area, so that each triangle gets its share to within one; inside a
/// triangle they follow the additive sequence with the two-dimensional golden ratio (M. Roberts 2018), shifted by a hash
/// of the triangle's number and folded over its diagonal. No stream of random numbers: triangle and place decide.</remarks>
internal static class MeshSampler
{
    // 1/g and 1/g^2 where g^3 = g + 1.
    private const double StepU = 0.7548776662466927, StepV = 0.5698402909980532;

    // Edges looked at for the median: every k-th where there are more.
    private const int MostEdges = 1_000_000;

    /// <summary>Samples wanted for a mesh of an area.</summary>
    public static long Wanted(TriangleMesh mesh, double area, MeshSampling sampling)
    {
        double spacing = sampling.Spacing ?? MedianEdge(mesh);
        double natural = spacing > 0 ? area / (spacing * spacing) : sampling.Most;
        return (long)Math.Clamp(natural, sampling.Least, sampling.Most);
    }

    /// <summary>Sum of the triangles' areas, in order.</summary>
    public static double Area(TriangleMesh mesh)
    {
        double area = 0;
        for (int t = 0; t < mesh.Triangles; t++) area += mesh.Area(t);
        return area;
    }

    /// <summary>Samples in order of triangles; the caller disposes of the blocks.</summary>
    public static IEnumerable<SourceBlock> Blocks(TriangleMesh mesh, double area, long wanted, CancellationToken stop)
    {
        double step = area / wanted, cumulated = 0;
        long next = 0;
        SourceBlock? block = null;
        try
        {
            for (int t = 0; t < mesh.Triangles; t++)
            {
                cumulated += mesh.Area(t);
                for (int i = 0; (next + 0.5) * step < cumulated && next < wanted; i++, next++)
                {
                    block ??= new SourceBlock(mesh.HasColour);
                    Put(mesh, t, i, block);
                    if (block.Count < SourceBlock.Capacity) continue;
                    SourceBlock full = block;
                    block = null;
                    stop.ThrowIfCancellationRequested();
                    yield return full;
                }
            }
            if (block != null)
            {
                SourceBlock rest = block;
                block = null;
                yield return rest;
            }
        }
        finally
        {
            block?.Dispose();
        }
    }

    private static void Put(TriangleMesh mesh, int triangle, int i, SourceBlock block)
    {
        ulong hash = Mixed((ulong)triangle);
        double u = Fraction(((hash >> 32) * (1.0 / 4294967296)) + (i * StepU));
        double v = Fraction(((hash & 0xFFFFFFFF) * (1.0 / 4294967296)) + (i * StepV));
        if (u + v > 1)
        {
            u = 1 - u;
            v = 1 - v;
        }
        double w = 1 - u - v;
        int a = mesh.Corners[3 * triangle], b = mesh.Corners[(3 * triangle) + 1], c = mesh.Corners[(3 * triangle) + 2], k = block.Count;
        block.X[k] = mesh.X[a] + (u * (mesh.X[b] - mesh.X[a])) + (v * (mesh.X[c] - mesh.X[a]));
        block.Y[k] = mesh.Y[a] + (u * (mesh.Y[b] - mesh.Y[a])) + (v * (mesh.Y[c] - mesh.Y[a]));
        block.Z[k] = mesh.Z[a] + (u * (mesh.Z[b] - mesh.Z[a])) + (v * (mesh.Z[c] - mesh.Z[a]));
        block.Class[k] = 0;
        if (mesh.Paint is { } paint) (block.Red[k], block.Green[k], block.Blue[k]) = paint(triangle, u, v);
        else if (mesh.HasColour)
        {
            block.Red[k] = (ushort)Math.Round((w * mesh.Red[a]) + (u * mesh.Red[b]) + (v * mesh.Red[c]));
            block.Green[k] = (ushort)Math.Round((w * mesh.Green[a]) + (u * mesh.Green[b]) + (v * mesh.Green[c]));
            block.Blue[k] = (ushort)Math.Round((w * mesh.Blue[a]) + (u * mesh.Blue[b]) + (v * mesh.Blue[c]));
        }
        block.Count = k + 1;
    }

    private static double MedianEdge(TriangleMesh mesh)
    {
        int every = Math.Max(1, mesh.Triangles / (MostEdges / 3));
        var edges = new List<double>();
        for (int t = 0; t < mesh.Triangles; t += every)
        {
            int a = mesh.Corners[3 * t], b = mesh.Corners[(3 * t) + 1], c = mesh.Corners[(3 * t) + 2];
            foreach (double edge in (ReadOnlySpan<double>)[mesh.Edge(a, b), mesh.Edge(b, c), mesh.Edge(c, a)])
            {
                if (edge > 0 && double.IsFinite(edge)) edges.Add(edge);
            }
        }
        if (edges.Count == 0) return 0;
        edges.Sort();
        return edges[edges.Count / 2];
    }

    private static double Fraction(double v) => v - Math.Floor(v);

    // The finaliser of splitmix64 (Steele, Lea and Flood 2014): neighbours in, unrelated bits out.
    private static ulong Mixed(ulong v)
    {
        unchecked
        {
            v += 0x9E3779B97F4A7C15;
            v = (v ^ (v >> 30)) * 0xBF58476D1CE4E5B9;
            v = (v ^ (v >> 27)) * 0x94D049BB133111EB;
            return v ^ (v >> 31);
        }
    }
}
