using CloudStruct.Products.Plots;
using CloudStruct.Records.Drawings;

namespace CloudStruct.Products.Comparing;

/// <summary>Writes one stereonet by itself.</summary>
public static class NetWriter
{
    /// <summary>Writes NAME.svg, .pdf and .png into a folder.</summary>
    /// <returns>File names.</returns>
    public static IReadOnlyList<string> Write(string folder, NetDrawing net, RunFacts facts)
    {
        var files = new ResultFolder(folder);
        Figure figure = NetFigure.Make(net, facts.RunId);
        files.Write(net.Name + ".svg", FigureFiles.Svg(figure, facts.RunId));
        files.Write(net.Name + ".pdf", FigureFiles.Pdf(figure, facts));
        files.Write(net.Name + ".png", FigureFiles.Png(figure, facts.RunId));
        return files.Written;
    }
}
