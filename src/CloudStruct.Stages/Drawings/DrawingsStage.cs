using CloudStruct.Records.Drawings;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Drawings;

/// <summary>Computes all that sheets show: places on nets, contours, widths along strike, pictures of the cloud.</summary>
/// <remarks>Products only paint what is here, so that table, plot and report cannot disagree.</remarks>
public sealed class DrawingsStage : IStage<Findings, DrawingSettings, DrawingsRecord>
{
    /// <inheritdoc/>
    public string Name => "drawings";

    /// <inheritdoc/>
    public DrawingsRecord Run(Findings input, DrawingSettings settings, StageContext context)
    {
        NetDrawing[] nets = [.. FaceNets.Of(input, settings, context), .. ContactNet.Of(input)];
        context.Progress(0.2);
        WidthDrawing[] widths = WidthDrawings.Of(input);
        bool points = input.Described.Cloud.Count > 0;
        (ViewImage[] views, SurfaceRaster? surface) = settings.Pictures && points ? Pictures.Of(input, settings, context) : ([], null);
        context.Progress(1);
        return new DrawingsRecord
        {
            Nets = [.. nets.Select(n => NetForms.In(settings.Net, n))],
            NetSheets = [.. NetSheets.Of(input, nets).Select(s => NetForms.In(settings.Net, s))],
            Roses = [.. Roses.Of(input)],
            Widths = widths,
            Views = views,
            Surface = surface,
            Map = points ? MapLayout.Of(input) : null,
            Faces = Outlines.Of(input.Faces.Faces, context),
            Strips = Strips.Of(input),
            Cloud = Thinning.Of(input, settings.ViewPoints),
            Sections = Sections.Of(input, settings.SectionStation, context),
            Chainage = ChainageCells.Of(input),
        };
    }
}
