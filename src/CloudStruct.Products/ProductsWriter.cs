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

        // The cloud waits for the disk, the plots for the processor: together they take little longer than the slower.
        Task cloud = Start(files, findings, pieces, facts, settings, context with { Progress = done => context.Progress(0.05 + (0.85 * done)) });
        List<DrawnPlot> plots;
        try
        {
            plots = PlotsWriter.Write(files, findings, drawings, facts, context);
            MapWriter.Write(files, findings, drawings, facts, settings, context.Threads);
            using Stream model = files.Create("model/faces.glb");
            ModelWriter.Write(model, findings, drawings, facts);
        }
        finally
        {
            cloud.GetAwaiter().GetResult();
        }

        files.Write("report.html", new ReportPage(findings, drawings, facts, plots, PageAssets.Built).Bytes());
        context.Progress(1);
        return files.Written;
    }

    // With one thread the cloud is written before anything else.
    private static Task Start(
        ResultFolder files, Findings findings, IPieces pieces, RunFacts facts, ProductSettings settings, StageContext context)
    {
        if (settings.Clouds == "none") return Task.CompletedTask;
        string name = ClassifiedCloudWriter.NameOf(settings);
        CrsInfo crs = findings.Intake.Frame.Crs;
        if (crs is not { HorizontalUnitM: 1, VerticalUnitM: 1 })
            context.Say(new Remark("products", $"{name} is in metres and names no coordinate system, because {crs.Name} is not in metres.", false));
        Stream stream = files.Create(name);
        var task = new Task(() =>
        {
            using (stream)
            {
                if (settings.Clouds == "thinned") ClassifiedCloudWriter.WriteThinned(stream, findings, facts);
                else ClassifiedCloudWriter.WriteAll(stream, findings, pieces, facts, context, settings.Clouds == "laz");
            }
        });
        if (context.Threads > 1) task.Start();
        else task.RunSynchronously();
        return task;
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
