using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Tests.Simulate;

public class DikeTruthTests
{
    private readonly SimulatedOutcrop demo = SimulatedOutcrops.Demo;

    [Fact]
    public void Class_of_each_rock_point_agrees_with_the_signed_distances()
    {
        SimulatedDike dike = Assert.Single(demo.Dikes);
        int wrong = 0;
        for (int i = 0; i < demo.Count; i++)
        {
            if (demo.TrueClass[i] is not ((byte)RockClass.Host or (byte)RockClass.Dike)) continue;
            double a = dike.SignedFromA(demo.Place(i)), b = dike.SignedFromB(demo.Place(i));
            // Noise moves a point by up to 3 cm; a contact surface belongs to the rock behind it, on either side.
            if (Math.Min(Math.Abs(a), Math.Abs(b)) < 0.08) continue;
            if (demo.TrueClass[i] == (byte)RockClass.Dike != (a > 0 && b < 0)) wrong++;
        }

        Assert.Equal(0, wrong);
    }

    [Fact]
    public void Distances_from_both_margins_add_up_to_the_width()
    {
        SimulatedDike dike = demo.Dikes[0];
        Assert.NotEmpty(dike.CentreLine);
        foreach (Vec3 p in dike.CentreLine)
        {
            double width = dike.WidthAt(p);
            Assert.InRange(width, 1.2, 4.2);
            // Margins wave on their own by 1-2 cm, so their normals differ by a degree: second order, a millimetre or two.
            Assert.Equal(width, dike.SignedFromA(p) - dike.SignedFromB(p), 0.006);
        }
    }

    // Brute force: distance to the nearest of many places on the margin.
    [Fact]
    public void Signed_distance_is_the_shortest_way_to_the_margin()
    {
        SimulatedDike dike = demo.Dikes[0];
        foreach (Vec3 start in dike.CentreLine.Where((_, k) => k % 9 == 0))
        {
            Vec3 p = start + new Vec3(0.3, -0.2, 0.4);
            double stated = dike.SignedFromA(p);
            Vec3 foot = p - (dike.MarginNormalAt(0, p) * stated);
            double nearest = double.PositiveInfinity;
            for (double s = -0.4; s <= 0.4; s += 0.05)
            {
                for (double v = -0.4; v <= 0.4; v += 0.05)
                {
                    Vec3 q = foot + (dike.Along * s) + (dike.Normal.Cross(dike.Along) * v);
                    // Onto the margin along the mean normal, by halving.
                    double lo = -1, hi = 1;
                    for (int k = 0; k < 40; k++)
                    {
                        double mid = (lo + hi) / 2;
                        if (dike.SignedFromA(q + (dike.Normal * mid)) > 0) hi = mid;
                        else lo = mid;
                    }

                    nearest = Math.Min(nearest, (q + (dike.Normal * lo) - p).Length);
                }
            }

            Assert.Equal(nearest, Math.Abs(stated), 0.0005);
        }
    }

    [Fact]
    public void A_lies_on_the_left_of_increasing_chainage()
    {
        foreach (ulong seed in new ulong[] { 1, 2, 3, 4 })
        {
            SimulatedDike dike = Outcrop.Make(OutcropPlan.ByName("demo"), seed, 4000).Dikes[0];
            double azimuth = Math.Atan2(dike.Along.X, dike.Along.Y) * 180 / Math.PI;
            Assert.InRange(azimuth, 0, 179.9999999);
            Assert.True(dike.Along.Cross(dike.Normal).Z < 0);   // B on the right
            Vec3 p = dike.CentreLine[dike.CentreLine.Length / 2];
            Assert.True(dike.SignedFromA(p) > 0 && dike.SignedFromB(p) < 0);
            Assert.True(dike.ChainageAt(p + dike.Along) > dike.ChainageAt(p));
        }
    }

    [Fact]
    public void Cover_hides_a_stretch_and_only_that_is_said_to_be_hidden()
    {
        SimulatedDike dike = demo.Dikes[0];
        Assert.True(dike.Hidden.Any(h => h.A && h.B && h.ToM - h.FromM > 0.75), "nothing is hidden");
        Assert.True(dike.Hidden.Sum(h => h.ToM - h.FromM) < 0.4 * (dike.Extent.ToM - dike.Extent.FromM), "most is hidden");
        foreach (HiddenStretch h in dike.Hidden)
        {
            // Nobody can measure there: no point of both rocks beside the hidden margin in the middle of the stretch.
            double middle = (h.FromM + h.ToM) / 2;
            Func<Vec3, double> from = h.A ? dike.SignedFromA : dike.SignedFromB;
            int[] seen = new int[2];
            for (int i = 0; i < demo.Count; i++)
            {
                Vec3 p = demo.Place(i);
                if (demo.TrueClass[i] is not ((byte)RockClass.Host or (byte)RockClass.Dike) || Math.Abs(dike.ChainageAt(p) - middle) > 0.12) continue;
                double d = from(p);
                if (Math.Abs(d) < 0.2) seen[d > 0 ? 1 : 0]++;
            }

            Assert.True(Math.Min(seen[0], seen[1]) < 12, $"{h} shows {seen[0]} and {seen[1]} points");
        }
    }

    [Fact]
    public void A_long_dike_bends_tapers_and_holds_clasts()
    {
        SimulatedOutcrop made = Outcrop.Make(OutcropPlan.ByName("long"), 12, 50_000);
        SimulatedDike dike = made.Dikes[0];
        double[] widths = [.. dike.CentreLine.Select(dike.WidthAt)];
        Assert.True(widths.Max() / widths.Min() > 1.12);
        Vec3 first = dike.NormalAt(dike.CentreLine[0]), last = dike.NormalAt(dike.CentreLine[^1]);
        Assert.InRange(Math.Acos(first.Dot(last)) * 180 / Math.PI, 3, 25);
        double clasts = made.TrueClass.Count(c => c == (byte)RockClass.Inclusion), rock = made.TrueClass.Count(c => c == (byte)RockClass.Dike);
        Assert.InRange(clasts / (clasts + rock), 0.015, 0.15);
    }
}
