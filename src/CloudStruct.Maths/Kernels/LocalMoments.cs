using System.Runtime.Intrinsics;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Kernels;

/// <summary>Weighted sums of the points about one place, relative to it: what a local plane fit needs.</summary>
/// <param name="W">Sum of weights.</param>
/// <param name="X">Weighted sum of x offsets [m].</param>
/// <param name="Y">Weighted sum of y offsets [m].</param>
/// <param name="Z">Weighted sum of z offsets [m].</param>
/// <param name="Xx">Weighted sum of products [m²].</param>
/// <param name="Xy">See <paramref name="Xx"/>.</param>
/// <param name="Xz">See <paramref name="Xx"/>.</param>
/// <param name="Yy">See <paramref name="Xx"/>.</param>
/// <param name="Yz">See <paramref name="Xx"/>.</param>
/// <param name="Zz">See <paramref name="Xx"/>.</param>
public readonly record struct LocalMoments(
    float W, float X, float Y, float Z, float Xx, float Xy, float Xz, float Yy, float Yz, float Zz)
{
    /// <summary>Weighted mean offset [m]; NaN without points.</summary>
    public Vec3 Mean => new Vec3(X, Y, Z) / W;

    /// <summary>Weighted covariance [m²]; NaN without points.</summary>
    public Symmetric3 Covariance
    {
        get
        {
            double w = 1.0 / W, mx = X * w, my = Y * w, mz = Z * w;
            return new Symmetric3(
                (Xx * w) - (mx * mx), (Xy * w) - (mx * my), (Xz * w) - (mx * mz), (Yy * w) - (my * my), (Yz * w) - (my * mz), (Zz * w) - (mz * mz));
        }
    }

    /// <summary>Sums with the weight (1 - d²/r²)², which falls smoothly to nothing at the radius r, so that no point
    /// jumps in or out; equal weights would put most of the say on the rim, where edges are.</summary>
    /// <param name="x">East of candidates [m], a multiple of eight long; pad with far-off places.</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <param name="px">The place.</param>
    /// <param name="py">The place.</param>
    /// <param name="pz">The place.</param>
    /// <param name="radius">Radius [m].</param>
    /// <remarks>Eight lanes of neighbouring candidates, folded in a fixed order and without fused multiply-add: the same
    /// bits on any machine.</remarks>
    public static LocalMoments About(
        ReadOnlySpan<float> x, ReadOnlySpan<float> y, ReadOnlySpan<float> z, float px, float py, float pz, float radius)
    {
        Vector256<float> cx = Vector256.Create(px), cy = Vector256.Create(py), cz = Vector256.Create(pz);
        Vector256<float> scale = Vector256.Create(1 / (radius * radius)), one = Vector256<float>.One, none = Vector256<float>.Zero;
        Vector256<float> sw = none, sx = none, sy = none, sz = none;
        Vector256<float> sxx = none, sxy = none, sxz = none, syy = none, syz = none, szz = none;
        for (int c = 0; c < x.Length; c += 8)
        {
            Vector256<float> dx = Vector256.Create(x[c..]) - cx;
            Vector256<float> dy = Vector256.Create(y[c..]) - cy;
            Vector256<float> dz = Vector256.Create(z[c..]) - cz;
            Vector256<float> t = Vector256.Max(none, one - (((dx * dx) + (dy * dy) + (dz * dz)) * scale));
            if (Vector256.EqualsAll(t, none)) continue;
            Vector256<float> w = t * t;
            Vector256<float> wx = w * dx, wy = w * dy, wz = w * dz;
            sw += w;
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

        return Fold(sw, sx, sy, sz, sxx, sxy, sxz, syy, syz, szz);
    }

    /// <summary>The same, each weight times (1 - e²/c²)², e the distance from a plane: Tukey's bisquare, so that what lies
    /// beyond an edge has no say.</summary>
    /// <param name="x">East of candidates [m], a multiple of eight long; pad with far-off places.</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <param name="px">The place.</param>
    /// <param name="py">The place.</param>
    /// <param name="pz">The place.</param>
    /// <param name="radius">Radius [m].</param>
    /// <param name="nx">Unit normal of the plane.</param>
    /// <param name="ny">Unit normal.</param>
    /// <param name="nz">Unit normal.</param>
    /// <param name="offset">Distance of the plane from the place along the normal [m].</param>
    /// <param name="cut">Distance c from the plane at which a weight ends [m].</param>
    public static LocalMoments AboutPlane(
        ReadOnlySpan<float> x, ReadOnlySpan<float> y, ReadOnlySpan<float> z, float px, float py, float pz, float radius, float nx, float ny, float nz, float offset, float cut)
    {
        Vector256<float> cx = Vector256.Create(px), cy = Vector256.Create(py), cz = Vector256.Create(pz);
        Vector256<float> ax = Vector256.Create(nx), ay = Vector256.Create(ny), az = Vector256.Create(nz), at = Vector256.Create(offset);
        Vector256<float> scale = Vector256.Create(1 / (radius * radius)), plane = Vector256.Create(1 / (cut * cut));
        Vector256<float> one = Vector256<float>.One, none = Vector256<float>.Zero;
        Vector256<float> sw = none, sx = none, sy = none, sz = none;
        Vector256<float> sxx = none, sxy = none, sxz = none, syy = none, syz = none, szz = none;
        for (int c = 0; c < x.Length; c += 8)
        {
            Vector256<float> dx = Vector256.Create(x[c..]) - cx;
            Vector256<float> dy = Vector256.Create(y[c..]) - cy;
            Vector256<float> dz = Vector256.Create(z[c..]) - cz;
            Vector256<float> t = Vector256.Max(none, one - (((dx * dx) + (dy * dy) + (dz * dz)) * scale));
            if (Vector256.EqualsAll(t, none)) continue;
            Vector256<float> e = (dx * ax) + (dy * ay) + (dz * az) - at;
            t *= Vector256.Max(none, one - (e * e * plane));
            Vector256<float> w = t * t;
            Vector256<float> wx = w * dx, wy = w * dy, wz = w * dz;
            sw += w;
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

        return Fold(sw, sx, sy, sz, sxx, sxy, sxz, syy, syz, szz);
    }

    private static LocalMoments Fold(
        Vector256<float> sw, Vector256<float> sx, Vector256<float> sy, Vector256<float> sz, Vector256<float> sxx, Vector256<float> sxy, Vector256<float> sxz, Vector256<float> syy, Vector256<float> syz, Vector256<float> szz) =>
        new(
            Vector256.Sum(sw), Vector256.Sum(sx), Vector256.Sum(sy), Vector256.Sum(sz), Vector256.Sum(sxx), Vector256.Sum(sxy), Vector256.Sum(sxz), Vector256.Sum(syy), Vector256.Sum(syz), Vector256.Sum(szz));
}
