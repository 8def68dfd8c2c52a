using CloudStruct.Accuracy;
using CloudStruct.Simulate;
using Xunit.Abstractions;

namespace CloudStruct.Tests;

/// <summary>The demonstration survey against its own truth, on seeds that nothing was tuned on. Each outcrop is one draw, so
/// the limits hold for the three together; the line of each is printed.</summary>
public class DemoTruthTests(ITestOutputHelper output)
{
    [Fact]
    public void Three_fresh_outcrops_are_measured_as_the_demonstration_promises()
    {
        ulong[] seeds = [9501, 9502, 9503];
        var scenes = new List<WholeScene>();
        foreach (ulong seed in seeds)
        {
            scenes.Add(new WholeScene(OutcropPlan.ByName("demo"), seed));
            output.WriteLine(WholeStudy.Line("demo", seed, scenes[^1]));
        }

        Assert.All(scenes, s => Assert.InRange(s.Faces.RecallByArea, 0.90, 1));
        Assert.All(scenes, s => Assert.InRange(s.Faces.Precision, 0.90, 1));
        Assert.All(scenes, s => Assert.InRange(s.Faces.MedianErrorDeg, 0, 1));
        Assert.All(scenes, s => Assert.Equal(s.Classes.True, s.Classes.Found));
        Assert.InRange(scenes.Average(s => s.Classes.DikeIou), 0.93, 1);
        Assert.InRange(WholeStudy.Median(scenes.SelectMany(s => s.Width.WidthErrors).Select(Math.Abs)), 0, 0.03);
        Assert.All(scenes, s => Assert.Equal(0, s.Width.HiddenMeasured));
    }
}
