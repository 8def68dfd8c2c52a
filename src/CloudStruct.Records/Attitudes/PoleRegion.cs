using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Attitudes;

/// <summary>95 % region of a pole: two standard deviations about two axes in the tangent plane, and what follows from them.</summary>
public sealed record PoleRegion
{
    /// <summary>Half-angle of the circular cone that holds the true pole with 95 %, internal errors only [deg].</summary>
    public double Cone95Deg { get; init; }

    /// <summary>The same with the common errors of the model added [deg].</summary>
    public double Cone95TotalDeg { get; init; }

    /// <summary>Half-axis of the 95 % ellipse, larger, internal [deg].</summary>
    public double Ellipse95MajorDeg { get; init; }

    /// <summary>Half-axis of the 95 % ellipse, smaller, internal [deg].</summary>
    public double Ellipse95MinorDeg { get; init; }

    /// <summary>Rake of the direction in the plane toward which the pole is least certain, from the strike direction, 0 to 180 [deg].</summary>
    public double Ellipse95RakeDeg { get; init; }

    /// <summary>Unit vector in the plane (grid frame) toward which the pole is least certain; null vector when not known.</summary>
    public Vec3 MajorAxis { get; init; }

    /// <summary>Trust class by the total cone.</summary>
    public Grade Grade => Cone95TotalDeg <= 2 ? Grade.Firm : Cone95TotalDeg <= 5 ? Grade.Fair : Grade.Weak;
}
