namespace CloudStruct.Simulate;

/// <summary>What a true face is.</summary>
public enum FaceKind
{
    /// <summary>A joint of the host: an exact plane.</summary>
    Joint,

    /// <summary>A cooling joint of the dike: an exact plane.</summary>
    CoolingJoint,

    /// <summary>An exposed piece of a margin: sub-planar, it undulates by centimetres.</summary>
    Contact,

    /// <summary>A side of a block that lies loose: an exact plane, but not in place.</summary>
    LooseSide,
}
