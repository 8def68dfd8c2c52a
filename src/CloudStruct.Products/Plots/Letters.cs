using SkiaSharp;

namespace CloudStruct.Products.Plots;

/// <summary>A size and cut of the typeface, with what a layout needs to know of it.</summary>
/// <param name="Size">Size [pt].</param>
/// <param name="Heavy">Whether the semi-bold cut is used.</param>
internal sealed record Letters(float Size, bool Heavy = false)
{
    /// <summary>Title of a plot.</summary>
    public static readonly Letters Title = new(8.5f, true);

    /// <summary>Axis titles, keys and sentences: as small as print still reads well.</summary>
    public static readonly Letters Body = new(6.75f);

    /// <summary>Figures along an axis.</summary>
    public static readonly Letters Axis = new(6.5f);

    /// <summary>Run identifier.</summary>
    public static readonly Letters Small = new(5f);

    /// <summary>Distance of base lines [pt].</summary>
    public float Lead => Size * 1.35f;

    /// <summary>A font to draw with; the caller disposes of it.</summary>
    /// <remarks>Without hinting and at sub-pixel places: letters sit where the layout puts them at any resolution.</remarks>
    public SKFont Font() => new(Heavy ? Typefaces.Bold : Typefaces.Regular, Size)
    {
        Hinting = SKFontHinting.None,
        Subpixel = true,
        LinearMetrics = true,
        Edging = SKFontEdging.Antialias,
    };

    /// <summary>Width of one line [pt].</summary>
    public float Measure(string text)
    {
        using SKFont font = Font();
        return font.MeasureText(text);
    }

    /// <summary>Cuts a text into lines no wider than <paramref name="width"/>, at blanks; a longer word is cut inside.</summary>
    public string[] Wrap(string text, float width)
    {
        using SKFont font = Font();
        var lines = new List<string>();
        string line = "";
        foreach (string word in text.Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries))
        {
            string rest = word, longer = line.Length == 0 ? word : line + " " + word;
            if (font.MeasureText(longer) <= width)
            {
                line = longer;
                continue;
            }
            if (line.Length > 0) lines.Add(line);
            while (font.MeasureText(rest) > width && rest.Length > 1)
            {
                int fit = Math.Max(1, font.BreakText(rest, width));
                lines.Add(rest[..fit]);
                rest = rest[fit..];
            }
            line = rest;
        }
        if (line.Length > 0) lines.Add(line);
        return [.. lines];
    }
}
