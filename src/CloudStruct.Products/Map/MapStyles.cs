using System.Text;
using System.Xml.Linq;

namespace CloudStruct.Products.Map;

/// <summary>Styles of the layers as Styled Layer Descriptor 1.1 with Symbology Encoding 1.1 (OGC 05-078r4, 05-077r4).</summary>
/// <remarks>Strike bars are small drawings carried inside the style itself (InlineContent), turned by the column
/// rotation_grid_deg: a layer opens with its symbols along strike and needs no file beside it.</remarks>
internal static class MapStyles
{
    private static readonly XNamespace Sld = "http://www.opengis.net/sld", Se = "http://www.opengis.net/se", Ogc = "http://www.opengis.net/ogc";

    // Bars point up in the drawing, ticks right: down dip for a strike by the right-hand rule. 1 unit is 0.1 mm.
    private const string Bar = "<path d='M50 6V94' stroke='#1a1a1a' stroke-width='7' fill='none'/>";
    private const string Inclined = Bar + "<path d='M50 50H80' stroke='#1a1a1a' stroke-width='7' fill='none'/>";
    private const string Vertical = Bar + "<path d='M22 50H78' stroke='#1a1a1a' stroke-width='7' fill='none'/>";
    private const string Level = "<circle cx='50' cy='50' r='24' stroke='#1a1a1a' stroke-width='7' fill='none'/><path d='M26 50H74M50 26V74' stroke='#1a1a1a' stroke-width='7'/>";
    private const string Across = "<path d='M50 20V80' stroke='#0072b2' stroke-width='8' fill='none'/>";

    /// <summary>Strike bars with the dip beside them.</summary>
    public static string Faces { get; } = Style("faces",
        Rule("inclined", Is("symbol", "inclined"), Drawing(Inclined, 18), Label("dip_deg")),
        Rule("vertical", Is("symbol", "vertical"), Drawing(Vertical, 18)),
        Rule("horizontal", Is("symbol", "horizontal"), Drawing(Level, 18)));

    /// <summary>Full lines.</summary>
    public static string Contacts { get; } = Style("contacts",
        Rule("plane", Is("constraint", "plane"), Stroke("#1a1a1a", "2", "")),
        Rule("line", Is("constraint", "line"), Stroke("#1a1a1a", "1.2", "")));

    /// <summary>Ticks across the dike.</summary>
    public static string Stations { get; } = Style("stations", Rule("station", null, Drawing(Across, 14)));

    /// <summary>A light tint.</summary>
    public static string Outline { get; } = Style("outline", Rule("dike", null, new XElement(Se + "PolygonSymbolizer",
        new XElement(Se + "Fill", Parameter("fill", "#d55e00"), Parameter("fill-opacity", "0.3")),
        new XElement(Se + "Stroke", Parameter("stroke", "#9c3f00"), Parameter("stroke-width", "0.8")))));

    private static string Style(string layer, params XElement[] rules) => new XDocument(
        new XElement(Sld + "StyledLayerDescriptor", new XAttribute("version", "1.1.0"),
            new XAttribute(XNamespace.Xmlns + "se", Se), new XAttribute(XNamespace.Xmlns + "ogc", Ogc),
            new XElement(Sld + "NamedLayer",
                new XElement(Se + "Name", layer),
                new XElement(Sld + "UserStyle",
                    new XElement(Se + "Name", layer),
                    new XElement(Se + "FeatureTypeStyle", rules))))).ToString(SaveOptions.DisableFormatting);

    private static XElement Rule(string name, XElement? filter, params XElement[] symbolizers) =>
        new(Se + "Rule", new XElement(Se + "Name", name), filter is null ? null : new XElement(Ogc + "Filter", filter), symbolizers);

    private static XElement Is(string column, string word) => new(Ogc + "PropertyIsEqualTo",
        new XElement(Ogc + "PropertyName", column), new XElement(Ogc + "Literal", word));

    private static XElement Drawing(string content, int size)
    {
        string svg = $"<svg xmlns='http://www.w3.org/2000/svg' width='100' height='100' viewBox='0 0 100 100'>{content}</svg>";
        return new XElement(Se + "PointSymbolizer", new XElement(Se + "Graphic",
            new XElement(Se + "ExternalGraphic",
                new XElement(Se + "InlineContent", new XAttribute("encoding", "base64"), Convert.ToBase64String(Encoding.UTF8.GetBytes(svg))),
                new XElement(Se + "Format", "image/svg+xml")),
            new XElement(Se + "Size", size),
            new XElement(Se + "Rotation", new XElement(Ogc + "PropertyName", "rotation_grid_deg"))));
    }

    private static XElement Label(string column) => new(Se + "TextSymbolizer",
        new XElement(Se + "Label", new XElement(Se + "FormatNumber", new XAttribute("fallbackValue", ""),
            new XElement(Se + "NumericValue", new XElement(Ogc + "PropertyName", column)), new XElement(Se + "Pattern", "##"))),
        new XElement(Se + "Font", Parameter("font-size", "9")),
        new XElement(Se + "LabelPlacement", new XElement(Se + "PointPlacement", new XElement(Se + "Displacement",
            new XElement(Se + "DisplacementX", "12"), new XElement(Se + "DisplacementY", "-12")))),
        new XElement(Se + "Fill", Parameter("fill", "#1a1a1a")));

    private static XElement Stroke(string colour, string width, string dashes) => new(Se + "LineSymbolizer",
        new XElement(Se + "Stroke", Parameter("stroke", colour), Parameter("stroke-width", width), dashes.Length > 0 ? Parameter("stroke-dasharray", dashes) : null));

    private static XElement Parameter(string name, string value) => new(Se + "SvgParameter", new XAttribute("name", name), value);
}
