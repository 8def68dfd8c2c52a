using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Width;

/// <summary>Reads a dike's frame at any chainage.</summary>
internal sealed class CentreLine(DikeFrame frame)
{
    /// <summary>First chainage [m].</summary>
    public double FromM => frame.ChainageM[0];

    /// <summary>Last chainage [m].</summary>
    public double ToM => frame.ChainageM[^1];

    /// <summary>Place, unit normal from A to B, level direction along, direction up dip, one-sigma of the dip [deg] and whether
    /// strike and dip are fixed, at a chainage.</summary>
    public (Vec3 Place, Vec3 Normal, Vec3 Along, Vec3 Up, double DipSigmaDeg, bool Fixed) At(double chainageM)
    {
        double[] c = frame.ChainageM;
        int i = Array.BinarySearch(c, chainageM);
        if (i < 0) i = ~i - 1;
        i = Math.Clamp(i, 0, Math.Max(0, c.Length - 2));
        int j = Math.Min(i + 1, c.Length - 1);
        double f = j == i ? 0 : Math.Clamp((chainageM - c[i]) / (c[j] - c[i]), 0, 1);
        Vec3 place = frame.CentreLine[i] + ((frame.CentreLine[j] - frame.CentreLine[i]) * f);
        Vec3 normal = (frame.Normal[i] + ((frame.Normal[j] - frame.Normal[i]) * f)).Unit();
        Vec3 run = frame.CentreLine[^1] - frame.CentreLine[0];
        Vec3 along = Vec3.Up.Cross(normal) is { Length: > 1e-6 } level ? level.Unit() : (run - (normal * normal.Dot(run))).Unit();
        if (along.Dot(run) < 0) along = -along;
        Vec3 up = normal.Cross(along);
        int near = f < 0.5 ? i : j;
        return (place, normal, along, up.Z < 0 ? -up : up, frame.DipSigmaDeg[near], frame.Constraint[near] == Constraint.Plane);
    }
}
