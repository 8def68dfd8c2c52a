using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate.Views;

/// <summary>One photograph: where from and where to.</summary>
/// <param name="Place">Local [m].</param>
/// <param name="Toward">Unit direction of the middle ray.</param>
/// <param name="HalfAngle">Tangent of half the field of view.</param>
internal readonly record struct Camera(Vec3 Place, Vec3 Toward, double HalfAngle)
{
    /// <summary>Unit direction of a ray at image coordinates from -1 to 1.</summary>
    public Vec3 Ray(double x, double y)
    {
        Vec3 right = Toward.Cross(Math.Abs(Toward.Z) > 0.99 ? new Vec3(0, 1, 0) : Vec3.Up).Unit(), down = Toward.Cross(right);
        return (Toward + (right * (x * HalfAngle)) + (down * (y * HalfAngle))).Unit();
    }
}
