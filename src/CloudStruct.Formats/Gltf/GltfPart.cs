using System.Text.Json.Nodes;

namespace CloudStruct.Formats.Gltf;

/// <summary>One named thing of a model: triangles or points.</summary>
public sealed record GltfPart
{
    /// <summary>Name of its node.</summary>
    public string Name { get; init; } = "";

    /// <summary>Node that gathers parts of a kind: "faces".</summary>
    public string Group { get; init; } = "";

    /// <summary>East, north, up, three floats a vertex, from the origin of the model [m].</summary>
    public float[] Places { get; init; } = [];

    /// <summary>Three vertices a triangle; empty for points.</summary>
    public int[] Triangles { get; init; } = [];

    /// <summary>Red, green, blue, three bytes a vertex; empty when the part has one colour.</summary>
    public byte[] Rgb { get; init; } = [];

    /// <summary>Colour of the whole part.</summary>
    public (byte Red, byte Green, byte Blue) Colour { get; init; } = (255, 255, 255);

    /// <summary>Share of light that is let through, 0 to 1.</summary>
    public double Clear { get; init; }

    /// <summary>What else is known of it.</summary>
    public JsonObject Facts { get; init; } = [];
}
