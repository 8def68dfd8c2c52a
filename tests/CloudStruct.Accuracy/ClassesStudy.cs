using System.Diagnostics;
using CloudStruct.Accuracy.Scores;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Simulate;
using CloudStruct.Stages.Classify;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Thin;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Classes found against true classes: dikes found, overlap with the true dike, cover, kappa, time.</summary>
/// <remarks>--points thins the outcrop: fewer points on the same rock.</remarks>
public sealed class ClassesStudy : IStudy
{
    private static readonly string[] Plans =
        ["demo", "two-dikes", "tilted", "pavement", "long", "low-contrast", "texture-only", "no-colour", "no-dike", "gully"];

    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        foreach (string plan in options.Plans.Length > 0 ? options.Plans : Plans)
        {
            var iou = new List<double>();
            int right = 0;
            foreach (ulong seed in options.Seeds)
            {
                ClassScore score = One(OutcropPlan.ByName(plan), seed, options.Points);
                if (score.True > 0) iou.Add(score.DikeIou);
                if (score.Found == score.True) right++;
            }

            string overlap = iou.Count > 0 ? Invariant($", dike IoU mean {iou.Average():0.000}, least {iou.Min():0.000}") : "";
            Console.WriteLine(Invariant($"{plan}: right number of dikes on {right} of {options.Seeds.Length} seeds{overlap}"));
        }
    }

    private static ClassScore One(OutcropPlan plan, ulong seed, int? points)
    {
        SimulatedOutcrop outcrop = Outcrop.Make(plan, seed, points);
        StageContext context = StageContext.Plain(seed, Environment.ProcessorCount, r => Console.WriteLine("    " + r.Text));
        IPieces pieces = new IntakeStage().Run(
            new SurveyInput { Name = outcrop.Name, Sources = [outcrop.AsSource()], Crs = outcrop.Crs }, new IntakeSettings(), context);
        DescribedCloud described = new DescribeStage().Run(new ThinStage().Run(pieces, new ThinSettings(), context), new DescribeSettings(), context);
        var process = Process.GetCurrentProcess();
        TimeSpan before = process.TotalProcessorTime;
        ClassifiedCloud classes = new ClassifyStage().Run(new ClassifyInput(described, HandLabels.None), new ClassifySettings(), context);
        process.Refresh();
        double seconds = (process.TotalProcessorTime - before).TotalSeconds;
        ClassScore score = ClassScore.Of(outcrop, TruthOfPoints.Nearest(described.Cloud, outcrop), classes);
        Console.WriteLine(Invariant(
            $"{plan.Name} {seed}: {described.Cloud.Count} points at {described.Cloud.SpacingM * 100:0.0} cm; dikes {score.Found} of {score.True}; IoU {score.DikeIou:0.000} (recall {score.DikeRecall:0.000}, precision {score.DikePrecision:0.000}); cover recall {score.CoverRecall:0.000}, precision {score.CoverPrecision:0.000}; kappa {score.Kappa:0.000}; {seconds:0.0} s of processor"));
        foreach (DikeBody dike in classes.Dikes)
        {
            Console.WriteLine(Invariant(
                $"    dike {dike.Dike}: {dike.Windows.Length} windows, median width {dike.Windows.Select(w => w.WidthM).Order().ElementAt(dike.Windows.Length / 2):0.00} m, margins wander {dike.MarginWanderM:0.000} m, separation {dike.Separation:0.000}, by {(dike.ByColour ? "colour" : "texture")}"));
        }

        return score;
    }
}
