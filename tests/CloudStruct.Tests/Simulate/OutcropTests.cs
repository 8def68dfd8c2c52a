using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Tests.Simulate;

public class OutcropTests
{
    [Fact]
    public void Same_seed_gives_the_same_outcrop_on_any_number_of_threads()
    {
        OutcropPlan plan = OutcropPlan.ByName("demo");
        SimulatedOutcrop one = Outcrop.Make(plan, 8, 12_000, threads: 1), four = Outcrop.Make(plan, 8, 12_000, threads: 4);
        Assert.Equal(one.X, four.X);
        Assert.Equal(one.Y, four.Y);
        Assert.Equal(one.Z, four.Z);
        Assert.Equal(one.Red, four.Red);
        Assert.Equal(one.Green, four.Green);
        Assert.Equal(one.Blue, four.Blue);
        Assert.Equal(one.TrueFace, four.TrueFace);
        Assert.Equal(one.TrueClass, four.TrueClass);
        Assert.Equal(one.Faces, four.Faces);
    }

    [Fact]
    public void Another_seed_gives_another_member_of_the_family()
    {
        OutcropPlan plan = OutcropPlan.ByName("demo");
        SimulatedOutcrop a = Outcrop.Make(plan, 1, 5000), b = Outcrop.Make(plan, 2, 5000);
        Assert.NotEqual(a.UphillDeg, b.UphillDeg);
        Assert.NotEqual(a.NoiseM, b.NoiseM);
        Assert.NotEqual(a.Dikes[0].WidthAt(a.Dikes[0].CentreLine[0]), b.Dikes[0].WidthAt(b.Dikes[0].CentreLine[0]));
    }

    public static TheoryData<string> Names => [.. OutcropPlan.Names];

    [Theory]
    [MemberData(nameof(Names))]
    public void Every_named_plan_makes_what_it_says(string name)
    {
        OutcropPlan plan = OutcropPlan.ByName(name);
        SimulatedOutcrop made = Outcrop.Make(plan, 21, 8_000);
        Assert.Equal(8_000, made.Count);
        Assert.Equal(plan.Dikes.Length, made.Dikes.Length);
        Assert.Equal(plan.Dikes.Length > 0, made.TrueClass.Contains((byte)RockClass.Dike));
        Assert.Equal(plan.Cover.Length > 0, made.TrueClass.Contains((byte)RockClass.Cover));
        double reach = Math.Max(plan.LengthM, plan.BreadthM);
        Assert.Equal(plan.HasColour ? made.Count : 0, made.Red.Length);
        Assert.Equal(!plan.Planed, made.Faces.Length > 0);
        // Large map numbers in the invented place, all of them finite.
        Assert.All(made.X, x => Assert.InRange(x, plan.Site.Origin.X - reach, plan.Site.Origin.X + reach));
        Assert.All(made.Y, y => Assert.InRange(y, plan.Site.Origin.Y - reach, plan.Site.Origin.Y + reach));
        Assert.All(made.Z, z => Assert.InRange(z, -10, 40));
    }

    [Fact]
    public void Pavement_has_relief_of_centimetres_and_an_outcrop_has_a_cliff()
    {
        Assert.InRange(Roughness("pavement"), 0.003, 0.08);
        SimulatedOutcrop demo = Outcrop.Make(OutcropPlan.ByName("demo"), 5, 20_000);
        double[] heights = [.. demo.Z.Where((_, i) => demo.TrueClass[i] != (byte)RockClass.Unknown)];
        Assert.InRange(heights.Max() - heights.Min(), 7, 20);
    }

    [Fact]
    public void Two_rocks_differ_in_colour_except_where_the_plan_says_they_do_not()
    {
        double plain = Contrast("demo"), low = Contrast("low-contrast"), none = Contrast("texture-only");
        Assert.True(plain > 1, $"{plain}");
        Assert.InRange(low, 0.3, 0.7 * plain);
        // A joint is a dark line and a small block has more of them: that much stays without any difference in paint.
        Assert.True(none < 0.7 * low, $"{none}");
    }

    [Fact]
    public void Source_hands_on_every_point_and_sixteen_bit_colour()
    {
        // More than one block of points; what they look like does not matter here.
        double[] column = [.. Enumerable.Range(0, 70_000).Select(i => i * 0.001)];
        byte[] colour = [.. Enumerable.Range(0, 70_000).Select(i => (byte)(i % 256))];
        var made = new SimulatedOutcrop { X = column, Y = column, Z = column, Red = colour, Green = colour, Blue = colour };
        var source = made.AsSource();
        int at = 0;
        foreach (var block in source.Read(CancellationToken.None))
        {
            using (block)
            {
                for (int k = 0; k < block.Count; k++, at++)
                {
                    Assert.Equal(made.X[at], block.X[k]);
                    Assert.Equal(made.Red[at] * 257, block.Red[k]);
                }
            }
        }

        Assert.Equal(made.Count, at);
        Assert.Equal(made.Count, source.Header.Points);
        Assert.Equal(made.Z.Max(), source.Header.Max!.Value.Z);
    }

    [Fact]
    public void An_unknown_plan_names_the_known_ones() =>
        Assert.Contains("no-dike", Assert.Throws<ArgumentException>(() => OutcropPlan.ByName("dyke")).Message, StringComparison.Ordinal);

    /// <summary>Height of points over the mean of their square metre, median of the standard deviations [m].</summary>
    private static double Roughness(string name)
    {
        SimulatedOutcrop made = Outcrop.Make(OutcropPlan.ByName(name), 5, 20_000);
        double[] spreads = [.. Enumerable.Range(0, made.Count).Where(i => made.TrueClass[i] != (byte)RockClass.Unknown)
            .GroupBy(i => ((int)made.X[i], (int)made.Y[i])).Where(g => g.Count() > 15)
            .Select(g => { double m = g.Average(i => made.Z[i]); return Math.Sqrt(g.Average(i => (made.Z[i] - m) * (made.Z[i] - m))); }).Order()];
        return spreads[spreads.Length / 2];
    }

    /// <summary>Difference of the rocks' mean brightness over the spread within a rock.</summary>
    private static double Contrast(string name)
    {
        SimulatedOutcrop made = Outcrop.Make(OutcropPlan.ByName(name), 5, 12_000);
        double[] Of(RockClass c) => [.. Enumerable.Range(0, made.Count).Where(i => made.TrueClass[i] == (byte)c).Select(i => Math.Log(1.0 + made.Green[i]))];
        double[] host = Of(RockClass.Host), dike = Of(RockClass.Dike);
        double Sd(double[] v) { double m = v.Average(); return Math.Sqrt(v.Average(x => (x - m) * (x - m))); }
        return Math.Abs(host.Average() - dike.Average()) / ((Sd(host) + Sd(dike)) / 2);
    }
}
