using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Faces;

/// <summary>Finds the planar faces of a described cloud and measures them: regions grow, labels compete for points, pieces of
/// one plane are joined, weathered rock is refused, and what stays is fitted on all its points.</summary>
/// <remarks>docs/methods-faces.md gives the formulas, their sources and the figures reached.</remarks>
public sealed class FacesStage : IStage<DescribedCloud, FaceSettings, FaceSet>
{
    // The describe stage's figure is the scatter within small neighbourhoods, which correlated noise hardly shows in.
    private const double FirstScatterFactor = 1.6;
    private const double BandOverScatter = 2;

    /// <inheritdoc/>
    public string Name => "faces";

    /// <inheritdoc/>
    public FaceSet Run(DescribedCloud input, FaceSettings settings, StageContext context)
    {
        var surface = new Surface(input, settings, context.Threads, context.Stop);
        double scatter = FirstScatter(input, surface);
        double Band() => settings.ToleranceM ?? BandOverScatter * scatter;

        var pieces = new Pieces(surface.Count);
        new Growing(surface, Band()).Into(pieces);
        pieces.Refit(surface, scatter, 2);
        context.Progress(0.25);
        scatter = SceneNoise.Scatter(surface, pieces, Refusing.Spreads(surface, pieces), scatter);
        new Competing(surface, scatter, Band()).Play(pieces, scatter, 2);
        SceneNoise noise = SceneNoise.Learn(surface, pieces, Refusing.Spreads(surface, pieces), scatter, 60);
        new Joining(surface, scatter, noise.LengthM).Into(pieces);
        context.Progress(0.45);

        new Growing(surface, Band()).Into(pieces);
        pieces.Refit(surface, scatter, 2);
        new Competing(surface, scatter, Band()).Play(pieces, scatter, 3);
        new Joining(surface, scatter, noise.LengthM).Into(pieces);
        if (new Splitting(surface, scatter, noise.LengthM).Into(pieces) > 0) new Competing(surface, scatter, Band()).Play(pieces, scatter, 2);
        context.Progress(0.7);

        Refusing.Spreads(surface, pieces, out double usual);
        new Parting(surface, scatter).Into(pieces, usual);
        double[] spread = Refusing.Spreads(surface, pieces);
        scatter = SceneNoise.Scatter(surface, pieces, spread, scatter);
        noise = SceneNoise.Learn(surface, pieces, spread, scatter, 200);
        context.Progress(0.8);
        FaceSet found = Report(surface, pieces, spread, noise, input, context);
        context.Progress(1);
        return found with { ToleranceM = Band() };
    }

    private static double FirstScatter(DescribedCloud input, Surface surface)
    {
        return double.IsFinite(input.NoiseM) ? Math.Max(surface.LeastScatterM, FirstScatterFactor * input.NoiseM) : surface.LeastScatterM;
    }

    private FaceSet Report(Surface surface, Pieces pieces, double[] spread, SceneNoise noise, DescribedCloud input, StageContext context)
    {
        var measured = new Face?[pieces.Count];
        var refused = new bool[pieces.Count];
        BlockParallel.For(
            pieces.Count,
            surface.Threads,
            surface.Stop,
            () => new Measuring(surface, pieces, noise, input.Cloud.Frame),
            (from, to, measuring) =>
            {
                for (int k = Math.Max(1, from); k < to; k++)
                {
                    (Face face, Roughness rough) = measuring.Of(k);
                    if (face.AreaM2 < surface.Settings.SmallestFaceM2) continue;
                    refused[k] = Refusing.IsWeathered(spread[k], rough, face.AreaM2);
                    measured[k] = face;
                }
            },
            length: 1);
        double refusedM2 = Enumerable.Range(0, pieces.Count).Where(k => refused[k]).Sum(k => measured[k]!.AreaM2);
        FaceSet found = Number(surface, pieces, measured, refused, noise, input.Cloud.Frame.Origin);
        Say(context, found, refused.Count(r => r), refusedM2);
        return found;
    }

    // Faces by falling area; equal areas by the first point.
    private static FaceSet Number(Surface surface, Pieces pieces, Face?[] measured, bool[] refused, SceneNoise noise, Vec3 origin)
    {
        int[] order = [.. Enumerable.Range(0, pieces.Count).Where(k => measured[k] is not null && !refused[k])];
        Array.Sort(order, (a, b) =>
        {
            int byArea = measured[b]!.AreaM2.CompareTo(measured[a]!.AreaM2);
            return byArea != 0 ? byArea : pieces.Of(a)[0].CompareTo(pieces.Of(b)[0]);
        });
        var position = new int[pieces.Count];
        for (int f = 0; f < order.Length; f++) position[order[f]] = f + 1;
        Face[] faces = [.. order.Select(k => measured[k]!)];
        int[] ids = FaceNumbers.Of(faces, origin);
        return new FaceSet
        {
            Faces = [.. faces.Select((face, f) => face with { FaceId = ids[f] })],
            FaceOfPoint = [.. pieces.Label.Select(l => position[l])],
            SmallestFaceM2 = surface.Settings.SmallestFaceM2,
            NoiseM = noise.ErrorM,
            NoiseLengthM = noise.LengthM,
        };
    }

    private void Say(StageContext context, FaceSet found, int refused, double refusedM2)
    {
        if (refused > 0)
        {
            context.Say(new Remark(
                Name,
                Invariant($"{refused} flat pieces ({refusedM2:F1} m²) were refused as weathered rock or soil: they are rougher than the scene's large faces."),
                false));
        }

        if (found.Faces.Length == 0)
        {
            context.Say(new Remark(Name, Invariant($"No planar face of {found.SmallestFaceM2:G3} m² or more was found."), true));
            return;
        }

        context.Say(new Remark(
            Name,
            Invariant($"{found.Faces.Length} faces of {found.Faces[^1].AreaM2:G3} to {found.Faces[0].AreaM2:G3} m²; points scatter about them by {found.NoiseM * 1000:F1} mm, correlated over {found.NoiseLengthM * 100:F0} cm."),
            false));
    }
}
