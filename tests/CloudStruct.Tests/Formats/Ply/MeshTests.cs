using CloudStruct.Formats;
using CloudStruct.Formats.Meshes;
using CloudStruct.Formats.Ply;
using CloudStruct.Records.Complaints;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats.Ply;

public class MeshTests
{
    // A unit square as one quad, and beside it a triangle of a quarter of its area 3 m higher.
    private static byte[] TwoPlates(string encoding, bool facesFirst, int badIndex = 2)
    {
        PlyText ply = new PlyText(encoding);
        void Faces() => ply.Line("element face 2").Line("property list uchar int vertex_indices").Line("property uchar flags");
        void Vertices() => ply.Line("element vertex 7").Line("property float x").Line("property float y").Line("property float z")
            .Line("property uchar red").Line("property uchar green").Line("property uchar blue");
        void FaceData() => ply.Record(("uchar", 4), ("int", 0), ("int", 1), ("int", badIndex), ("int", 3), ("uchar", 7))
            .Record(("uchar", 3), ("int", 4), ("int", 5), ("int", 6), ("uchar", 7));
        void VertexData()
        {
            foreach ((double x, double y, double z, double red) in new[] { (0.0, 0.0, 0.0, 0.0), (1, 0, 0, 200), (1, 1, 0, 200), (0, 1, 0, 0), (2, 0, 3, 100), (2.5, 0, 3, 100), (2, 1, 3, 100) })
                ply.Record(("float", x), ("float", y), ("float", z), ("uchar", red), ("uchar", 50), ("uchar", 255));
        }
        if (facesFirst) { Faces(); Vertices(); FaceData(); VertexData(); }
        else { Vertices(); Faces(); VertexData(); FaceData(); }
        return ply.Make();
    }

    [Theory]
    [InlineData("ascii", false)]
    [InlineData("ascii", true)]
    [InlineData("binary_little_endian", false)]
    [InlineData("binary_big_endian", true)]
    public void Samples_lie_on_the_mesh_in_proportion_to_area_with_the_colour_between_corners(string encoding, bool facesFirst)
    {
        using var file = new CloudFile("m.ply", TwoPlates(encoding, facesFirst));
        Assert.Equal((0, 2), (CloudFiles.Inspect(file.Path).Points, CloudFiles.Inspect(file.Path).Triangles));
        CloudPoints p = CloudFile.Points(file.Path, new MeshSampling { Least = 10_000, Most = 10_000 });
        Assert.InRange(p.Count, 9_999, 10_000);
        int low = 0;
        int[,] cells = new int[4, 4];
        for (int i = 0; i < p.Count; i++)
        {
            Assert.Equal((50, 255), (p.Green[i], p.Blue[i]));
            if (p.Z[i] == 3)
            {
                Assert.True(p.X[i] >= 2 && p.Y[i] >= 0 && ((p.X[i] - 2) * 2) + p.Y[i] <= 1 + 1e-12);
                Assert.Equal(100, p.Red[i]);
                continue;
            }
            low++;
            Assert.Equal(0, p.Z[i]);
            Assert.Equal(200 * p.X[i], p.Red[i], 0.5 + 1e-9);   // red grows from 0 to 200 along x
            cells[Math.Min(3, (int)(4 * p.X[i])), Math.Min(3, (int)(4 * p.Y[i]))]++;
        }
        Assert.InRange(low, 7_998, 8_001);                       // 1 / 1.25 of the area
        // Even, not merely random: 500 a cell; a random draw would leave +-4 sigma = +-87.
        foreach (int n in cells) Assert.InRange(n, 470, 530);
    }

    [Fact]
    public void The_same_mesh_gives_the_same_samples_each_time()
    {
        string path = Repo.Path("testdata/ply/tm_fuze.ply");
        CloudPoints a = CloudFile.Points(path), b = CloudFile.Points(path);
        Assert.Equal(a.X, b.X);
        Assert.Equal(a.Red, b.Red);
        Assert.InRange(a.Count, 199_999, 200_000);               // coarse triangles: the least number
    }

    [Fact]
    public void Spacing_decides_between_least_and_most()
    {
        using var file = new CloudFile("m.ply", TwoPlates("binary_little_endian", false));
        Assert.InRange(CloudFile.Points(file.Path, new MeshSampling { Least = 10, Spacing = 0.05 }).Count, 499, 500);   // 1.25 / 0.0025
        Assert.InRange(CloudFile.Points(file.Path, new MeshSampling { Least = 10, Most = 300, Spacing = 0.001 }).Count, 299, 300);
        // Edges 1, 1, 1.41, 1, 1, 1.41, 0.5, 1, 1.12: the median is 1, so 1.25 samples, lifted to the least.
        Assert.InRange(CloudFile.Points(file.Path, new MeshSampling { Least = 40 }).Count, 39, 40);
    }

    [Fact]
    public void A_face_that_names_no_vertex_is_refused()
    {
        foreach (int bad in (int[])[-1, 7, int.MaxValue])
        {
            using var file = new CloudFile("m.ply", TwoPlates("binary_little_endian", true, bad));
            Assert.Contains("does not exist", Assert.Throws<InputException>(() => file.Points()).Message, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void A_mesh_without_area_is_refused()
    {
        using var file = new CloudFile("m.ply", new PlyText("ascii").Line("element vertex 1").Line("property float x").Line("property float y")
            .Line("property float z").Line("element face 1").Line("property list uchar int vertex_index")
            .Record(("float", 1), ("float", 2), ("float", 3)).Record(("uchar", 3), ("int", 0), ("int", 0), ("int", 0)).Make());
        Assert.Contains("no area", Assert.Throws<InputException>(() => file.Points()).Message, StringComparison.Ordinal);
    }
}
