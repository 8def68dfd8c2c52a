using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Series;

namespace CloudStruct.Tests.Maths.Series;

public class StepSearchTests
{
    // An autoregressive series: correlation of neighbours rho, standard deviation sigma.
    private static double[] Noise(ulong seed, int n, double rho, double sigma)
    {
        var draws = new Draws(seed, 3, 1);
        var y = new double[n];
        double last = draws.NextNormal();
        for (int i = 0; i < n; i++)
        {
            y[i] = sigma * last;
            last = (rho * last) + (Math.Sqrt(1 - (rho * rho)) * draws.NextNormal());
        }

        return y;
    }

    private static double[] Abscissae(int n) => [.. Enumerable.Range(0, n).Select(i => (double)i)];

    // Truth by construction: of 60 series without a step at most 3 may show one at a level of 0.01 (binomial: more than 3 of 60 at
    // 0.01 has a chance of 0.003); the scatter is that of neighbouring stations on a wavy margin.
    [Theory]
    [InlineData(0.0)]
    [InlineData(0.6)]
    public void Series_without_a_step_hardly_ever_show_one(double rho)
    {
        int steps = 0, slopes = 0;
        for (ulong seed = 1; seed <= 60; seed++)
        {
            StepModel model = StepSearch.Of(Abscissae(24), Noise(seed, 24, rho, 0.03), 0.003)!;
            if (model.Steps.Length > 0) steps++;
            if (model.SlopePValue < 0.01) slopes++;
        }

        Assert.True(steps <= 3, $"{steps} steps of 60");
        Assert.True(slopes <= 6, $"{slopes} slopes of 60");
    }

    [Fact]
    public void A_step_is_found_with_its_place_and_size_within_their_limits()
    {
        int found = 0, place = 0, size = 0;
        for (ulong seed = 1; seed <= 40; seed++)
        {
            double[] x = Abscissae(30), y = Noise(seed, 30, 0.5, 0.03);
            for (int i = 0; i < 30; i++) y[i] += 2 + (i > 17.2 ? 0.4 : 0);
            StepModel model = StepSearch.Of(x, y, 0.003)!;
            if (model.Steps.Length != 1) continue;
            StepFound s = model.Steps[0];
            found++;
            if (17.2 >= s.AtLow95 && 17.2 <= s.AtHigh95) place++;
            if (Math.Abs(s.Size - 0.4) <= 2.05 * s.SizeSigma) size++;
        }

        Assert.True(found >= 38, $"{found} of 40 found");
        Assert.True(place >= 0.9 * found, $"{place} of {found} places");
        Assert.True(size >= 0.8 * found, $"{size} of {found} sizes");
    }

    [Fact]
    public void An_even_taper_is_no_step()
    {
        double[] x = Abscissae(30), y = Noise(5, 30, 0.3, 0.02);
        for (int i = 0; i < 30; i++) y[i] += 2 + (0.02 * i);
        StepModel model = StepSearch.Of(x, y, 0.003)!;
        Assert.Empty(model.Steps);
        Assert.InRange(0.02, model.Slope - (2.1 * model.SlopeSigma), model.Slope + (2.1 * model.SlopeSigma));
        Assert.True(model.SlopePValue < 1e-4);
    }

    [Fact]
    public void Few_observations_give_no_answer() => Assert.Null(StepSearch.Of([0, 1, 2, 3, 4, 5, 6], new double[7], 0.01));
}
