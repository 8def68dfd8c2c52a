using System.Text.Json;
using System.Text.Json.Nodes;
using CloudStruct.Products.Model;
using CloudStruct.Records.Drawings;
using CloudStruct.Tests.Kit;
using SharpGLTF.Schema2;

namespace CloudStruct.Tests.Products.Model;

public class ModelTests
{
    [GltfValidatorFact]
    public void The_Khronos_validator_finds_no_error_and_no_warning()
    {
        using var scratch = new Scratch();
        File.WriteAllBytes(scratch["faces.glb"], Model(DrawnSamples.Findings()));
        JsonElement issues = GltfValidator.Check(scratch["faces.glb"]).GetProperty("issues");
        Assert.True(issues.GetProperty("numErrors").GetInt32() == 0 && issues.GetProperty("numWarnings").GetInt32() == 0, issues.ToString());
    }

    [GltfValidatorFact]
    public void So_is_the_model_of_a_survey_with_nothing_in_it()
    {
        using var scratch = new Scratch();
        File.WriteAllBytes(scratch["faces.glb"], Model(Samples.Nothing()));
        JsonElement issues = GltfValidator.Check(scratch["faces.glb"]).GetProperty("issues");
        Assert.True(issues.GetProperty("numErrors").GetInt32() == 0 && issues.GetProperty("numWarnings").GetInt32() == 0, issues.ToString());
    }

    [Fact]
    public void A_face_keeps_its_outline_its_place_and_its_attitude()
    {
        // Read back by the library that the format's readers use; an L of three unit squares has an area of 3.
        ModelRoot root = ModelRoot.ReadGLB(new MemoryStream(Model(DrawnSamples.Findings())));
        JsonNode asset = root.Asset.Extras;
        Assert.Equal(Samples.Origin.X, (double)asset["origin_x_m"]!);
        Assert.Contains("y up", (string)asset["frame"]!, StringComparison.Ordinal);
        Node node = Assert.Single(root.LogicalNodes, n => n.Name == "face 1");
        Assert.Equal(123.46, (double)node.Extras["strike_deg"]!, 0.006);
        Assert.Equal("host-1", (string)node.Extras["set"]!);
        MeshPrimitive primitive = node.Mesh.Primitives.Single();
        System.Numerics.Vector3[] places = [.. primitive.GetVertexAccessor("POSITION").AsVector3Array()];
        Assert.Equal(6, places.Length);
        double area = primitive.GetTriangleIndices().Sum(t => System.Numerics.Vector3.Cross(places[t.B] - places[t.A], places[t.C] - places[t.A]).Length() / 2);
        Assert.Equal(3, area, 1e-4);

        // Upward normals: (east, up, -north) keeps the sense of a ring that is counter-clockwise seen from above.
        Assert.All(primitive.GetTriangleIndices(), t => Assert.True(System.Numerics.Vector3.Cross(places[t.B] - places[t.A], places[t.C] - places[t.A]).Y > 0));
        Assert.Contains(root.LogicalNodes, n => n.Name == "cloud");
        Assert.Contains(root.LogicalNodes, n => n.Name.StartsWith("dike 1 margin A", StringComparison.Ordinal));
    }

    [Fact]
    public void The_same_findings_give_the_same_bytes() =>
        Assert.Equal(Model(DrawnSamples.Findings()), Model(DrawnSamples.Findings()));

    private static byte[] Model(Findings findings)
    {
        using var stream = new MemoryStream();
        ModelWriter.Write(stream, findings, findings.Described.Cloud.Count > 0 ? DrawnSamples.Drawn(findings) : new DrawingsRecord(), Samples.Facts());
        return stream.ToArray();
    }
}
