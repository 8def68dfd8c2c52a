using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Thin;

namespace CloudStruct.Tests.Kit;

/// <summary>Small clouds of known shape, and the way through the first three stages.</summary>
internal static class Clouds
{
    /// <summary>Random points on a rectangle of a plane about a middle, with white noise along the normal.</summary>
    public static Vec3[] Patch(Vec3 middle, Vec3 normal, double lengthM, double widthM, int count, ulong seed, double noiseM = 0)
    {
        Vec3 n = normal.Unit();
        Vec3 u = n.Cross(Math.Abs(n.Z) < 0.9 ? new Vec3(0, 0, 1) : new Vec3(1, 0, 0)).Unit(), v = n.Cross(u);
        var places = new Vec3[count];
        for (int i = 0; i < count; i++)
        {
            var draws = new Draws(seed, 77, (ulong)i);
            places[i] = middle + (u * ((draws.NextUnit() - 0.5) * lengthM)) + (v * ((draws.NextUnit() - 0.5) * widthM)) + (n * (noiseM * draws.NextNormal()));
        }

        return places;
    }

    /// <summary>Grey of 8 bits for every point.</summary>
    public static (ushort R, ushort G, ushort B)[] Grey(int count, ushort value) =>
        [.. Enumerable.Repeat((value, value, value), count)];

    public static SurveyInput Survey(params IPointSource[] sources) => new() { Name = "test", Sources = sources };

    public static IPieces Intake(SurveyInput input, List<Remark>? remarks = null, IntakeSettings? settings = null, int threads = 2) =>
        new IntakeStage().Run(input, settings ?? new(), StageContext.Plain(threads: threads, say: r => remarks?.Add(r)));

    public static WorkingCloud Thin(Vec3[] places, double? spacingM = null, bool dropStray = true, int threads = 2) =>
        new ThinStage().Run(
            Intake(Survey(new MemorySource(places))), new ThinSettings { SpacingM = spacingM, DropStray = dropStray }, StageContext.Plain(threads: threads));

    public static DescribedCloud Describe(WorkingCloud cloud, DescribeSettings? settings = null, int threads = 2) =>
        new DescribeStage().Run(cloud, settings ?? new(), StageContext.Plain(threads: threads));

    /// <summary>All points that the pieces give, local.</summary>
    public static List<Vec3> All(IPieces pieces)
    {
        var all = new List<Vec3>();
        foreach (PointBlock block in pieces.Read(CancellationToken.None))
        {
            using (block)
            {
                for (int i = 0; i < block.Count; i++) all.Add(new Vec3(block.X[i], block.Y[i], block.Z[i]));
            }
        }

        return all;
    }
}
