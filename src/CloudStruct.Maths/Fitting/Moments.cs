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

    /// <summary>Adds some points of a cloud with weight 1.</summary>
    /// <param name="east">East of all points [m].</param>
    /// <param name="north">North [m].</param>
    /// <param name="up">Up [m].</param>
    /// <param name="points">Numbers of the points to add.</param>
    public void Add(float[] east, float[] north, float[] up, ReadOnlySpan<int> points)
    {
        double ox = shift.X, oy = shift.Y, oz = shift.Z;
        double sw = w, sx = x, sy = y, sz = z, sxx = xx, sxy = xy, sxz = xz, syy = yy, syz = yz, szz = zz;
        foreach (int i in points)
        {
            double dx = east[i] - ox, dy = north[i] - oy, dz = up[i] - oz;
            sw += 1;
            sx += dx;
            sy += dy;
            sz += dz;
            sxx += dx * dx;
            sxy += dx * dy;
            sxz += dx * dz;
            syy += dy * dy;
            syz += dy * dz;
            szz += dz * dz;
        }

        (w, x, y, z, xx, xy, xz, yy, yz, zz) = (sw, sx, sy, sz, sxx, sxy, sxz, syy, syz, szz);
    }

    /// <summary>Adds places by Tukey's bisquare of their distance from a plane over a limit. The sums are those of <see cref="Add(double, double, double, double)"/>
    /// place by place, held in registers meanwhile.</summary>
    /// <param name="places">The places.</param>
    /// <param name="plane">Distances are taken from it.</param>
    /// <param name="limit">Distance at which the weight ends [m].</param>
    public void AddNear(ReadOnlySpan<Vec3> places, in PlaneFit plane, double limit)
    {
        double cx = plane.Centroid.X, cy = plane.Centroid.Y, cz = plane.Centroid.Z, nx = plane.Normal.X, ny = plane.Normal.Y, nz = plane.Normal.Z;
        double ox = shift.X, oy = shift.Y, oz = shift.Z;
        double sw = w, sx = x, sy = y, sz = z, sxx = xx, sxy = xy, sxz = xz, syy = yy, syz = yz, szz = zz;
        foreach (Vec3 p in places)
        {
            double q = ((nx * (p.X - cx)) + (ny * (p.Y - cy)) + (nz * (p.Z - cz))) / limit, k = 1 - (q * q);
            if (!(k > 0)) continue;
            double weight = k * k, dx = p.X - ox, dy = p.Y - oy, dz = p.Z - oz, wx = weight * dx, wy = weight * dy, wz = weight * dz;
            sw += weight;
            sx += wx;
            sy += wy;
            sz += wz;
            sxx += wx * dx;
            sxy += wx * dy;
            sxz += wx * dz;
            syy += wy * dy;
            syz += wy * dz;
            szz += wz * dz;
        }

        (w, x, y, z, xx, xy, xz, yy, yz, zz) = (sw, sx, sy, sz, sxx, sxy, sxz, syy, syz, szz);
    }

    /// <summary>The same for some points of a cloud.</summary>
    /// <param name="east">East of all points [m].</param>
    /// <param name="north">North [m].</param>
    /// <param name="up">Up [m].</param>
    /// <param name="points">Numbers of the points to add.</param>
    /// <param name="plane">Distances are taken from it.</param>
    /// <param name="limit">Distance at which the weight ends [m].</param>
    public void AddNear(float[] east, float[] north, float[] up, ReadOnlySpan<int> points, in PlaneFit plane, double limit)
    {
        double cx = plane.Centroid.X, cy = plane.Centroid.Y, cz = plane.Centroid.Z, nx = plane.Normal.X, ny = plane.Normal.Y, nz = plane.Normal.Z;
        double ox = shift.X, oy = shift.Y, oz = shift.Z;
        double sw = w, sx = x, sy = y, sz = z, sxx = xx, sxy = xy, sxz = xz, syy = yy, syz = yz, szz = zz;
        foreach (int i in points)
        {
            double px = east[i], py = north[i], pz = up[i];
            double q = ((nx * (px - cx)) + (ny * (py - cy)) + (nz * (pz - cz))) / limit, k = 1 - (q * q);
            if (!(k > 0)) continue;
            double weight = k * k, dx = px - ox, dy = py - oy, dz = pz - oz, wx = weight * dx, wy = weight * dy, wz = weight * dz;
            sw += weight;
            sx += wx;
            sy += wy;
            sz += wz;
            sxx += wx * dx;
            sxy += wx * dy;
            sxz += wx * dz;
            syy += wy * dy;
            syz += wy * dz;
            szz += wz * dz;
        }

        (w, x, y, z, xx, xy, xz, yy, yz, zz) = (sw, sx, sy, sz, sxx, sxy, sxz, syy, syz, szz);
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
