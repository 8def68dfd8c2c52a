using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>The plane that touches the sphere at a direction.</summary>
public static class Tangent
{
    /// <summary>Two unit vectors square to a direction and to each other; e1 × e2 = direction.</summary>
    /// <param name="direction">Unit vector.</param>
    public static (Vec3 E1, Vec3 E2) Axes(Vec3 direction)
    {
        // Start from the coordinate axis farthest from the direction, or the product loses its digits.
        double x = Math.Abs(direction.X), y = Math.Abs(direction.Y), z = Math.Abs(direction.Z);
        Vec3 far = x <= y && x <= z ? new Vec3(1, 0, 0) : y <= z ? new Vec3(0, 1, 0) : new Vec3(0, 0, 1);
        Vec3 e1 = direction.Cross(far).Unit();
        return (e1, direction.Cross(e1));
    }
}
