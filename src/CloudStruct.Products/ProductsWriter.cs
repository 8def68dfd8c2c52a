using System.Collections.Concurrent;
using System.Runtime.ExceptionServices;
using CloudStruct.Formats.Tables;
using CloudStruct.Products.Clouds;
using CloudStruct.Products.Map;
using CloudStruct.Products.Model;
using CloudStruct.Products.Plots;
using CloudStruct.Products.Report;
using CloudStruct.Products.Tables;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Products;

/// <summary>Writes everything that a run leaves behind, except run.json and run.log, which are the program's.</summary>
/// <remarks>Nothing is computed here: what a table, a plot and the report say stands in a record already, so they cannot
/// disagree. The same records give the same bytes.</remarks>
public sealed class ProductsWriter
{
    /// <summary>Writes tables, plots, clouds and the report below a folder.</summary>
    /// <param name="folder">An existing folder; the program swaps it into place afterwards.</param>
    /// <param name="findings">Every stage's record.</param>
    /// <param name="drawings">What the sheets need computed.</param>
    /// <param name="pieces">The input points, streamed once more for the classified cloud.</param>
    /// <param name="facts">About the run.</param>
    /// <param name="settings">What to write.</param>
    /// <param name="context">Progress, remarks and cancellation.</param>
    /// <returns>Names of the files written, relative to the folder, with forward slashes, in the order of writing.</returns>
    public IReadOnlyList<string> Write(
        string folder, Findings findings, DrawingsRecord drawings, IPieces pieces, RunFacts facts, ProductSettings settings, StageContext context)
    {
        var files = new ResultFolder(folder);
        WriteTables(files, findings, facts);
        context.Progress(0.05);

        // Longest first: the cloud waits for the disk while the plots take the processor.
        var work = new List<Action>();
        if (Cloud(files, findings, pieces, facts, settings, context with { Progress = done => context.Progress(0.05 + (0.85 * done)) }) is { } cloud) work.Add(cloud);
        work.AddRange(MapWriter.Plan(files, findings, drawings, facts, settings));
        string model = files.Reserve("model/faces.glb");
        work.Add(() =>
        {
            using var stream = new FileStream(model, FileMode.Create, FileAccess.ReadWrite, FileShare.None);
            ModelWriter.Write(stream, findings, drawings, facts);
        });
        (List<Action> sheets, Func<ResultFolder, List<DrawnPlot>> finish) = PlotsWriter.Plan(findings, drawings, facts);
        work.AddRange(sheets);
        DoAll(work, context);
        List<DrawnPlot> plots = finish(files);
        files.Write("report.html", new ReportPage(findings, drawings, facts, plots, PageAssets.Built).Bytes());
        context.Progress(1);
        return files.Written;
    }

    // Each piece is made from records alone and writes its own file, so who does which changes no byte.
    private static void DoAll(List<Action> work, StageContext context)
    {
        var options = new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, context.Threads), CancellationToken = context.Stop };
        try
        {
            Parallel.ForEach(Partitioner.Create(work, EnumerablePartitionerOptions.NoBuffering), options, piece => piece());
        }
        catch (AggregateException several)
        {
            // The first says what to do; the others mostly follow from it.
            ExceptionDispatchInfo.Capture(several.InnerExceptions[0]).Throw();
        }
    }

    private static Action? Cloud(
        ResultFolder files, Findings findings, IPieces pieces, RunFacts facts, ProductSettings settings, StageContext context)
    {
        if (settings.Clouds == "none") return null;
        string name = ClassifiedCloudWriter.NameOf(settings);
        CrsInfo crs = findings.Intake.Frame.Crs;
        if (crs is not { HorizontalUnitM: 1, VerticalUnitM: 1 })
            context.Say(new Remark("products", $"{name} is in metres and names no coordinate system, because {crs.Name} is not in metres.", false));
        string path = files.Reserve(name);
        return () =>
        {
            using var stream = new FileStream(path, FileMode.Create, FileAccess.ReadWrite, FileShare.None);
            if (settings.Clouds == "thinned") ClassifiedCloudWriter.WriteThinned(stream, findings, facts);
            else ClassifiedCloudWriter.WriteAll(stream, findings, pieces, facts, context, settings.Clouds == "laz");
        };
    }

    private static void WriteTables(ResultFolder files, Findings findings, RunFacts facts)
    {
        CsvSheet[] sheets = [.. Sheets.All.Where(t => t.Applies(findings)).Select(t => t.Fill(findings))];
        foreach (CsvSheet sheet in sheets)
        {
            using Stream stream = files.Create("tables/" + sheet.FileName);
            sheet.Write(stream);
        }
        using Stream metadata = files.Create("tables/tables-metadata.json");
        CsvMetadata.Write(metadata, sheets, FrameWords.OfTables(findings, facts));
    }
}
