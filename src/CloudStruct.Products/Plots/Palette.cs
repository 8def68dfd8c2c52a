using SkiaSharp;

namespace CloudStruct.Products.Plots;

/// <summary>Colours that people with any colour vision tell apart, and greys: Okabe and Ito 2008, "Color universal design".</summary>
/// <remarks>The yellow of that palette is left out: it vanishes on white paper. Each set also has a mark of its own shape,
/// so that a grey print loses nothing.</remarks>
internal static class Palette
{
    /// <summary>Text and axes.</summary>
    public static readonly SKColor Ink = new(0x1A, 0x1A, 0x1A);

    /// <summary>Small print: still 7:1 against white.</summary>
    public static readonly SKColor Quiet = new(0x59, 0x59, 0x59);

    /// <summary>Hairlines.</summary>
    public static readonly SKColor Hair = new(0xB0, 0xB0, 0xB0);

    /// <summary>What belongs to no set.</summary>
    public static readonly SKColor NoSet = new(0x80, 0x80, 0x80);

    /// <summary>The measured curve of a profile, and its band.</summary>
    public static readonly SKColor Measured = new(0x00, 0x72, 0xB2);

    private static readonly SKColor[] Colours =
    [
        new(0x00, 0x72, 0xB2), new(0xD5, 0x5E, 0x00), new(0x00, 0x9E, 0x73), new(0xE6, 0x9F, 0x00),
        new(0xCC, 0x79, 0xA7), new(0x56, 0xB4, 0xE9), new(0x00, 0x00, 0x00),
    ];

    private static readonly float[][] Dashes = [[], [5, 2], [2, 1.5f], [6, 1.5f, 1.5f, 1.5f], [8, 3], [1, 1.5f], [4, 1.5f, 1, 1.5f, 1, 1.5f]];

    /// <summary>Colour, mark and dashes of the n-th set; from the eighth on the marks are hollow.</summary>
    public static GroupStyle Group(int n)
    {
        int k = n % Colours.Length;
        return new GroupStyle(Colours[k], (MarkShape)k, (n / Colours.Length) % 2 == 1, Dashes[k]);
    }
}
