using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Sets;

/// <summary>The planes of one domain as the mixture sees them.</summary>
/// <param name="Group">Whose they are.</param>
/// <param name="Planes">Its planes.</param>
/// <param name="Poles">Their unit normals.</param>
/// <param name="Weights">Weight of each.</param>
/// <param name="Groups">Per plane the number of its group: planes that may be pieces of one joint, though too uncertain to be joined.</param>
internal sealed record DomainPlanes(SetGroup Group, JointPlane[] Planes, Vec3[] Poles, double[] Weights, int[] Groups)
{
    /// <summary>Those picked, in the order given.</summary>
    public DomainPlanes Only(int[] picked) => new(
        Group, [.. picked.Select(i => Planes[i])], [.. picked.Select(i => Poles[i])], [.. picked.Select(i => Weights[i])], [.. picked.Select(i => Groups[i])]);
}
