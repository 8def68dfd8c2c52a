using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>Compass readings of contacts that the user wants to take part, and the rows that follow when they do.</summary>
/// <remarks>A reading is a round law about its pole; it multiplies the law of what the traces say, so that exponents add. The rows
/// of the traces alone stay: what a reading adds can be seen.</remarks>
internal sealed class PriorPoles
{
    private const double ReachM = 2;   // from the margins to the reading, besides its own error
    private readonly (string Id, SheetPoint At, Vec3 Normal)[] near;
    private readonly double kappa, windowM;

    /// <summary>Those of one dike.</summary>
    /// <param name="readings">All readings, places local.</param>
    /// <param name="frame">Survey frame.</param>
    /// <param name="tracker">The dike's margins.</param>
    /// <param name="sigmaDeg">One standard deviation of a reading's pole in each direction [deg].</param>
    public PriorPoles(FieldReading[] readings, SurveyFrame frame, MarginTracker tracker, double sigmaDeg)
    {
        double sigma = sigmaDeg * Math.PI / 180;
        kappa = 1 / (2 * sigma * sigma);
        windowM = tracker.WindowM;
        var own = new List<(string, SheetPoint, Vec3)>();
        foreach (FieldReading r in readings.Where(r => r.Use == ReadingUse.Prior && r.Kind == ReadingKind.Contact))
        {
            if (r.NormalInGrid(frame.ConvergenceDeg) is not { } normal) continue;
            // Without a height the reading is taken where the traces run.
            double z = double.IsNaN(r.Place.Z) ? tracker.Cells.MinBy(c => Level(c.Place - r.Place)).Place.Z : r.Place.Z;
            SheetPoint at = tracker.Sheet.Of(new Vec3(r.Place.X, r.Place.Y, z));
            if (at.S < tracker.Cells[0].At.S - windowM || at.S > tracker.Cells[^1].At.S + windowM) continue;
            double away = Math.Min(Math.Abs(tracker.Guess.Distance(Margin.A, at)), Math.Abs(tracker.Guess.Distance(Margin.B, at)));
            if (away <= ReachM + (2 * r.SigmaM)) own.Add((r.Id, at, normal));
        }

        near = [.. own];
    }

    /// <summary>Names of the readings that take part.</summary>
    public IEnumerable<string> Ids => near.Select(n => n.Id);

    /// <summary>What the readings within a window of a stretch and its traces say together; null without a reading.</summary>
    /// <param name="s">Middle of the stretch [m].</param>
    /// <param name="traces">What the traces say.</param>
    public BinghamAxis? With(double s, BinghamAxis traces)
    {
        (string, SheetPoint At, Vec3 Normal)[] own = [.. near.Where(n => Math.Abs(n.At.S - s) <= windowM)];
        if (own.Length == 0) return null;
        foreach ((_, _, Vec3 normal) in own) traces = traces.And(BinghamAxis.Watson(normal, kappa));
        return traces;
    }

    private static double Level(Vec3 d) => (d.X * d.X) + (d.Y * d.Y);
}
