using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Rates;
using CloudStruct.Records.Width;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Rates;

public class CensoredLawsTests
{
    // 60 values and their fits by scipy 1.10.1, the log likelihoods of Weibull and lognormal again by R MASS fitdistr (check D1 of
    // the project's list): testdata/reference/contacts.md.
    [Fact]
    public void Laws_of_sixty_thicknesses_are_those_of_two_libraries()
    {
        ReferenceTable sample = ReferenceTable.Read("reference/thickness_sample.csv");
        ThicknessLaw[] laws = CensoredLaws.Of([.. Enumerable.Range(0, sample.Count).Select(i => sample.Number(i, "thickness_m"))], []);
        ThicknessLaw normal = laws[0], weibull = laws[1], exponential = laws[2];
        Assert.Equal(0.965843, weibull.First, 5e-5);               // R stops at 0.965851
        Assert.Equal(1.484207, weibull.Second!.Value, 5e-5);       // R stops at 1.484178: the two libraries differ by 3e-5
        Assert.Equal(-84.486926, weibull.LogLikelihood, 1e-5);
        Assert.Equal(-0.234506, normal.First, 1e-6);
        Assert.Equal(1.512188, normal.Second!.Value, 1e-6);
        Assert.Equal(-95.879440, normal.LogLikelihood, 1e-6);
        Assert.Equal(1.505433, exponential.First, 1e-6);
        Assert.Equal(-84.544847, exponential.LogLikelihood, 1e-6);
        Assert.Equal(ThicknessLawKind.Exponential, laws.MinBy(l => l.Aic)!.Kind);   // one parameter less for 0.06 of log likelihood
    }

    // Law: with censoring at random the estimates keep their expectation; without it they would be too small by a third.
    [Fact]
    public void Sizes_that_are_cut_off_do_not_bias_the_laws()
    {
        var draws = new Draws(7, 1, 1);
        List<double> whole = [], cut = [];
        for (int i = 0; i < 4000; i++)
        {
            double size = 2 * Math.Pow(-Math.Log(1 - draws.NextUnit()), 1 / 1.5), window = 4 * draws.NextUnit();
            if (size < window) whole.Add(size);
            else cut.Add(window);
        }

        ThicknessLaw weibull = CensoredLaws.Of(whole, cut)[1];
        Assert.Equal(1.5, weibull.First, 0.1);   // about three standard errors
        Assert.Equal(2, weibull.Second!.Value, 0.1);
        (List<double> logs, List<double> larger) = ([], []);
        for (int i = 0; i < 4000; i++)
        {
            double size = Math.Exp(0.3 + (0.5 * draws.NextNormal())), window = 4 * draws.NextUnit();
            if (size < window) logs.Add(size);
            else larger.Add(window);
        }

        ThicknessLaw normal = CensoredLaws.Of(logs, larger)[0];
        Assert.Equal(0.3, normal.First, 0.04);
        Assert.Equal(0.5, normal.Second!.Value, 0.03);
    }

    [Fact]
    public void Too_few_or_equal_sizes_give_no_law()
    {
        Assert.Empty(CensoredLaws.Of([1, 2], []));
        Assert.Empty(CensoredLaws.Of([2, 2, 2, 2], [1]));
    }

    [Fact]
    public void Fewer_independent_sizes_leave_the_parameters_and_bring_the_criteria_together()
    {
        double[] sizes = [1, 1.3, 0.8, 2.2, 1.7, 1.1, 0.6, 1.4];
        ThicknessLaw[] all = CensoredLaws.Of(sizes, []), few = CensoredLaws.Of(sizes, [], 3);
        Assert.Equal(all.Select(l => l.First), few.Select(l => l.First));
        Assert.True(few.Max(l => l.Aic) - few.Min(l => l.Aic) < all.Max(l => l.Aic) - all.Min(l => l.Aic));
    }
}
