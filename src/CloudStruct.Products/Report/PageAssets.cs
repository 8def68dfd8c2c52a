using System.Reflection;
using System.Security.Cryptography;
using System.Text;

namespace CloudStruct.Products.Report;

/// <summary>Script and style of the linked page, bundled from Report/Page when the program was built.</summary>
/// <param name="Script">The script, as text of a script element.</param>
/// <param name="Style">The style sheet.</param>
internal sealed record PageAssets(string Script, string Style)
{
    /// <summary>What the program carries; null where it was built without Node.js.</summary>
    public static PageAssets? Built { get; } = Load();

    /// <summary>The hash by which the page's own policy lets this script run, and no other.</summary>
    public string ScriptHash => "sha256-" + Convert.ToBase64String(SHA256.HashData(Encoding.UTF8.GetBytes(RawText.ScriptText(Script))));

    private static PageAssets? Load() => Text("page.js") is { } script ? new PageAssets(script, Text("page.css") ?? "") : null;

    private static string? Text(string name)
    {
        using Stream? stream = typeof(PageAssets).Assembly.GetManifestResourceStream(name);
        if (stream == null) return null;
        using var reader = new StreamReader(stream, Encoding.UTF8);
        // One kind of line end: readers of HTML turn the others into it before they take the hash.
        return reader.ReadToEnd().Replace("\r\n", "\n", StringComparison.Ordinal).Replace('\r', '\n');
    }
}
