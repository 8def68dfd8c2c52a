using System.Diagnostics;
using CloudStruct.Accuracy.Scores;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using CloudStruct.Simulate;
using CloudStruct.Stages.Contacts;
using CloudStruct.Stages.Width;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Contacts and widths by themselves, fed with classes from the truth that wander and err as a classifier's do.</summary>
public sealed class WidthStudy : IStudy
{
    private static readonly string[] Usual = ["demo", "tilted", "two-dikes", "long", "pavement"];

    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        foreach (string plan in options.Plans.Length > 0 ? options.Plans : Usual)
        {
            var all = new WidthScore();
            foreach (ulong seed in options.Seeds)
            {
                WidthScene scene = WidthScene.Make(OutcropPlan.ByName(plan), seed, options.Points, 0.03);
                var one = new WidthScore();
                double seconds = Measure(scene, [one, all]);
                Console.WriteLine(Invariant($"{plan,-10} {seed,4} {Line(one)}  {seconds:0.00} s of processor for {scene.Described.Cloud.Count / 1e6:0.00} M"));
            }

            Console.WriteLine(Invariant($"{plan,-10}  all {Line(all)}"));
        }
    }

    private static double Measure(WidthScene scene, WidthScore[] scores)
    {
        var none = new FaceSet { FaceOfPoint = new int[scene.Described.Cloud.Count] };
        using Process own = Process.GetCurrentProcess();
        double before = own.TotalProcessorTime.TotalSeconds;
        ContactsRecord contacts = new ContactsStage().Run(new ContactsInput(scene.Described, scene.Classes, none, []), new ContactSettings(), StageContext.Plain());
        WidthRecord width = new WidthStage().Run(new WidthInput(scene.Described, scene.Classes, contacts), new WidthSettings(), StageContext.Plain());
        own.Refresh();
        double seconds = own.TotalProcessorTime.TotalSeconds - before;
        foreach (WidthScore s in scores) s.Add(scene.Outcrop, contacts, width);
        if (Environment.GetEnvironmentVariable("WIDTH_ROWS") is not null) Details(contacts, width, scene.Outcrop);
        return seconds;
    }

    internal static string Line(WidthScore s)
    {
        string stations = string.Join(" ", s.Stations.OrderBy(p => p.Key).Select(p => Invariant($"{p.Key}:{p.Value}")));
        return Invariant(
            $"width % med {100 * Quantile(s.WidthErrors.Select(Math.Abs), 0.5):0.00} p95 {100 * Quantile(s.WidthErrors.Select(Math.Abs), 0.95):0.00} bias {100 * s.WidthErrors.DefaultIfEmpty(double.NaN).Average():0.00} in95 {Inside(s.WidthRatios):0.000}; contact deg med {Quantile(s.ContactErrorsDeg, 0.5):0.00} p95 {Quantile(s.ContactErrorsDeg, 0.95):0.00} in95 {Inside(s.ContactRatios):0.000} (mean normal med {Quantile(s.NormalErrorsDeg, 0.5):0.00} p95 {Quantile(s.NormalErrorsDeg, 0.95):0.00} in95 {Inside(s.NormalRatios):0.000}; mean plane in95 {Inside(s.PlaneRatios):0.000}); plane {s.Rows.Plane}/{s.Rows.All}; length {s.MeasuredM / s.ShownM:0.00}; hidden {s.HiddenMeasured}; trace cm bias {100 * s.TraceOffsetsM.DefaultIfEmpty(double.NaN).Average():0.00} med {100 * Quantile(s.TraceOffsetsM.Select(Math.Abs), 0.5):0.00} p95 {100 * Quantile(s.TraceOffsetsM.Select(Math.Abs), 0.95):0.00}; apparent % med {100 * Quantile(s.ApparentErrors.Select(Math.Abs), 0.5):0.00}; {stations}");
    }

    internal static double Quantile(IEnumerable<double> values, double share) => Quantiles.Of(values, share);

    internal static double Inside(List<double> ratios) => ratios.Count == 0 ? double.NaN : (double)ratios.Count(r => Math.Abs(r) <= 1) / ratios.Count;

    internal static void Details(ContactsRecord contacts, WidthRecord width, SimulatedOutcrop truth)
    {
        foreach (DikeFrame d in contacts.Dikes) Console.WriteLine(Invariant($"  dike {d.Dike} window {d.WindowM:0.0} scatter {d.TraceScatterM:0.000} range {d.TraceRangeM:0.00} white {d.TraceWhiteShare} shared {d.TraceShared}"));
        foreach (Contact c in contacts.Contacts) Console.WriteLine(Invariant($"  {c.Margin} {c.ChainageFromM:0.0}-{c.ChainageToM:0.0} {c.Constraint} {c.Evidence} dip {c.Attitude?.DipDeg:0.0} strike {c.Attitude?.StrikeDeg:0.0} cone {c.Region?.Cone95Deg:0.00} relief {c.ReliefM:0.00} rms {c.RmsM:0.000} n {c.Points} lean {c.LeanToBDeg:0.0}"));
        foreach (Station s in width.Stations)
        {
            double? real = s.AtA is { } a && s.AtB is { } b ? truth.Dikes[s.Dike - 1].WidthAt(((a + b) / 2) + truth.Origin) : null;
            double chainage = truth.Dikes[s.Dike - 1].ChainageAt(s.Place + truth.Origin);
            Console.WriteLine(Invariant($"  {s.Number} at {s.ChainageM:0.0} ({chainage:0.0}, hidden {truth.Dikes[s.Dike - 1].IsHidden(chainage)}) {s.Status} true {s.TrueWidthM:0.000} ±{(s.TrueWidthHigh95M - s.TrueWidthLow95M) / 2:0.000} truth {real:0.000} apparent {s.ApparentWidthM:0.000} exposed {s.ExposedWidthM:0.00} visible {s.VisibleWidthM:0.00}"));
        }
    }
}
