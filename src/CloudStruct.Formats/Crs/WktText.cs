using System.Text;
using static System.FormattableString;

namespace CloudStruct.Formats.Crs;

/// <summary>Parses well-known text of either generation into elements: brackets square or round, quotes doubled inside quotes.</summary>
/// <remarks>OGC 01-009 (WKT1) and ISO 19162:2015 and 2019 (WKT2) share this grammar.</remarks>
internal sealed class WktText
{
    // Real text nests about ten deep; the limit keeps a damaged file from filling the stack.
    private const int Deepest = 64;

    private readonly string text;
    private int at;

    private WktText(string text) => this.text = text;

    /// <summary>Parses the text: one element, or a horizontal and a vertical one with a comma between, as some programs write.</summary>
    /// <exception cref="FormatException">The text is not well-known text; the message says at which character.</exception>
    public static IReadOnlyList<WktNode> Parse(string text)
    {
        var parser = new WktText(text);
        var nodes = new List<WktNode> { parser.Node(0) };
        parser.Blanks();
        while (parser.at < text.Length && text[parser.at] == ',')
        {
            parser.at++;
            nodes.Add(parser.Node(0));
            parser.Blanks();
        }
        if (parser.at < text.Length) throw parser.Fault("text after the last bracket");
        return nodes;
    }

    private WktNode Node(int depth)
    {
        if (depth > Deepest) throw Fault("brackets nested too deeply");
        string keyword = Word().ToUpperInvariant();
        if (keyword.Length == 0) throw Fault("a keyword was expected");
        return Body(keyword, depth);
    }

    private WktNode Body(string keyword, int depth)
    {
        Blanks();
        if (at >= text.Length || text[at] is not ('[' or '(')) throw Fault(Invariant($"a bracket was expected after {keyword}"));
        char close = text[at] == '[' ? ']' : ')';
        at++;
        var values = new List<WktValue>();
        var children = new List<WktNode>();
        while (true)
        {
            Blanks();
            if (at >= text.Length) throw Fault(Invariant($"{keyword} is not closed"));
            if (text[at] == '"')
            {
                values.Add(new WktValue(Quoted(), true));
            }
            else
            {
                string word = Word();
                if (word.Length == 0) throw Fault("a value was expected");
                Blanks();
                if (at < text.Length && text[at] is '[' or '(')
                {
                    if (depth >= Deepest) throw Fault("brackets nested too deeply");
                    children.Add(Body(word.ToUpperInvariant(), depth + 1));
                }
                else
                {
                    values.Add(new WktValue(word, false));
                }
            }
            Blanks();
            if (at >= text.Length) throw Fault(Invariant($"{keyword} is not closed"));
            if (text[at] == close)
            {
                at++;
                return new WktNode(keyword, values, children);
            }
            if (text[at] != ',') throw Fault("a comma or bracket was expected");
            at++;
        }
    }

    private string Word()
    {
        Blanks();
        int from = at;
        while (at < text.Length && (char.IsLetterOrDigit(text[at]) || text[at] is '_' or '.' or '+' or '-' or ':')) at++;
        return text[from..at];
    }

    private string Quoted()
    {
        var inside = new StringBuilder();
        at++;
        while (at < text.Length)
        {
            char c = text[at++];
            if (c != '"')
            {
                inside.Append(c);
                continue;
            }
            if (at >= text.Length || text[at] != '"') return inside.ToString();
            inside.Append('"');
            at++;
        }
        throw Fault("a quote is not closed");
    }

    private void Blanks()
    {
        while (at < text.Length && char.IsWhiteSpace(text[at])) at++;
    }

    private FormatException Fault(string what) => new(Invariant($"{what} at character {at + 1} of {text.Length}"));
}
