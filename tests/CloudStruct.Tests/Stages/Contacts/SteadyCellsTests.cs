using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Stages.Contacts;

namespace CloudStruct.Tests.Stages.Contacts;

public class SteadyCellsTests
{
    private const double NoiseM = 0.02;

    [Fact]
    public void Stretches_that_lead_astray_are_left_out_and_waves_stay()
    {
        // Waves of 6 cm over 7 m belong to the margin; 0.8 m of it that lie 15 cm off do not.
        TraceCell[] cells = Margins(s => s is > 10 and < 10.8 ? 0.15 : 0);
        (TraceCell[] kept, double scale) = SteadyCells.Of(cells, 0.25);
        Assert.InRange(scale, 0.7 * NoiseM, 1.5 * NoiseM);
        Assert.DoesNotContain(kept, c => c.Margin == Margin.A && c.At.S is > 10.1 and < 10.7);
        Assert.True(kept.Length > 0.95 * cells.Length, $"{kept.Length} of {cells.Length}");
        Assert.Equal(kept.OrderBy(c => c.At.S), kept);
    }

    [Fact]
    public void Without_errors_everything_stays()
    {
        Assert.Empty(SteadyCells.Of([], 0.25).Cells);
        TraceCell[] few = [new(Margin.A, default, new SheetPoint(0, 0, 0), 1), new(Margin.B, default, new SheetPoint(0, 2, 0), 1)];
        Assert.Equal(2, SteadyCells.Of(few, 0.25).Cells.Length);
        TraceCell[] plane = [.. Margins(_ => 0).Select(c => c with { At = new SheetPoint(c.At.S, 0.01 * c.At.S, c.At.T) })];
        Assert.Equal(plane.Length, SteadyCells.Of(plane, 0.25).Cells.Length);
    }

    [Fact]
    public void A_cell_on_a_surface_errs_less_than_one_of_a_trace()
    {
        var law = new TraceNoise(new CorrelatedNoise(0.03, 0.5, 0.4), 0.5, 1.5, 2);
        TraceCell trace = new(Margin.A, default, new SheetPoint(0, 0, 0), 1), surface = trace with { Surface = true };
        double[] k = law.Covariance([trace, surface, surface]);
        double wave = law.WaveM * law.WaveM;
        Assert.Equal(wave + (0.03 * 0.03), k[0], 1e-12);
        Assert.True(k[4] - wave < 0.1 * 0.03 * 0.03);
        Assert.Equal(wave, k[3], 1e-12);   // their errors have nothing in common, the margin's own shape has
        Assert.Equal(wave, k[7], 1e-12);
    }

    private static TraceCell[] Margins(Func<double, double> astray)
    {
        var draws = new Draws(7, 1, 0);
        var cells = new List<TraceCell>();
        for (int i = 0; i < 96; i++)
        {
            double s = 0.25 * i, t = 0.8 * Math.Floor(s / 5), wave = 0.06 * Math.Sin(2 * Math.PI * s / 7);
            cells.Add(new TraceCell(Margin.A, default, new SheetPoint(s, wave + astray(s) + (NoiseM * draws.NextNormal()), t), 1));
            cells.Add(new TraceCell(Margin.B, default, new SheetPoint(s, 2.5 + wave + (NoiseM * draws.NextNormal()), t), 1));
        }

        return [.. cells];
    }
}
