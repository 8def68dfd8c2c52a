using System.Globalization;
using System.Security;
using System.Text;
using System.Xml;
using SkiaSharp;

namespace CloudStruct.Products.Plots;

/// <summary>Turns a figure into files, all from the one drawing routine.</summary>
internal static class FigureFiles
{
    /// <summary>Dots per inch of PNG pictures: what journals ask of line art with tints (common practice).</summary>
    public const int Dpi = 300;

    private const float PerPoint = Dpi / 72f;

    /// <summary>Valid XML of the size in millimetres, text as outlines, with title and description for screen readers.</summary>
    public static byte[] Svg(Figure figure, string runId)
    {
        using var raw = new MemoryStream();
        using (SKCanvas canvas = SKSvgCanvas.Create(new SKRect(0, 0, figure.WidthPt, figure.HeightPt), raw))
        {
            Paper(canvas, figure);
            figure.Draw(new Pen(canvas, outlines: true));
        }
        // The root is written anew as text: to parse and save the whole drawing took as long as to make it.
        string drawn = Encoding.UTF8.GetString(raw.GetBuffer(), 0, (int)raw.Length);
        int root = drawn.IndexOf("<svg", StringComparison.Ordinal), inside = drawn.IndexOf('>', root) + 1;
        if (root < 0 || drawn[inside - 2] == '/') throw new InvalidOperationException($"the drawing {figure.Name} has no content");
        string head = string.Create(
            CultureInfo.InvariantCulture,
            $"<?xml version=\"1.0\" encoding=\"utf-8\"?>\n<svg xmlns=\"http://www.w3.org/2000/svg\" xmlns:xlink=\"http://www.w3.org/1999/xlink\" width=\"{Millimetres(figure.WidthPt)}\" height=\"{Millimetres(figure.HeightPt)}\" viewBox=\"0 0 {figure.WidthPt:0.###} {figure.HeightPt:0.###}\" role=\"img\"><title>{Escaped(figure.Title)}</title><desc>{Escaped($"{figure.Words} Run {runId}.")}</desc>");
        return [.. Encoding.UTF8.GetBytes(head), .. raw.GetBuffer().AsSpan(Encoding.UTF8.GetByteCount(drawn.AsSpan(0, inside)), (int)raw.Length - Encoding.UTF8.GetByteCount(drawn.AsSpan(0, inside)))];
    }

    // Control characters cannot stand in XML 1.0, not even escaped.
    private static string Escaped(string text) =>
        SecurityElement.Escape(string.Concat(text.Where(c => XmlConvert.IsXmlChar(c) || char.IsSurrogate(c))));

    /// <summary>One page of the figure's size, text as text in our typeface. The only date is that of the input.</summary>
    public static byte[] Pdf(Figure figure, RunFacts facts)
    {
        DateTime? date = facts.InputDate?.ToDateTime(TimeOnly.MinValue, DateTimeKind.Utc);
        using var stream = new MemoryStream();
        using (SKDocument document = SKDocument.CreatePdf(stream, new SKDocumentPdfMetadata
        {
            Title = figure.Title,
            Subject = "Run " + facts.RunId,
            Creator = "CloudStruct " + facts.ToolVersion,
            Producer = "CloudStruct " + facts.ToolVersion,
            Creation = date,
            Modified = date,
            RasterDpi = Dpi,
            EncodingQuality = 101,
        }))
        {
            using SKCanvas canvas = document.BeginPage(figure.WidthPt, figure.HeightPt);
            figure.Draw(new Pen(canvas, outlines: false));
            document.EndPage();
            document.Close();
        }
        return stream.ToArray();
    }

    /// <summary>A picture of 300 dots per inch, which its header states.</summary>
    public static byte[] Png(Figure figure, string runId) => Png(figure, runId, PerPoint);

    /// <summary>A picture with so many pixels per point.</summary>
    public static byte[] Png(Figure figure, string runId, float perPoint)
    {
        var info = new SKImageInfo(
            (int)MathF.Ceiling(figure.WidthPt * perPoint), (int)MathF.Ceiling(figure.HeightPt * perPoint), SKColorType.Rgba8888, SKAlphaType.Opaque);
        using SKSurface surface = SKSurface.Create(info);
        SKCanvas canvas = surface.Canvas;
        canvas.Clear(SKColors.White);
        canvas.Scale(perPoint);
        figure.Draw(new Pen(canvas, outlines: false));
        using SKImage image = surface.Snapshot();
        using SKPixmap pixels = image.PeekPixels();
        // On a picture of 1,550 x 1,440 points level 6 with two filters tried took 0.28 s, level 3 with one 0.09 s for 8 % more.
        using SKData png = pixels.Encode(new SKPngEncoderOptions(SKPngEncoderFilterFlags.Sub, 3))
            ?? throw new InvalidOperationException($"the picture {figure.Name} could not be encoded");
        return PngChunks.WithFacts(png.ToArray(), perPoint * 72, figure.Title, runId);
    }

    private static void Paper(SKCanvas canvas, Figure figure)
    {
        using var white = new SKPaint { Color = SKColors.White };
        canvas.DrawRect(0, 0, figure.WidthPt, figure.HeightPt, white);
    }

    private static string Millimetres(float points) => (points / 72 * 25.4f).ToString("0.##", CultureInfo.InvariantCulture) + "mm";
}
