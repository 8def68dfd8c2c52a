using CloudStruct.Accuracy.Scores;
using CloudStruct.Simulate;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Every stage on outcrops of known truth, one line each: the figures that a user would see go wrong.</summary>
public sealed class WholeStudy : IStudy
{
    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        Console.WriteLine("plan seed | recall precision error_deg cone95 | dikes iou | width_error bias cover | contact_deg cone95 plane_share | measured_share hidden_measured | sets | s");
        foreach (string plan in options.Plans.Length > 0 ? options.Plans : ["demo"])
        {
            foreach (ulong seed in options.Seeds) Console.WriteLine(Line(plan, seed, new WholeScene(OutcropPlan.ByName(plan), seed, options.Points)));
        }
    }

    /// <summary>One line of the table.</summary>
    public static string Line(string plan, ulong seed, WholeScene s)
    {
        WidthScore w = s.Width;
        return Invariant(
            $"{plan} {seed} | {s.Faces.RecallByArea:0.000} {s.Faces.Precision:0.000} {s.Faces.MedianErrorDeg:0.00} {s.Faces.Coverage:0.000} | {s.Classes.Found}/{s.Classes.True} {s.Classes.DikeIou:0.000} | ") +
            Invariant($"{Median(w.WidthErrors.Select(Math.Abs)):0.0000} {Median(w.WidthErrors):0.0000} {Share(w.WidthRatios):0.00} | {Median(w.ContactErrorsDeg):0.00} {Share(w.ContactRatios):0.00} {w.Rows.Plane}/{w.Rows.All} | ") +
            Invariant($"{(w.ShownM > 0 ? w.MeasuredM / w.ShownM : double.NaN):0.00} {w.HiddenMeasured} | {s.Sets.Sets.Length} | {s.Seconds:0.0}");
    }

    /// <summary>Middle value; NaN of nothing.</summary>
    public static double Median(IEnumerable<double> values)
    {
        double[] sorted = [.. values.Order()];
        return sorted.Length == 0 ? double.NaN : 0.5 * (sorted[(sorted.Length - 1) / 2] + sorted[sorted.Length / 2]);
    }

    // Ratios of error to stated half-width: up to 1 the truth lies inside.
    private static double Share(List<double> ratios) => ratios.Count == 0 ? double.NaN : ratios.Count(r => r <= 1) / (double)ratios.Count;
}
