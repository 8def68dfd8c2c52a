using System.Text;
using CloudStruct.Formats;
using CloudStruct.Formats.Meshes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using CloudStruct.Tests.Kit;
using SkiaSharp;

namespace CloudStruct.Tests.Formats.Gltf;

public sealed class GltfTests : IDisposable
{
    private readonly string path = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName() + ".glb");

    public void Dispose() => File.Delete(path);

    // A square of 2 m standing upright (y up in the file), its texture four colours; the node moves it.
    [Fact]
    public void Samples_carry_the_colour_of_the_texture_and_stand_with_z_up()
    {
        Square(textured: true);
        CloudHeader header = CloudFiles.Inspect(path);
        Assert.Equal((2, true), ((int)header.Triangles, header.HasColour));
        CloudPoints p = CloudFile.Points(path, new MeshSampling { Least = 4000, Most = 4000 });
        Assert.Equal(4000, p.Count, 1.0);
        int right = 0;
        for (int i = 0; i < p.Count; i++)
        {
            Assert.Equal(-7, p.Y[i], 1e-5);   // z = 7 in the file
            Assert.InRange(p.X[i], 10, 12);
            Assert.InRange(p.Z[i], 0, 2);
            // Top left red, top right green, bottom left blue, bottom right white: v runs down from the top.
            bool left = p.X[i] < 11, top = p.Z[i] > 1;
            (int r, int g, int b) = (left, top) switch { (true, true) => (255, 0, 0), (false, true) => (0, 255, 0), (true, false) => (0, 0, 255), _ => (255, 255, 255) };
            // Near a seam the four pixels around a place are mixed: 64 pixels a side, so within 2 m / 64 of it.
            if (Math.Abs(p.X[i] - 11) < 0.05 || Math.Abs(p.Z[i] - 1) < 0.05 || p.X[i] is < 10.05 or > 11.95 || p.Z[i] is < 0.05 or > 1.95) continue;
            Assert.Equal((r * 257, g * 257, b * 257), (p.Red[i], p.Green[i], p.Blue[i]));
            right++;
        }

        Assert.True(right > 3000);
    }

    [Fact]
    public void Colours_of_the_material_are_linear_in_the_file()
    {
        Square(textured: false);
        CloudPoints p = CloudFile.Points(path, new MeshSampling { Least = 100, Most = 100 });
        // sRGB of 0.5, 0.25 and 1 (IEC 61966-2-1): 0.7354, 0.5371, 1.
        Assert.Equal(0.7354, p.Red[0] / 65535.0, 1e-3);
        Assert.Equal(0.5371, p.Green[0] / 65535.0, 1e-3);
        Assert.Equal(1, p.Blue[0] / 65535.0, 1e-3);
    }

    [Theory]
    [InlineData("tm_BoxTextured.glb", 12)]
    [InlineData("tm_cubevc.glb", 48)]
    [InlineData("tm_no_indices_3storybuilding.glb", 72)]
    public void Models_of_others_are_sampled(string name, int triangles)
    {
        CloudHeader header = CloudFiles.Inspect(Repo.Path("testdata/gltf/" + name));
        Assert.Equal(triangles, header.Triangles);
        CloudPoints p = CloudFile.Points(Repo.Path("testdata/gltf/" + name), new MeshSampling { Least = 2000, Most = 2000 });
        Assert.InRange(p.Count, 1999, 2000);
        if (name.Contains("no_indices", StringComparison.Ordinal)) return;
        Assert.True(header.HasColour);
        // Vertices of the one are magenta throughout (read from its bytes); the other has a texture.
        if (name.Contains("cubevc", StringComparison.Ordinal)) Assert.All(Enumerable.Range(0, p.Count), i => Assert.True(p.Red[i] >= 65534 && p.Green[i] == 0 && p.Blue[i] >= 65534));
        else Assert.True(p.Red.Distinct().Count() > 1);
    }

    [Theory]
    [InlineData("dr_Box_draco_required-extension.glb")]
    [InlineData("lg_BoxTextured_meshopt_required-extension.glb")]
    [InlineData("kv_glb_valid.glb")]
    public void What_cannot_be_read_is_refused_with_its_name(string name) =>
        Assert.StartsWith(name, Assert.Throws<InputException>(() => CloudFiles.Inspect(Repo.Path("testdata/gltf/" + name))).Message, StringComparison.Ordinal);

    // A GLB written by hand: header, JSON chunk, binary chunk (glTF 2.0, section GLB).
    private void Square(bool textured)
    {
        using var picture = new SKBitmap(64, 64);
        for (int y = 0; y < 64; y++)
        {
            for (int x = 0; x < 64; x++) picture.SetPixel(x, y, (x < 32, y < 32) switch { (true, true) => SKColors.Red, (false, true) => new SKColor(0, 255, 0), (true, false) => SKColors.Blue, _ => SKColors.White });
        }

        using SKData png = picture.Encode(SKEncodedImageFormat.Png, 100);
        using var binary = new MemoryStream();
        foreach (float v in (float[])[0, 0, 0, 2, 0, 0, 2, 2, 0, 0, 2, 0, 0, 1, 1, 1, 1, 0, 0, 0]) binary.Write(BitConverter.GetBytes(v));
        foreach (ushort v in (ushort[])[0, 1, 2, 0, 2, 3]) binary.Write(BitConverter.GetBytes(v));
        binary.Write(png.ToArray());
        while (binary.Length % 4 != 0) binary.WriteByte(0);
        string material = textured ? "\"baseColorTexture\":{\"index\":0}" : "\"baseColorFactor\":[0.5,0.25,1,1]";
        string json = $$$"""
            {"asset":{"version":"2.0"},"scene":0,"scenes":[{"nodes":[0]}],"nodes":[{"mesh":0,"translation":[10,0,7]}],
            "meshes":[{"primitives":[{"attributes":{"POSITION":0,"TEXCOORD_0":1},"indices":2,"material":0}]}],
            "materials":[{"pbrMetallicRoughness": { {{{material}}} } }],"textures":[{"source":0}],"images":[{"bufferView":3,"mimeType":"image/png"}],
            "accessors":[{"bufferView":0,"componentType":5126,"count":4,"type":"VEC3","min":[0,0,0],"max":[2,2,0]},
            {"bufferView":1,"componentType":5126,"count":4,"type":"VEC2"},{"bufferView":2,"componentType":5123,"count":6,"type":"SCALAR"}],
            "bufferViews":[{"buffer":0,"byteOffset":0,"byteLength":48},{"buffer":0,"byteOffset":48,"byteLength":32},{"buffer":0,"byteOffset":80,"byteLength":12},
            {"buffer":0,"byteOffset":92,"byteLength": {{{png.Size}}} }],"buffers":[{"byteLength": {{{binary.Length}}} }]}
            """;
        byte[] text = Encoding.UTF8.GetBytes(json);
        Array.Resize(ref text, (text.Length + 3) / 4 * 4);
        for (int i = text.Length - 1; text[i] == 0; i--) text[i] = (byte)' ';
        using var file = new BinaryWriter(File.Create(path));
        file.Write(0x46546C67u);
        file.Write(2u);
        file.Write((uint)(28 + text.Length + binary.Length));
        file.Write((uint)text.Length);
        file.Write(0x4E4F534Au);
        file.Write(text);
        file.Write((uint)binary.Length);
        file.Write(0x004E4942u);
        file.Write(binary.ToArray());
    }
}
