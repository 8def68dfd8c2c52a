using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats.Ply;

/// <summary>Which properties of the vertex element are coordinates, colour and class.</summary>
internal sealed class PlyVertexLayout
{
    private PlyVertexLayout(PlyElement element)
    {
        Element = element;
        X = element.IndexOf("x");
        Y = element.IndexOf("y");
        Z = element.IndexOf("z");
        int red = element.IndexOf("red", "r", "diffuse_red");
        int green = element.IndexOf("green", "g", "diffuse_green");
        int blue = element.IndexOf("blue", "b", "diffuse_blue");
        HasColour = red >= 0 && green >= 0 && blue >= 0;
        Colour = HasColour ? [red, green, blue] : [];
        Class = element.IndexOf("classification", "class", "label");
        if (Class >= 0 && PlyTypes.IsFloat(element.Properties[Class].Type)) Class = -1;
    }

    /// <summary>The vertex element.</summary>
    public PlyElement Element { get; }

    /// <summary>Index of x among the properties.</summary>
    public int X { get; }

    /// <summary>Index of y.</summary>
    public int Y { get; }

    /// <summary>Index of z.</summary>
    public int Z { get; }

    /// <summary>Indices of red, green, blue; empty without colour.</summary>
    public int[] Colour { get; }

    /// <summary>Whether all three colours are there.</summary>
    public bool HasColour { get; }

    /// <summary>Index of a whole-number class property; -1 without.</summary>
    public int Class { get; }

    /// <summary>Whether a coordinate is declared as a 32-bit float.</summary>
    public bool FloatCoordinates => new[] { X, Y, Z }.Any(i => Element.Properties[i].Type == PlyType.Float32);

    /// <summary>Whether colour is stored with a fractional part, 0 to 1 as a rule.</summary>
    public bool FloatColour => HasColour && Colour.Any(i => PlyTypes.IsFloat(Element.Properties[i].Type));

    /// <summary>Layout of a file's vertices.</summary>
    /// <exception cref="InputException">There are none, or a coordinate is missing.</exception>
    public static PlyVertexLayout Of(PlyHeader header)
    {
        if (header.Vertices is not PlyElement element)
            throw new InputException(header.Name, "the PLY file has no vertex element", header.Elements.Length == 0 ? "no elements"
                : string.Join(", ", header.Elements.Take(5).Select(e => e.Name)), "Export the cloud again with vertices");
        var layout = new PlyVertexLayout(element);
        if (layout.X < 0 || layout.Y < 0 || layout.Z < 0)
            throw new InputException(header.Name, "the vertices lack a coordinate", Invariant($"properties {string.Join(", ", element.Properties.Take(12).Select(p => p.Name))}"),
                "Export the cloud again with x, y and z");
        return layout;
    }
}
