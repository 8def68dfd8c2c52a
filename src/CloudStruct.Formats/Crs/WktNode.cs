using System.Globalization;
using System.Text;

namespace CloudStruct.Formats.Crs;

/// <summary>One element of well-known text: KEYWORD[value, ..., element, ...].</summary>
/// <param name="Keyword">Upper case.</param>
/// <param name="Values">Texts, numbers and bare words before, between and after the elements, in order.</param>
/// <param name="Children">Elements inside, in order.</param>
internal sealed record WktNode(string Keyword, IReadOnlyList<WktValue> Values, IReadOnlyList<WktNode> Children)
{
    /// <summary>The element's name: its first value.</summary>
    public string Name => Values.Count > 0 ? Values[0].Text : "";

    /// <summary>First child with one of these keywords; null when there is none.</summary>
    public WktNode? Child(params ReadOnlySpan<string> keywords)
    {
        foreach (WktNode child in Children)
        {
            if (keywords.Contains(child.Keyword)) return child;
        }
        return null;
    }

    /// <summary>The number at an index of the values; null when it is not a finite number.</summary>
    public double? Number(int index) =>
        index < Values.Count && double.TryParse(Values[index].Text, NumberStyles.Float, CultureInfo.InvariantCulture, out double v)
        && double.IsFinite(v) ? v : null;

    /// <summary>Text of the element on one line, children of one keyword left out.</summary>
    public string ToText(params ReadOnlySpan<string> without)
    {
        var text = new StringBuilder(Keyword).Append('[');
        bool first = true;
        foreach (WktValue value in Values)
        {
            if (!first) text.Append(',');
            first = false;
            if (value.IsQuoted) text.Append('"').Append(value.Text.Replace("\"", "\"\"", StringComparison.Ordinal)).Append('"');
            else text.Append(value.Text);
        }
        foreach (WktNode child in Children)
        {
            if (without.Contains(child.Keyword)) continue;
            if (!first) text.Append(',');
            first = false;
            text.Append(child.ToText(without));
        }
        return text.Append(']').ToString();
    }
}
