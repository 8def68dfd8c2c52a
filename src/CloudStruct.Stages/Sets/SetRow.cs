using CloudStruct.Maths.Rates;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>All numbers of one set.</summary>
internal static class SetRow
{
    /// <summary>One row of sets.csv.</summary>
    /// <param name="input">The stage's input.</param>
    /// <param name="settings">Settings.</param>
    /// <param name="group">Whose faces they are.</param>
    /// <param name="number">Its number in the domain.</param>
    /// <param name="planes">Its planes.</param>
    /// <param name="mean">Its mean.</param>
    /// <param name="seen">The rock of the domain.</param>
    public static OrientationSet Of(
        SetsInput input, SetSettings settings, SetGroup group, int number, JointPlane[] planes, SetMean mean, SeenRock seen)
    {
        Face[] faces = input.Faces.Faces;
        (double shape, double strength) = mean.Tensor.Woodcock;
        int[] own = [.. planes.SelectMany(p => p.Faces)];
        int[] planeOfFace = new int[faces.Length];
        Array.Fill(planeOfFace, -1);
        for (int p = 0; p < planes.Length; p++) foreach (int f in planes[p].Faces) planeOfFace[f] = p;
        Estimate? spacing = SetSpacing.Of(input.Described.Cloud, seen.Surface, seen.Rock, planeOfFace, mean.Mean, settings.LaneM);
        Estimate? persistence = SetPersistence.Of(input.Described.Cloud, faces, planes, mean.Mean, seen.Grid);
        return new OrientationSet
        {
            Set = Invariant($"{group.Word}-{number}"),
            Domain = group.Domain,
            Dike = group.Dike,
            Count = own.Length,
            Mean = Attitude.FromNormal(mean.Mean, input.Frame.TurnDeg),
            Normal = mean.Mean,
            Kappa = mean.Kappa,
            Cone95Deg = mean.Region.Cone95Deg,
            Cone95TotalDeg = mean.Region.Cone95TotalDeg,
            S1 = mean.Tensor.S1,
            S2 = mean.Tensor.S2,
            S3 = mean.Tensor.S3,
            Shape = shape,
            Strength = strength,
            SpacingM = spacing,
            SpacingClass = IsrmClass.OfSpacing(spacing?.Value),
            P32PerM = P32(spacing, planes, mean.Mean),
            ExposedLengthMeanM = own.Average(f => faces[f].LengthM),
            PersistenceM = persistence,
            PersistenceClass = IsrmClass.OfPersistence(persistence?.Value),
            Weighting = settings.Weighting.ToString().ToLowerInvariant(),
            NEffective = mean.Tensor.NEffective,
        };
    }

    /// <summary>Area per volume from the rate along the normal: P10 = P32 E|cos|.</summary>
    private static Estimate? P32(Estimate? spacing, JointPlane[] planes, Vec3 normal)
    {
        if (spacing is null) return null;
        double factor = Intensity.LineFactor([.. planes.Select(p => p.Normal)], [.. planes.Select(p => p.AreaM2)], normal);
        return factor < Intensity.LeastFactor
            ? null
            : new Estimate(1 / (spacing.Value * factor), 1 / (spacing.High95 * factor), 1 / (spacing.Low95 * factor));
    }
}
