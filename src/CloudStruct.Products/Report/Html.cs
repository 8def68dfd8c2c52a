using System.Text;
using System.Xml;
using System.Xml.Linq;

namespace CloudStruct.Products.Report;

/// <summary>Elements of a page. What is put in as text is escaped: a survey's name cannot break the page.</summary>
internal static class Html
{
    /// <summary>Elements that never have an end tag (HTML Living Standard, void elements).</summary>
    private static readonly HashSet<string> Void = ["area", "base", "br", "col", "embed", "hr", "img", "input", "link", "meta", "source", "track", "wbr"];

    /// <summary>An element; content may be text, elements, attributes, sequences of them, or null.</summary>
    public static XElement El(string name, params object?[] content) => new(name, content);

    /// <summary>An attribute.</summary>
    public static XAttribute At(string name, string value) => new(name, value);

    /// <summary>A link.</summary>
    public static XElement Link(string to, string text) => El("a", At("href", to), text);

    /// <summary>The page as bytes.</summary>
    public static byte[] Page(XElement html)
    {
        // An empty element written short (<td/>) is an open tag to an HTML reader, except for those that have no end.
        foreach (XElement e in html.DescendantsAndSelf().Where(e => e.IsEmpty && e.Name.Namespace == XNamespace.None && !Void.Contains(e.Name.LocalName)))
            e.Value = "";
        var text = new StringBuilder("<!DOCTYPE html>\n");
        using (var writer = XmlWriter.Create(text, new XmlWriterSettings { OmitXmlDeclaration = true, NewLineHandling = NewLineHandling.None, CheckCharacters = true }))
            html.Save(writer);
        return Encoding.UTF8.GetBytes(text.Append('\n').ToString());
    }

    /// <summary>Text without the control characters that no page may hold (a file name can hold them).</summary>
    public static string Clean(string text) => string.Concat(text.Where(XmlConvert.IsXmlChar));
}
