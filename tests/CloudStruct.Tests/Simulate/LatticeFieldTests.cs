using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Tests.Simulate;

public class LatticeFieldTests
{
    private const int Pairs = 60_000;

    // The promise is that of the type: mean 0, variance 1, correlation 1/e at the stated length, in every direction.
    [Theory]
    [InlineData(1, 0, 0)]
    [InlineData(0, 0, 1)]
    [InlineData(0.6, 0.48, 0.64)]
    [InlineData(0.285714, 0.428571, 0.857143)]   // along an axis of one of the lattices
    public void Correlation_falls_to_1_over_e_at_the_stated_length(double x, double y, double z)
    {
        var way = new Vec3(x, y, z);
        Assert.Equal(Math.Exp(-1), Correlation(0.08, way * 0.08), 0.03);
        Assert.InRange(Correlation(0.08, way * 0.02), 0.88, 1);
        Assert.InRange(Correlation(0.08, way * 0.24), -0.02, 0.02);
    }

    [Fact]
    public void Mean_is_0_and_variance_1_near_and_far_from_lattice_corners()
    {
        var field = new LatticeField(5, 1, 0.08);
        var dice = new Dice(6, Purpose.Plan);
        double sum = 0, squares = 0;
        for (int i = 0; i < Pairs; i++)
        {
            double v = field.At(Somewhere(ref dice));
            sum += v;
            squares += v * v;
        }

        Assert.Equal(0, sum / Pairs, 0.02);   // standard error 1/sqrt(60000) = 0.004; 0.0058 for the variance
        Assert.Equal(1, squares / Pairs, 0.03);
    }

    private static double Correlation(double lengthM, Vec3 lag)
    {
        var field = new LatticeField(3, 2, lengthM);
        var dice = new Dice(4, Purpose.Plan);
        double product = 0;
        for (int i = 0; i < Pairs; i++)
        {
            Vec3 p = Somewhere(ref dice);
            product += field.At(p) * field.At(p + lag);
        }

        return product / Pairs;
    }

    private static Vec3 Somewhere(ref Dice dice) => new(dice.Between(-50, 50), dice.Between(-50, 50), dice.Between(-50, 50));
}
