using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Tests.Simulate;

/// <summary>The nasty outcrops do what they are for.</summary>
public class LaboratoryTests
{
    [Theory]
    [InlineData(31)]
    [InlineData(32)]
    public void A_dike_with_a_tip_ends_inside_the_outcrop(ulong seed)
    {
        SimulatedOutcrop made = Outcrop.Make(OutcropPlan.ByName("tip"), seed, 40_000);
        SimulatedDike dike = Assert.Single(made.Dikes);
        (double from, double to) = dike.Extent;
        // The tip lies 5 to 25 % of the length from the middle, so one end is near and the other at the edge of the outcrop.
        double near = Math.Min(-from, to), far = Math.Max(-from, to);
        Assert.InRange(near, 0, 0.3 * made.Plan.LengthM);
        Assert.InRange(far, 0.4 * made.Plan.LengthM, 0.8 * made.Plan.LengthM);
        bool endsHigh = to < -from;
        Assert.DoesNotContain(Enumerable.Range(0, made.Count), i => made.TrueClass[i] == (byte)RockClass.Dike && (endsHigh ? dike.ChainageAt(made.Place(i)) > to + 0.5 : dike.ChainageAt(made.Place(i)) < from - 0.5));
        double[] widths = [.. dike.CentreLine.Select(dike.WidthAt)];
        Assert.True((endsHigh ? widths[^1] : widths[0]) < 0.6 * widths.Max());
    }

    [Fact]
    public void Where_dikes_cross_the_later_one_cuts_and_hides_the_earlier()
    {
        SimulatedOutcrop made = Outcrop.Make(OutcropPlan.ByName("crossing"), 33, 60_000);
        SimulatedDike earlier = made.Dikes[0], later = made.Dikes[1];
        int inBoth = 0;
        for (int i = 0; i < made.Count; i++)
        {
            Vec3 p = made.Place(i);
            if (made.TrueDike[i] == 0 || earlier.SignedFromA(p) < 0.1 || earlier.SignedFromB(p) > -0.1 || later.SignedFromA(p) < 0.1 || later.SignedFromB(p) > -0.1) continue;
            Assert.Equal(2, made.TrueDike[i]);
            inBoth++;
        }

        Assert.True(inBoth > 100);
        Vec3 crossing = earlier.CentreLine.MinBy(p => Math.Abs(later.SignedFromA(p) + later.SignedFromB(p)));
        if (later.Contains(crossing)) Assert.True(earlier.IsHidden(earlier.ChainageAt(crossing)));
        else Assert.DoesNotContain(earlier.CentreLine, later.Contains);
    }

    // Random cuts give the plan's spacing in the mean over many lines; the law "even" cuts pieces until they are narrow, so its
    // spacings only scatter about the plan's. Ranges of the plans: 0.55-0.95, 0.6-1.1 and 0.7-1.2 m.
    [Theory]
    [InlineData("random-joints")]
    [InlineData("lognormal-joints")]
    [InlineData("no-dike")]
    public void Joint_spacing_counted_in_the_rock_is_near_the_plan(string name)
    {
        SimulatedOutcrop made = Outcrop.Make(OutcropPlan.ByName(name), 34, 8_000);
        Assert.Equal(3, made.HostSetSpacingM.Length);
        for (int k = 0; k < 3; k++)
        {
            JointSetPlan plan = made.Plan.HostJoints[k];
            Assert.InRange(made.HostSetSpacingM[k], 0.75 * plan.SpacingM.Low, 1.35 * plan.SpacingM.High);
        }
    }

    [Fact]
    public void A_turned_model_keeps_its_shape_and_its_truth()
    {
        OutcropPlan plan = OutcropPlan.ByName("turned");
        SimulatedOutcrop turned = Outcrop.Make(plan, 35, 8_000), plain = Outcrop.Make(plan with { ModelTiltSigmaDeg = 0, ModelTurnSigmaDeg = 0 }, 35, 8_000);
        Assert.Equal(plain.Faces, turned.Faces);
        double largest = 0;
        for (int i = 0; i + 100 < plain.Count; i += 100)
        {
            Vec3 a = plain.Place(i + 100) - plain.Place(i), b = turned.Place(i + 100) - turned.Place(i);
            Assert.Equal(a.Length, b.Length, 1e-6);
            largest = Math.Max(largest, Math.Acos(Math.Clamp(a.Unit().Dot(b.Unit()), -1, 1)) * 180 / Math.PI);
        }

        Assert.InRange(largest, 0.1, 6);
    }

    [Fact]
    public void The_southern_site_has_a_large_northing_and_a_zone_of_the_south()
    {
        SimulatedOutcrop made = Outcrop.Make(OutcropPlan.ByName("south"), 36, 2_000);
        Assert.Equal(32721, made.Crs.Epsg);
        Assert.Contains(made.Crs.Parameters, p => p.Value == 10_000_000);
        Assert.All(made.Y, y => Assert.InRange(y, 4_418_800, 4_419_000));
    }
}
