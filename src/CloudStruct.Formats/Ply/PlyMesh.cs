namespace CloudStruct.Formats.Ply;

/// <summary>A triangle mesh in memory.</summary>
/// <param name="X">Vertex coordinates, file units.</param>
/// <param name="Y">Vertex coordinates.</param>
/// <param name="Z">Vertex coordinates.</param>
/// <param name="Red">Vertex colour; empty without.</param>
/// <param name="Green">Vertex colour.</param>
/// <param name="Blue">Vertex colour.</param>
/// <param name="Corners">Three vertex indices a triangle.</param>
internal sealed record PlyMesh(
    double[] X, double[] Y, double[] Z, ushort[] Red, ushort[] Green, ushort[] Blue, IReadOnlyList<int> Corners)
{
    /// <summary>Whether vertices have colour.</summary>
    public bool HasColour => Red.Length > 0;

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
