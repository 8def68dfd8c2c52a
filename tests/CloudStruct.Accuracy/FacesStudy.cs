using System.Diagnostics;
using CloudStruct.Accuracy.Scores;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Simulate;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Thin;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Faces found against true faces: what is found, what is wrong, attitude errors and whether their cones are right.</summary>
/// <remarks>--points makes the outcrop smaller at the plan's density, so that short runs show the same rock.</remarks>
public sealed class FacesStudy : IStudy
{
    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        string[] plans = options.Plans.Length > 0 ? options.Plans : ["demo", "no-dike", "two-dikes", "tilted"];
        var all = new FaceScore();
        foreach (string plan in plans)
        {
            var score = new FaceScore();
            foreach (ulong seed in options.Seeds) One(Sized(OutcropPlan.ByName(plan), options.Points), seed, score, all);
            score.Print(plan);
        }

        if (plans.Length > 1) all.Print("all plans");
    }

    /// <summary>The plan cut down to about so many points, at its own density.</summary>
    public static OutcropPlan Sized(OutcropPlan plan, int? points)
    {
        if (points is not { } wanted) return plan;
        double scale = Math.Sqrt((double)wanted / plan.Points);
        return plan with { Points = wanted, LengthM = plan.LengthM * scale, BreadthM = plan.BreadthM * scale };
    }

    private static void One(OutcropPlan plan, ulong seed, FaceScore score, FaceScore all)
    {
        SimulatedOutcrop outcrop = Outcrop.Make(plan, seed);
        StageContext context = StageContext.Plain(seed, Environment.ProcessorCount);
        IPieces pieces = new IntakeStage().Run(
            new SurveyInput { Name = outcrop.Name, Sources = [outcrop.AsSource()], Crs = outcrop.Crs }, new IntakeSettings(), context);
        WorkingCloud cloud = new ThinStage().Run(pieces, new ThinSettings(), context);
        DescribedCloud described = new DescribeStage().Run(cloud, new DescribeSettings(), context);
        var watch = Stopwatch.StartNew();
        FaceSet found = new FacesStage().Run(described, new FaceSettings(), context);
        Console.WriteLine(Invariant(
            $"{plan.Name} {seed}: {cloud.Count} points at {cloud.SpacingM * 100:F1} cm; noise {outcrop.NoiseM * 1000:F1} mm shared over {outcrop.NoiseLengthM * 100:F0} cm and {outcrop.WhiteNoiseM * 1000:F1} mm white, told {found.NoiseM * 1000:F1} mm over {found.NoiseLengthM * 100:F0} cm; {watch.Elapsed.TotalSeconds:F1} s"));
        int[] nearest = TruthOfPoints.Nearest(cloud, outcrop);
        score.Add(outcrop, cloud, found, nearest);
        all.Add(outcrop, cloud, found, nearest);
    }
}
