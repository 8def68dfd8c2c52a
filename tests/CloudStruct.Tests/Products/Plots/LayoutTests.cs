using CloudStruct.Products.Plots;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;
using CsCheck;

namespace CloudStruct.Tests.Products.Plots;

public class LayoutTests
{
    [Fact]
    public void Ticks_are_1_2_or_5_times_a_power_of_ten_and_lie_on_the_axis() => Gen.Select(Gen.Double[-1e4, 1e4], Gen.Double[1e-3, 1e4], Gen.Int[2, 12]).Sample((from, length, most) =>
    {
        NiceScale scale = NiceScale.Over(from, from + length, most, false);
        double[] ticks = [.. scale.Ticks()];
        double first = scale.Step / Math.Pow(10, Math.Floor(Math.Log10(scale.Step) + 1e-9));
        Assert.Contains(new[] { 1.0, 2, 5 }, k => Math.Abs(first - k) < 1e-6);
        Assert.InRange(ticks.Length, 0, most + 1);
        Assert.All(ticks, t => Assert.InRange(scale.At(t), -1e-6, 1 + 1e-6));
        Assert.Equal(ticks.Length, ticks.Select(scale.Label).Distinct().Count());
        NiceScale whole = NiceScale.Over(from, from + length, most, true);
        Assert.True(whole.From <= from + (1e-6 * length) && whole.To >= from + length - (1e-6 * length));
    });

    [Theory]
    [InlineData(0, 0.5, "0.5")]
    [InlineData(0, 60, "60")]
    [InlineData(-10, 10, "-10")]
    public void Labels_have_the_decimals_of_the_step(double from, double to, string label) =>
        Assert.Contains(label, NiceScale.Over(from, to, 5, true).Ticks().Select(NiceScale.Over(from, to, 5, true).Label));

    [Fact]
    public void Wrapped_lines_fit_and_lose_no_word() => Gen.String[Gen.Char["ab WMi.°1"], 0, 200].Sample(text =>
    {
        string[] lines = Letters.Body.Wrap(text, 100);
        Assert.All(lines, l => Assert.True(Letters.Body.Measure(l) <= 100.01f, l));
        Assert.Equal(text.Replace(" ", ""), string.Concat(lines).Replace(" ", ""));
    });

    [Fact]
    public void Stretches_join_end_to_end_and_never_mix_what_is_hidden_with_what_is_measured() => Gen.Int[0, 4].Array[0, 40].Sample(codes =>
    {
        WidthPoint[] points = [.. codes.Select((c, i) => new WidthPoint(i + 0.5, null, null, null, null, null, (StationStatus)c))];
        List<Stretch> stretches = Stretch.Of(points);
        Assert.Equal(points, stretches.SelectMany(s => s.Points));
        Assert.All(stretches, s => Assert.All(s.Points, p => Assert.Equal(s.Status, p.Status)));
        for (int i = 1; i < stretches.Count; i++) Assert.Equal(stretches[i - 1].ToM, stretches[i].FromM);
        if (points.Length > 0) Assert.Equal((0.0, (double)points.Length), (stretches[0].FromM, stretches[^1].ToM));
    });
}
