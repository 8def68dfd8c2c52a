namespace CloudStruct.Formats.Meshes;

/// <summary>A triangle mesh in memory.</summary>
/// <param name="X">Vertex coordinates, file units.</param>
/// <param name="Y">Vertex coordinates.</param>
/// <param name="Z">Vertex coordinates.</param>
/// <param name="Red">Vertex colour; empty without.</param>
/// <param name="Green">Vertex colour.</param>
/// <param name="Blue">Vertex colour.</param>
/// <param name="Corners">Three vertex indices a triangle.</param>
internal sealed record TriangleMesh(
    double[] X, double[] Y, double[] Z, ushort[] Red, ushort[] Green, ushort[] Blue, IReadOnlyList<int> Corners)
{
    /// <summary>Colour at a place of a triangle (its number, shares of its second and third corner), for meshes that have it in textures;
    /// null for those whose vertices have it.</summary>
    public Func<int, double, double, (ushort R, ushort G, ushort B)>? Paint { get; init; }

    /// <summary>Whether there is colour.</summary>
    public bool HasColour => Paint is not null || Red.Length > 0;

    /// <summary>Triangles.</summary>
    public int Triangles => Corners.Count / 3;

    /// <summary>Length of the edge between two vertices.</summary>
    public double Edge(int a, int b)
    {
        double dx = X[b] - X[a], dy = Y[b] - Y[a], dz = Z[b] - Z[a];
        return Math.Sqrt((dx * dx) + (dy * dy) + (dz * dz));
    }

    /// <summary>Area of a triangle; 0 when a corner is not finite.</summary>
    public double Area(int triangle)
    {
        int a = Corners[3 * triangle], b = Corners[(3 * triangle) + 1], c = Corners[(3 * triangle) + 2];
        double ux = X[b] - X[a], uy = Y[b] - Y[a], uz = Z[b] - Z[a];
        double vx = X[c] - X[a], vy = Y[c] - Y[a], vz = Z[c] - Z[a];
        double nx = (uy * vz) - (uz * vy), ny = (uz * vx) - (ux * vz), nz = (ux * vy) - (uy * vx);
        double area = 0.5 * Math.Sqrt((nx * nx) + (ny * ny) + (nz * nz));
        return double.IsFinite(area) ? area : 0;
    }
}
