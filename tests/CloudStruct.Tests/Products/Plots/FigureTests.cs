using System.Buffers.Binary;
using System.Text;
using System.Xml.Linq;
using CloudStruct.Products.Plots;
using CloudStruct.Records.Drawings;
using SkiaSharp;

namespace CloudStruct.Tests.Products.Plots;

public class FigureTests
{
    private const string Run = "1f2e3d4c5b6a";

    public static TheoryData<string> Names => ["net-host", "net-contacts", "net-crowded", "net-empty", "width", "width-long", "width-one", "width-hidden", "width-full", "rose", "section"];

    [Theory]
    [MemberData(nameof(Names))]
    public void Svg_is_valid_xml_of_column_width_with_text_as_outlines(string name)
    {
        XElement svg = XDocument.Parse(Encoding.UTF8.GetString(FigureFiles.Svg(Make(name), Run))).Root!;
        Assert.Equal("svg", svg.Name.LocalName);
        Assert.Equal("85mm", svg.Attribute("width")!.Value);
        Assert.DoesNotContain(svg.Descendants(), e => e.Name.LocalName is "text" or "image" or "script");
        Assert.Contains(Run, svg.Elements().Single(e => e.Name.LocalName == "desc").Value, StringComparison.Ordinal);
        Assert.All(svg.DescendantsAndSelf().Attributes().Where(a => !a.IsNamespaceDeclaration), a => Assert.DoesNotContain("http", a.Value, StringComparison.Ordinal));
        Assert.True(svg.Descendants().Count(e => e.Name.LocalName == "path") > 3);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Png_is_300_dpi_of_column_width_and_nothing_is_cut_off(string name)
    {
        byte[] png = FigureFiles.Png(Make(name), Run);
        using SKBitmap bitmap = SKBitmap.Decode(png);
        Assert.Equal(1004, bitmap.Width);   // 85 mm at 300 dpi: 1003.9 pixels
        // PNG specification: pHYs after the 33 bytes of signature and header; 300 dpi are 11811 pixels per metre.
        Assert.Equal("pHYs", Encoding.ASCII.GetString(png, 37, 4));
        Assert.Equal(11811u, BinaryPrimitives.ReadUInt32BigEndian(png.AsSpan(41)));
        Assert.Contains("Run " + Run, Encoding.Latin1.GetString(png, 33, 400), StringComparison.Ordinal);

        // A rim of 2.5 mm stays white: no letter, mark or line leaves the sheet.
        const int rim = 12;
        int inked = 0;
        SKColor[] pixels = bitmap.Pixels;
        for (int y = 0; y < bitmap.Height; y++)
        {
            for (int x = 0; x < bitmap.Width; x++)
            {
                bool atRim = x < rim || y < rim || x >= bitmap.Width - rim || y >= bitmap.Height - rim;
                bool white = pixels[(y * bitmap.Width) + x] == SKColors.White;
                if (atRim && !white) Assert.Fail($"{name}: ink at {x}, {y} of {bitmap.Width} x {bitmap.Height}");
                if (!white) inked++;
            }
        }
        Assert.True(inked > 5000);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Pdf_is_whole_and_dated_like_the_input(string name)
    {
        byte[] pdf = FigureFiles.Pdf(Make(name), Samples.Facts());
        string text = Encoding.Latin1.GetString(pdf);
        Assert.StartsWith("%PDF-", text, StringComparison.Ordinal);
        Assert.EndsWith("%%EOF", text.TrimEnd(), StringComparison.Ordinal);
        Assert.Contains("(Run " + Run + ")", text, StringComparison.Ordinal);
        Assert.Contains("/CreationDate (D:20250614000000", text, StringComparison.Ordinal);
        Assert.Contains("Inter-Regular", text, StringComparison.Ordinal);

        // Without a date in the input there is none in the file.
        Assert.DoesNotContain("/CreationDate", Encoding.Latin1.GetString(FigureFiles.Pdf(Make(name), Samples.Facts() with { InputDate = null })), StringComparison.Ordinal);
    }

    [Fact]
    public void A_pole_is_drawn_where_the_drawing_has_it()
    {
        // One pole, east on the rim's half-way: right of the middle, level with it.
        var net = new NetDrawing { Title = "t", Sentence = "s.", Poles = [new(new Point2(0.5, 0), 0, "", 0)], HasNorth = false };
        using SKBitmap with = SKBitmap.Decode(FigureFiles.Png(NetFigure.Make(net, Run), Run));
        using SKBitmap without = SKBitmap.Decode(FigureFiles.Png(NetFigure.Make(net with { Poles = [new(new Point2(-0.5, 0), 0, "", 0)] }, Run), Run));
        SKColor[] a = with.Pixels, b = without.Pixels;
        (int X, int Y)[] changed = [.. Enumerable.Range(0, a.Length).Where(i => a[i] != b[i]).Select(i => (i % with.Width, i / with.Width))];
        double middle = with.Width / 2.0;
        double[] right = [.. changed.Where(p => p.X > middle).Select(p => p.X - middle)], left = [.. changed.Where(p => p.X < middle).Select(p => middle - p.X)];
        // Radius of the net: half of 85 mm less 6 pt of rim and 8 pt of ticks.
        double half = ((85 / 25.4 * 72 / 2) - 6 - 8) * 300 / 72 / 2;
        Assert.Equal(half, right.Average(), 1.0);
        Assert.Equal(half, left.Average(), 1.0);
    }

    [Fact]
    public void North_is_lettered_only_where_there_is_a_north()
    {
        NetDrawing net = SampleDrawings.Net(10);
        Assert.True(NetFigure.Make(net, Run).HeightPt > NetFigure.Make(net with { HasNorth = false }, Run).HeightPt);
    }

    [Fact]
    public void Sets_differ_in_shape_and_colour_and_in_grey()
    {
        GroupStyle[] styles = [.. Enumerable.Range(0, 14).Select(Palette.Group)];
        Assert.Equal(14, styles.Select(s => (s.Shape, s.Hollow)).Distinct().Count());
        Assert.Equal(7, styles.Select(s => s.Colour).Distinct().Count());
        // Okabe and Ito 2008, "Color universal design": the values of blue, vermillion and bluish green.
        Assert.Equal(new SKColor(0, 114, 178), styles[0].Colour);
        Assert.Equal(new SKColor(213, 94, 0), styles[1].Colour);
        Assert.Equal(new SKColor(0, 158, 115), styles[2].Colour);
    }

    [Fact]
    public void Letters_come_from_the_package_and_know_what_reports_write()
    {
        Assert.StartsWith("Inter", Typefaces.Regular.FamilyName, StringComparison.Ordinal);
        Assert.True(Typefaces.Bold.FontWeight > Typefaces.Regular.FontWeight);
        using SKFont font = Letters.Body.Font();
        Assert.True(font.ContainsGlyphs("0123456789°²³±µ–≤≥%·äéñøßłÅ"));
    }

    [Fact]
    public void A_view_keeps_its_pixels_and_has_a_true_scale_bar()
    {
        ViewImage view = SampleDrawings.View(1400, 300) with { Key = [] };
        using SKBitmap bitmap = SKBitmap.Decode(FigureFiles.Png(ViewFigure.Make(view, true, Run), Run, ViewFigure.PerPoint(view)));
        // 1400 pixels of 0.05 m are 70 m; the bar is the next of 1, 2, 5 above an eighth of that: 10 m, 200 pixels.
        int row = Enumerable.Range(0, bitmap.Height).First(y => y > 320 && Dark(bitmap, 40, y));
        int end = Enumerable.Range(20, 400).Last(x => Dark(bitmap, x, row));
        int start = Enumerable.Range(5, 400).First(x => Dark(bitmap, x, row));
        Assert.Equal(200, end - start, 3.0);

        static bool Dark(SKBitmap b, int x, int y) => b.GetPixel(x, y).Red < 90;
    }

    private static Figure Make(string name) => name switch
    {
        "net-host" => NetFigure.Make(SampleDrawings.Net(), Run),
        "net-contacts" => NetFigure.Make(SampleDrawings.ContactNet(), Run),
        "net-crowded" => NetFigure.Make(SampleDrawings.Net(500) with { Groups = [.. Enumerable.Range(1, 11).Select(i => $"host-{i}")], Title = new string('W', 90) }, Run),
        "net-empty" => NetFigure.Make(new NetDrawing { Name = "n", Title = "Nothing", Sentence = "No pole." }, Run),
        "width" => WidthFigure.Make(SampleDrawings.Profile(1, 60, 3), "toward 047° (NE)", Run, "w"),
        "width-long" => WidthFigure.Make(SampleDrawings.Profile(1, 3000, 12345), "along the centre line", Run, "w"),
        "width-full" => WidthFigure.Make(SampleDrawings.Full(), "toward 047° (NE)", Run, "w"),
        "rose" => RoseFigure.Make(new RoseDrawing { Title = "Strikes of 40 faces", Counts = [0, 3, 9, 12, 4, 0, 0, 1, 0, 0, 2, 5, 3, 1, 0, 0, 0, 0], Sentence = "Classes of 10 deg." }, Run),
        "section" => SectionFigure.Make(SampleDrawings.Section(), Run)!,
        "width-one" => WidthFigure.Make(SampleDrawings.Profile(1, 1, 0.5), "toward 047° (NE)", Run, "w"),
        _ => WidthFigure.Make(new WidthDrawing { Title = "Hidden", Sentence = "All hidden.", Points = [.. Enumerable.Range(0, 5).Select(i => new WidthPoint(i, null, null, null, null, null, Records.Width.StationStatus.BothHidden))] }, "toward 047° (NE)", Run, "w"),
    };

    [Theory]
    [InlineData("map")]
    [InlineData("nets")]
    public void A_sheet_of_page_width_has_a_white_rim(string name)
    {
        Findings f = DrawnSamples.Findings();
        Figure figure = name == "map"
            ? CloudStruct.Products.Map.MapFigure.Make(DrawnSamples.Drawn(f).Map!, DrawnSamples.Drawn(f).Surface, f.Intake.Frame, Run)
            : NetSheetFigure.Make(new NetSheet { Name = "nets", Title = "Several", Columns = 2, Nets = [SampleDrawings.Net(), SampleDrawings.ContactNet(), SampleDrawings.Net(5)], Sentence = "Equal area." }, Run);
        using SKBitmap bitmap = SKBitmap.Decode(FigureFiles.Png(figure, Run));
        Assert.Equal(2056, bitmap.Width);   // 174 mm at 300 dpi: 2055.1 pixels
        SKColor[] pixels = bitmap.Pixels;
        int inked = 0;
        for (int i = 0; i < pixels.Length; i++)
        {
            int x = i % bitmap.Width, y = i / bitmap.Width;
            if (pixels[i] == SKColors.White) continue;
            inked++;
            Assert.True(x >= 12 && y >= 12 && x < bitmap.Width - 12 && y < bitmap.Height - 12, $"{name}: ink at {x}, {y}");
        }

        Assert.True(inked > 20000);
    }

    [Fact]
    public void A_symbol_of_the_map_has_its_tick_down_dip()
    {
        // Strike 0 by the right-hand rule dips east: the tick lies right of the bar, the bar runs up and down.
        using var surface = SKSurface.Create(new SKImageInfo(200, 200));
        surface.Canvas.Clear(SKColors.White);
        surface.Canvas.Scale(4);
        CloudStruct.Products.Map.MapSymbols.Draw(new Pen(surface.Canvas, true), new MapSymbol(default, "vertical", 0, 90, 0, "", "host"), new SKPoint(25, 25));
        using SKBitmap upright = SKBitmap.FromImage(surface.Snapshot());
        surface.Canvas.Clear(SKColors.White);
        CloudStruct.Products.Map.MapSymbols.Draw(new Pen(surface.Canvas, true), new MapSymbol(default, "inclined", 0, 30, 0, "", "host"), new SKPoint(25, 25));
        using SKBitmap inclined = SKBitmap.FromImage(surface.Snapshot());
        bool Dark(SKBitmap b, int x, int y) => b.GetPixel(x, y).Red < 90;
        Assert.True(Dark(inclined, 100, 80) && Dark(inclined, 100, 120));
        Assert.True(Dark(inclined, 110, 100));
        Assert.False(Dark(inclined, 90, 100));
        Assert.True(Dark(upright, 110, 100) && Dark(upright, 90, 100));
    }
}
