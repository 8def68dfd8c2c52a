using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Rock;

namespace CloudStruct.Simulate.Views;

/// <summary>One place of the surface that a camera sees, before noise.</summary>
internal readonly record struct Sight(float X, float Y, float Z, int Surface, Hit.Kinds Kind, byte Rock, byte Camera, bool Back)
{
    /// <summary>Local place [m].</summary>
    public Vec3 Place => new(X, Y, Z);
}
