using CloudStruct.Maths.Directions;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Directions;

public class OrientationTensorTests
{
    // Woodcock 1977, GSA Bull. 88, 1231-1236: K = ln(S1/S2)/ln(S2/S3), C = ln(S1/S3); values by hand (ln 16/3 / ln 3, ln 16).
    [Fact]
    public void Eigenvalues_080_015_005_give_K_1524_and_C_2773()
    {
        (double shape, double strength) = OrientationTensor.WoodcockOf(0.80, 0.15, 0.05);
        Assert.Equal(1.52371901, shape, 1e-8);
        Assert.Equal(2.77258872, strength, 1e-8);
    }

    // Data: Fisher, Lewis and Embleton 1987, sets B5 and B6; tensors by numpy (eigh and svd) and R (eigen), all equal.
    [Theory]
    [InlineData("fle1987_b5", "FLE1987_B5")]
    [InlineData("fle1987_b6", "FLE1987_B6")]
    public void Tensors_of_published_data_agree_with_numpy_and_R(string file, string row)
    {
        OrientationTensor t = OrientationTensor.Of(Directions(file));
        ReferenceTable r = ReferenceTable.Read("reference/orientation_tensor.csv");
        Assert.Equal(r.Of(row, "S1"), t.S1, 1e-9);
        Assert.Equal(r.Of(row, "S2"), t.S2, 1e-9);
        Assert.Equal(r.Of(row, "S3"), t.S3, 1e-9);
        Assert.Equal(r.Of(row, "K"), t.Woodcock.Shape, 1e-8);
        Assert.Equal(r.Of(row, "C"), t.Woodcock.Strength, 1e-8);
        TrendPlunge mean = TrendPlunge.OfAxis(t.Eigen.V1);
        Assert.Equal(r.Of(row, "v1_trend"), mean.TrendDeg, 1e-6);
        Assert.Equal(r.Of(row, "v1_plunge"), mean.PlungeDeg, 1e-6);
    }

    [Theory]
    [InlineData("fle1987_b5")]
    [InlineData("fle1987_b6")]
    public void Flipping_any_ends_changes_nothing_for_axes_but_moves_the_vector_mean(string file)
    {
        Vec3[] d = Directions(file), flipped = [.. d.Select((v, i) => i % 3 == 0 ? -v : v)];
        OrientationTensor a = OrientationTensor.Of(d), b = OrientationTensor.Of(flipped);
        Assert.Equal(a.S1, b.S1, 1e-15);
        Assert.Equal(a.S2, b.S2, 1e-15);
        Assert.Equal(a.S3, b.S3, 1e-15);
        Assert.True(Math.Abs(FisherMean.Of(d).R - FisherMean.Of(flipped).R) > 0.5);
    }

    // Three sets of axes drawn with kappa 60; mean axes by numpy eigh, Watson concentrations by 40-digit arithmetic.
    [Fact]
    public void Mean_axes_and_Watson_concentrations_of_three_sets_agree_with_numpy()
    {
        ReferenceTable axes = ReferenceTable.Read("reference/axes_dbscan.csv"), means = ReferenceTable.Read("reference/axes_set_means.csv");
        for (int s = 0; s < 3; s++)
        {
            Vec3[] own = [.. Enumerable.Range(0, axes.Count).Where(i => axes.Number(i, "true_set") == s + 1)
                .Select(i => new TrendPlunge(axes.Number(i, "trend"), axes.Number(i, "plunge")).ToVector())];
            OrientationTensor t = OrientationTensor.Of(own);
            TrendPlunge mean = TrendPlunge.OfAxis(t.Eigen.V1);
            Assert.Equal(means.Number(s, "axis_trend"), mean.TrendDeg, 1e-6);
            Assert.Equal(means.Number(s, "axis_plunge"), mean.PlungeDeg, 1e-6);
            Assert.Equal(means.Number(s, "S1"), t.S1, 1e-9);
            Assert.Equal(means.Number(s, "watson_kappa_ml"), Watson.KappaOf(t.S1), 1e-4);
        }
    }

    // Sample data of a public paleomagnetism library; axial direction 357.78/60.32 and eigenvalues by numpy.
    [Fact]
    public void Two_polarities_have_an_axis_though_their_vector_mean_means_nothing()
    {
        ReferenceTable r = ReferenceTable.Read("orientations/directions_two_polarities.csv");
        OrientationTensor t = OrientationTensor.Of(
            [.. Enumerable.Range(0, r.Count).Select(i => new TrendPlunge(r.Number(i, "trend_deg"), r.Number(i, "plunge_deg")).ToVector())]);
        Assert.Equal(357.78, TrendPlunge.OfAxis(t.MeanAxis).TrendDeg, 0.005);
        Assert.Equal(60.32, TrendPlunge.OfAxis(t.MeanAxis).PlungeDeg, 0.005);
        Assert.Equal(0.9722, t.S1, 0.00005);
        Assert.Equal(0.0116, t.S3, 0.00005);
    }

    [Fact]
    public void Weights_count_as_repeats_and_give_the_effective_number()
    {
        Vec3 a = new TrendPlunge(10, 20).ToVector(), b = new TrendPlunge(100, 60).ToVector();
        OrientationTensor weighted = OrientationTensor.Of([a, b], [3, 1]), repeated = OrientationTensor.Of([a, a, a, b]);
        Assert.Equal(repeated.S1, weighted.S1, 1e-14);
        Assert.Equal(16.0 / 10, weighted.NEffective, 1e-12);
        Assert.Equal(4, repeated.NEffective, 1e-12);
        Assert.Equal(0, OrientationTensor.Of([]).NEffective);
    }

    internal static Vec3[] Directions(string file)
    {
        ReferenceTable t = ReferenceTable.Read($"reference/{file}.csv");
        return [.. Enumerable.Range(0, t.Count).Select(i => new TrendPlunge(t.Number(i, "dec"), t.Number(i, "inc")).ToVector())];
    }
}
