using System.Xml;
using System.Xml.Linq;

namespace CloudStruct.Products.Report;

/// <summary>Text of a script or style element: readers of HTML take it as it stands, so it must not be escaped. It is marked so that
/// readers of XML take it as it stands too.</summary>
internal sealed class RawText : XText
{
    private RawText(string text)
        : base(text)
    {
        if (text.Contains("</script", StringComparison.OrdinalIgnoreCase) || text.Contains("</style", StringComparison.OrdinalIgnoreCase))
            throw new ArgumentException("a script or style may not hold its own end tag");
    }

    // A blank before the bracket changes neither a comparison in the code nor a shader.
    /// <summary>A script with its marks, as it stands in the page.</summary>
    public static string ScriptText(string script) => "//<![CDATA[\n" + script.Replace("]]>", "]] >", StringComparison.Ordinal) + "\n//]]>";

    /// <summary>The content of a script element.</summary>
    public static RawText Script(string script) => new(ScriptText(script));

    /// <summary>The content of a style element.</summary>
    public static RawText Style(string style) => new("/*<![CDATA[*/\n" + style + "\n/*]]>*/");

    /// <inheritdoc/>
    public override void WriteTo(XmlWriter writer) => writer.WriteRaw(Value);
}
