using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Fitting;

/// <summary>Running sums of weighted points about a fixed shift: merge by adding, then ask for centroid and scatter.</summary>
/// <remarks>The shift must lie near the points (within some hundred metres for millimetres), or digits are lost.</remarks>
public struct Moments
{
    private readonly Vec3 shift;
    private double w, x, y, z, xx, xy, xz, yy, yz, zz;

    /// <summary>Empty sums about a place near the points.</summary>
    public Moments(Vec3 shift) => this.shift = shift;

    /// <summary>Sum of weights.</summary>
    public readonly double Weight => w;

    /// <summary>Weighted mean; NaN when empty.</summary>
    public readonly Vec3 Centroid => new Vec3(x / w, y / w, z / w) + shift;

    /// <summary>Weighted covariance about the centroid, divided by the sum of weights [m²].</summary>
    public readonly Symmetric3 Covariance
    {
        get
        {
            double mx = x / w, my = y / w, mz = z / w;
            return new Symmetric3(
                (xx / w) - (mx * mx), (xy / w) - (mx * my), (xz / w) - (mx * mz), (yy / w) - (my * my), (yz / w) - (my * mz), (zz / w) - (mz * mz));
        }
    }

    /// <summary>Adds a point; a negative weight takes it out again.</summary>
    public void Add(double px, double py, double pz, double weight = 1)
    {
        double dx = px - shift.X, dy = py - shift.Y, dz = pz - shift.Z;
        w += weight;
        x += weight * dx;
        y += weight * dy;
        z += weight * dz;
        xx += weight * dx * dx;
        xy += weight * dx * dy;
        xz += weight * dx * dz;
        yy += weight * dy * dy;
        yz += weight * dy * dz;
        zz += weight * dz * dz;
    }

    /// <summary>Adds sums that were taken about the same shift.</summary>
    public void Add(in Moments other)
    {
        w += other.w;
        x += other.x;
        y += other.y;
        z += other.z;
        xx += other.xx;
        xy += other.xy;
        xz += other.xz;
        yy += other.yy;
        yz += other.yz;
        zz += other.zz;
    }
}
