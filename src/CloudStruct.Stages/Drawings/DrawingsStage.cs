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
        ViewImage[] views = settings.Pictures && input.Described.Cloud.Count > 0 ? Pictures.Of(input, settings, context) : [];
        context.Progress(1);
        return new DrawingsRecord { Nets = nets, Widths = widths, Views = views };
    }
}
