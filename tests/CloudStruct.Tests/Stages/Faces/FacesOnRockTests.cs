using CloudStruct.Accuracy;
using CloudStruct.Accuracy.Scores;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Simulate;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Thin;
using Xunit.Abstractions;

namespace CloudStruct.Tests.Stages.Faces;

/// <summary>Faces of simulated rock against its truth: small outcrops without cover, which keeps its full size and would bury them.</summary>
public class FacesOnRockTests(ITestOutputHelper output)
{
    // The figures that the main job has to reach, on seeds that nothing was tuned on; the study faces prints all of them.
    [Fact]
    public void Faces_of_simulated_rock_are_found_and_right()
    {
        var score = new FaceScore();
        foreach (ulong seed in new ulong[] { 901, 902 })
        {
            (SimulatedOutcrop outcrop, DescribedCloud described) = Rock("no-dike", seed, 120_000);
            FaceSet found = new FacesStage().Run(described, new FaceSettings(), StageContext.Plain());
            score.Add(outcrop, described.Cloud, found, TruthOfPoints.Nearest(described.Cloud, outcrop));
        }

        output.WriteLine($"recall by area {score.RecallByArea:F3}, precision {score.Precision:F3}, median error {score.MedianErrorDeg:F2} deg, coverage {score.Coverage:F3}");
        Assert.True(score.RecallByArea >= 0.90, $"recall {score.RecallByArea}");
        Assert.True(score.Precision >= 0.90, $"precision {score.Precision}");
        Assert.True(score.MedianErrorDeg <= 1, $"median error {score.MedianErrorDeg}");
    }

    [Fact]
    public void Any_number_of_threads_gives_the_same_faces_to_the_bit()
    {
        (_, DescribedCloud described) = Rock("demo", 7, 60_000);
        FaceSet one = Run(1);
        Assert.NotEmpty(one.Faces);
        foreach (int threads in new[] { 2, 4 })
        {
            FaceSet other = Run(threads);
            Assert.Equal(one.FaceOfPoint, other.FaceOfPoint);
            Assert.Equal(one.NoiseM, other.NoiseM);
            Assert.Equal(one.NoiseLengthM, other.NoiseLengthM);
            for (int f = 0; f < one.Faces.Length; f++)
            {
                Assert.Equal(one.Faces[f] with { Outline = [] }, other.Faces[f] with { Outline = [] });
                Assert.Equal(one.Faces[f].Outline, other.Faces[f].Outline);
            }
        }

        FaceSet Run(int threads) => new FacesStage().Run(described, new FaceSettings(), StageContext.Plain(threads: threads));
    }

    private static (SimulatedOutcrop Outcrop, DescribedCloud Described) Rock(string plan, ulong seed, int points)
    {
        SimulatedOutcrop outcrop = Outcrop.Make(FacesStudy.Sized(OutcropPlan.ByName(plan), points), seed);
        StageContext context = StageContext.Plain();
        IPieces pieces = new IntakeStage().Run(
            new SurveyInput { Sources = [outcrop.AsSource()], Crs = outcrop.Crs }, new IntakeSettings(), context);
        WorkingCloud cloud = new ThinStage().Run(pieces, new ThinSettings(), context);
        return (outcrop, new DescribeStage().Run(cloud, new DescribeSettings(), context));
    }
}
