using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Rock;

namespace CloudStruct.Simulate.Views;

/// <summary>One place of the surface that a camera sees, before noise.</summary>
/// <param name="X">East, local [m]: floats hold micrometres here.</param>
/// <param name="Y">North, local [m].</param>
/// <param name="Z">Up [m].</param>
/// <param name="Surface">As in <see cref="Hit.Surface"/>.</param>
/// <param name="Kind">Kind of surface.</param>
/// <param name="Rock">Rock behind it: 0 host, else number of the dike.</param>
/// <param name="Camera">The camera that saw it first.</param>
/// <param name="Back">Whether it is seen from the side against the plane's stored normal, so that the outward normal is its opposite.</param>
internal readonly record struct Sight(float X, float Y, float Z, int Surface, Hit.Kinds Kind, byte Rock, byte Camera, bool Back)
{
    /// <summary>Local place [m].</summary>
    public Vec3 Place => new(X, Y, Z);
}
