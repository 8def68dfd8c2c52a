using CloudStruct.Stages.Describe;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Describe;

public class RockColourTests
{
    // IEC 61966-2-1, formula (testdata/reference/points.md): code 10 0.003035270, 11 0.003346536, 128 0.215860500; break at 0.04045.
    [Fact]
    public void Decoding_of_sRGB_equals_the_table()
    {
        ReferenceTable table = ReferenceTable.Read("reference/srgb_transfer.csv");
        for (int i = 0; i < table.Count; i++) Assert.Equal(table.Number(i, "linear"), RockColour.Linear(table.Number(i, "code8") / 255), 1e-9);
    }

    // scikit-image 0.19.3 rgb2lab, D65 2 degree (testdata/reference/points.md): 0.02; a and b of greys below 0.01.
    [Fact]
    public void Lab_equals_the_library()
    {
        ReferenceTable table = ReferenceTable.Read("reference/srgb_to_lab.csv");
        for (int i = 0; i < table.Count; i++)
        {
            byte r = (byte)table.Number(i, "R"), g = (byte)table.Number(i, "G"), b = (byte)table.Number(i, "B");
            (double l, double a, double bStar) = RockColour.Lab(r, g, b);
            Assert.Equal(table.Number(i, "L"), l, 0.02);
            Assert.Equal(table.Number(i, "a"), a, 0.02);
            Assert.Equal(table.Number(i, "b"), bStar, 0.02);
            if (r == g && g == b) Assert.True(Math.Abs(a) < 0.01 && Math.Abs(bStar) < 0.01);
        }
    }

    // Twice the light: linear values double, their ratios stay.
    [Theory]
    [InlineData(90, 70, 60)]
    [InlineData(60, 70, 90)]
    [InlineData(128, 120, 117)]
    public void Ratios_survive_shade(byte r, byte g, byte b)
    {
        (float rg, float bg) = RockColour.LogRatios(r, g, b);
        (float rg2, float bg2) = RockColour.LogRatios(Lit(r, 2), Lit(g, 2), Lit(b, 2));
        Assert.Equal(rg, rg2, 0.03);   // codes are whole numbers
        Assert.Equal(bg, bg2, 0.03);
    }

    [Fact]
    public void Black_and_clipped_pixels_are_not_sound_and_black_has_no_hue()
    {
        Assert.False(RockColour.IsSound(3, 90, 90));
        Assert.False(RockColour.IsSound(200, 255, 90));
        Assert.True(RockColour.IsSound(40, 50, 60));
        Assert.Equal((0f, 0f), RockColour.LogRatios(0, 3, 1));
    }

    // Encoding by the same standard, written out here apart from the program.
    private static byte Lit(byte code, double times)
    {
        double linear = times * RockColour.Linear(code / 255.0);
        double encoded = linear <= 0.0031308 ? 12.92 * linear : (1.055 * Math.Pow(linear, 1 / 2.4)) - 0.055;
        return (byte)Math.Round(255 * encoded);
    }
}
