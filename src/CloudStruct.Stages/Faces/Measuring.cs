using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>One face as it is reported: attitude, region, size, scatter, outline. One per worker.</summary>
internal sealed class Measuring
{
    // Mean of the lower three quarters of squares of normal deviates: P(chi-square of 3 < 1.3233) / 0.75, as 1.3233 is the
    // upper quartile of chi-square of 1.
    private const double LowerThreeQuarters = 0.3685;

    // A strip along the outline is less sure than noise alone makes it: edges are worn, and some of its points are the
    // neighbour's. Each side of it is taken to be off by so much of the scatter, over so many spacings, independently.
    private const double RimOffsetOverScatter = 0.4;
    private const double RimSpacings = 1.5;

    private readonly Surface surface;
    private readonly Pieces pieces;
    private readonly SceneNoise noise;
    private readonly SurveyFrame frame;
    private readonly PatchModes modes;

    public Measuring(Surface surface, Pieces pieces, SceneNoise noise, SurveyFrame frame)
    {
        this.surface = surface;
        this.pieces = pieces;
        this.noise = noise;
        this.frame = frame;
        modes = new PatchModes(noise.Bins, surface.SpacingM);
    }

    /// <summary>The face of a label, without its number, and how rough it is against the scene.</summary>
    public (Face Face, Roughness Rough) Of(int label)
    {
        PlaneFit found = pieces.Planes[label];
        WidePatch patch = WidePatch.Of(surface, pieces, label, noise.ScatterM);
        (double[] u, double[] v, double[] r, double[] pseudo, double[] w) = patch.Columns(surface);
        Vec3 normal = patch.Plane.Normal;
        double rms = Rms(r, w);
        PatchRecord? record = modes.Record(u, v, pseudo, w);
        Roughness rough = Rough(record, rms);
        double waviness = Math.Min(rms, rough.WavinessM);
        (double length, double height) = Extents(label, normal, patch.Plane.Centroid, out Vec3 middle, out int? ends);
        var face = new Face
        {
            Middle = middle,
            Normal = normal,
            Attitude = Attitude.FromNormal(normal, frame.TurnDeg),
            Region = PoleRegions.From(normal, Covariance(patch, record), frame.Reference),
            AreaM2 = patch.Coverage.AreaM2(),
            LengthM = length,
            HeightM = height,
            RmsM = rms,
            NoiseM = Math.Sqrt((rms * rms) - (waviness * waviness)),
            WavinessM = waviness,
            Points = pieces.Of(label).Length,
            InPlace = InPlace.Unknown,
            EndsHidden = ends,
            Outline = Outline(patch, found),
        };
        return (face, rough);
    }

    private Symmetric3 Covariance(WidePatch patch, PatchRecord? record)
    {
        if (record is null) return new Symmetric3(10, 0, 0, 10, 0, 10);   // no extent, no attitude: 90 deg
        SlopeError e = noise.Laws.Slopes(noise.Laws.Weigh(record, noise.Prior.Variance, noise.Prior.Freedom), noise.Prior);
        Vec3 n = patch.Plane.Normal, along = (patch.Along - (n * patch.Along.Dot(n))).Unit(), across = n.Cross(along);
        double cos = Math.Cos(record.Turn), sin = Math.Sin(record.Turn);
        Vec3 e1 = (along * cos) + (across * sin), e2 = (across * cos) - (along * sin);

        // A slope s along e tips the normal by -s e.
        Symmetric3 covariance = Symmetric3.Outer(e1, e.VarianceU + Rim(record.SpreadU)) + Symmetric3.Outer(e2, e.VarianceV + Rim(record.SpreadV))
            + Symmetric3.Outer((e1 + e2) / Math.Sqrt(2), e.Covariance) + Symmetric3.Outer((e1 - e2) / Math.Sqrt(2), -e.Covariance);
        return covariance * (e.Stretch * e.Stretch);
    }

    // A side a fraction f = width / extent of the points, off by d at half the extent, tilts the plane by f d (extent / 2) /
    // spread²; two sides; extent² = 12 spread² for an even cover.
    private double Rim(double spreadM)
    {
        double share = RimSpacings * surface.SpacingM / (Math.Sqrt(12) * spreadM), off = RimOffsetOverScatter * noise.ScatterM;
        double tilt = Math.Min(share, 0.5) * off * Math.Sqrt(3) / spreadM;
        return 2 * tilt * tilt;
    }

    // Residual power, and the power of the residual waves, against what the noise of the scene puts there.
    private Roughness Rough(PatchRecord? record, double rms)
    {
        if (record is null || record.Waves <= 3) return new Roughness(rms / noise.ScatterM, 1, 0);
        double[] expected = noise.Laws.ExpectedSquares(record, noise.Prior);
        double variance = noise.ScatterM * noise.ScatterM, excess = 0;
        var ratio = new double[record.Waves - 3];
        for (int k = 3; k < record.Waves; k++)
        {
            ratio[k - 3] = record.Squares[k] / (variance * Math.Max(expected[k], 1e-9));
            excess += record.Squares[k] - (variance * expected[k]);
        }

        // The largest quarter is left out: a margin that undulates over metres is strong in few waves, weathered rock in all.
        Array.Sort(ratio);
        int kept = ratio.Length - (ratio.Length / 4);
        double power = ratio.AsSpan(0, kept).ToArray().Average() / (kept < ratio.Length ? LowerThreeQuarters : 1);
        return new Roughness(Math.Sqrt(record.MeanSquare / variance), power, Math.Sqrt(Math.Max(0, excess)));
    }

    private (double Length, double Height) Extents(int label, Vec3 normal, Vec3 origin, out Vec3 middle, out int? ends)
    {
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(normal);
        ends = Ends.Hidden(surface, pieces, label, along, down);
        double lowU = double.MaxValue, highU = double.MinValue, lowV = double.MaxValue, highV = double.MinValue, u = 0, v = 0;
        ReadOnlySpan<int> own = pieces.Of(label);
        foreach (int i in own)
        {
            Vec3 d = surface.Place(i) - origin;
            double pu = d.Dot(along), pv = d.Dot(down);
            (lowU, highU) = (Math.Min(lowU, pu), Math.Max(highU, pu));
            (lowV, highV) = (Math.Min(lowV, pv), Math.Max(highV, pv));
            u += pu;
            v += pv;
        }

        middle = origin + (along * (u / own.Length)) + (down * (v / own.Length));
        return (highU - lowU, highV - lowV);
    }

    private static double Rms(double[] r, double[] w)
    {
        double sum = 0, count = 0;
        for (int i = 0; i < r.Length; i++)
        {
            sum += w[i] * r[i] * r[i];
            count += w[i];
        }

        return count > 0 ? Math.Sqrt(sum / count) : 0;
    }

    // The raster's ring lies on the plane the face was found with; it is let down onto the measured one along the normal.
    private static Vec3[] Outline(WidePatch patch, in PlaneFit found)
    {
        List<(double U, double V)> ring = Rings.Simplify(patch.Coverage.Outline(), 0.75 * patch.Coverage.CellM);
        if (ring.Count < 3) return [];
        var outline = new Vec3[ring.Count + 1];
        for (int i = 0; i < ring.Count; i++)
        {
            Vec3 p = found.Centroid + (patch.Along * ring[i].U) + (patch.Up * ring[i].V);
            outline[i] = p - (patch.Plane.Normal * patch.Plane.Distance(p));
        }

        outline[^1] = outline[0];
        return outline;
    }
}
