using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Contacts;

/// <summary>Follows the contacts of every dike: traces, attitudes along strike or the plain statement that they give none,
/// centre lines, and the domain of every face.</summary>
public sealed class ContactsStage : IStage<ContactsInput, ContactSettings, ContactsRecord>
{
    private const double LargestBendDeg = 60;

    /// <inheritdoc/>
    public string Name => "contacts";

    /// <inheritdoc/>
    public ContactsRecord Run(ContactsInput input, ContactSettings settings, StageContext context)
    {
        WorkingCloud cloud = input.Described.Cloud;
        var sides = new FaceSides(cloud, input.Classes, input.Faces, input.Domains);
        var dikes = new List<DikeFrame>();
        var rows = new List<Contact>();
        var traces = new List<MarginTrace>();
        foreach (DikeBody body in input.Classes.Dikes)
        {
            context.Stop.ThrowIfCancellationRequested();
            if (Trace(body, input, settings, context) is not { } tracer)
            {
                context.Say(new Remark(Name, Invariant($"Dike {body.Dike}: its margins could not be followed; it has no contact rows."), true));
                continue;
            }

            TraceCell[] surface = tracer.MarkMargins(sides);
            tracer = tracer.With(surface);
            dikes.Add(tracer.Frame(input.Baseline));
            rows.AddRange(tracer.Rows());
            traces.AddRange(tracer.Traces());
            context.Say(tracer.Summary(Name, tracer.Ends(cloud, input.Classes)));
            if (Bends(body)) context.Say(new Remark(Name, Invariant($"Dike {body.Dike} bends by more than {LargestBendDeg} deg from its mean trend; margins beyond that are not followed. Measure the two limbs as surveys of their own."), true));
        }

        context.Progress(1);
        return new ContactsRecord
        {
            Dikes = [.. dikes], Contacts = [.. rows], Traces = [.. traces], DomainOfFace = sides.Domain, DikeOfFace = sides.Dike, InPlaceOfFace = sides.InPlace,
        };
    }

    private static DikeTracer? Trace(DikeBody body, ContactsInput input, ContactSettings settings, StageContext context)
    {
        WorkingCloud cloud = input.Described.Cloud;
        MarginEdge[] edges = EdgeScan.Of(
            cloud, input.Classes, body.Dike, settings.OcclusionSpacings * cloud.SpacingM, context.Threads, context.Stop);
        SheetPiece[] pieces = [.. body.Windows.Where(w => w.WidthM > 0 && w.LengthM > 0)
            .Select(w => new SheetPiece(w.Middle, w.Normal.Unit(), w.WidthM, w.LengthM))];
        if (pieces.Length == 0 || edges.Length == 0) return null;
        var tracker = new MarginTracker(
            edges, Chainage.Direction(input.Baseline), cloud.Frame.TurnDeg, LevelTrend(pieces), cloud.SpacingM, settings);
        if (!tracker.Follow(pieces)) return null;
        var ground = new GroundPlanes(cloud, tracker);
        TraceCell[] cells = settings.RefineByColour && input.Described.LogRedGreen.Length == cloud.Count && body.ByColour
            ? new ColourEdges(input.Described, input.Classes, tracker).Refine(tracker.Cells)
            : tracker.Cells;
        cells = BracketedCells.Added(cells, cloud, input.Classes, body.Dike, tracker);
        var priors = new PriorPoles(input.Readings, cloud.Frame, tracker, settings.PriorSigmaDeg);
        return new DikeTracer(body.Dike, tracker, cells, cloud.Frame, ground.NormalAt, priors, settings);
    }

    // The sheet's level line is a function over a straight axis.
    private static bool Bends(DikeBody body)
    {
        SlabWindow[] windows = [.. body.Windows.Where(w => w.WidthM > 0 && w.LengthM > 0)];
        Vec3 mean = default;
        foreach (SlabWindow w in windows) mean += w.Normal * (w.Normal.Dot(windows[0].Normal) < 0 ? -w.LengthM : w.LengthM);
        return windows.Length > 0 && mean.Length > 0 && windows.Any(w => Math.Abs(w.Normal.Unit().Dot(mean.Unit())) < Math.Cos(LargestBendDeg * Math.PI / 180));
    }

    // Direction in which a nearly level sheet is longest: from the first to the last window.
    private static Vec3 LevelTrend(SheetPiece[] pieces)
    {
        Vec3 d = pieces[^1].Middle - pieces[0].Middle;
        d = new Vec3(d.X, d.Y, 0);
        return d.Length > 0 ? d.Unit() : new Vec3(1, 0, 0);
    }
}
