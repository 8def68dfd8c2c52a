using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Fitting;

/// <summary>A symmetric 3 by 3 matrix and its eigen-decomposition.</summary>
/// <param name="Xx">Row x, column x.</param>
/// <param name="Xy">Row x, column y.</param>
/// <param name="Xz">Row x, column z.</param>
/// <param name="Yy">Row y, column y.</param>
/// <param name="Yz">Row y, column z.</param>
/// <param name="Zz">Row z, column z.</param>
public readonly record struct Symmetric3(double Xx, double Xy, double Xz, double Yy, double Yz, double Zz)
{
    /// <summary>Sum.</summary>
    public static Symmetric3 operator +(Symmetric3 a, Symmetric3 b) =>
        new(a.Xx + b.Xx, a.Xy + b.Xy, a.Xz + b.Xz, a.Yy + b.Yy, a.Yz + b.Yz, a.Zz + b.Zz);

    /// <summary>Multiple.</summary>
    public static Symmetric3 operator *(Symmetric3 a, double k) =>
        new(a.Xx * k, a.Xy * k, a.Xz * k, a.Yy * k, a.Yz * k, a.Zz * k);

    /// <summary>w v vᵀ.</summary>
    public static Symmetric3 Outer(Vec3 v, double w = 1) =>
        new(w * v.X * v.X, w * v.X * v.Y, w * v.X * v.Z, w * v.Y * v.Y, w * v.Y * v.Z, w * v.Z * v.Z);

    /// <summary>Matrix times vector.</summary>
    public Vec3 Times(Vec3 v) => new(
        (Xx * v.X) + (Xy * v.Y) + (Xz * v.Z), (Xy * v.X) + (Yy * v.Y) + (Yz * v.Z), (Xz * v.X) + (Yz * v.Y) + (Zz * v.Z));

    /// <summary>vᵀ M v.</summary>
    public double Form(Vec3 v) => v.Dot(Times(v));

    /// <summary>Determinant.</summary>
    public double Determinant =>
        (Xx * ((Yy * Zz) - (Yz * Yz))) - (Xy * ((Xy * Zz) - (Yz * Xz))) + (Xz * ((Xy * Yz) - (Yy * Xz)));

    /// <summary>Inverse; infinities or NaN when singular.</summary>
    public Symmetric3 Inverse()
    {
        double k = 1 / Determinant;
        return new Symmetric3(
            k * ((Yy * Zz) - (Yz * Yz)),
            k * ((Xz * Yz) - (Xy * Zz)),
            k * ((Xy * Yz) - (Xz * Yy)),
            k * ((Xx * Zz) - (Xz * Xz)),
            k * ((Xy * Xz) - (Xx * Yz)),
            k * ((Xx * Yy) - (Xy * Xy)));
    }

    /// <summary>M C M, with M this matrix.</summary>
    public Symmetric3 Around(Symmetric3 c)
    {
        // Columns of C M, then rows of M times them.
        Vec3 m1 = new(Xx, Xy, Xz), m2 = new(Xy, Yy, Yz), m3 = new(Xz, Yz, Zz);
        Vec3 c1 = c.Times(m1), c2 = c.Times(m2), c3 = c.Times(m3);
        return new Symmetric3(m1.Dot(c1), m1.Dot(c2), m1.Dot(c3), m2.Dot(c2), m2.Dot(c3), m3.Dot(c3));
    }

    /// <summary>Eigenvalues in falling order with unit eigenvectors, a right-handed triple up to sign.</summary>
    /// <remarks>Cyclic Jacobi turns: slower than the closed form, but exact to rounding also for equal and for tiny values,
    /// where the closed form loses half its digits. A null matrix gives the unit axes.</remarks>
    public Eigen3 Eigen()
    {
        Span<double> a = [Xx, Xy, Xz, Xy, Yy, Yz, Xz, Yz, Zz];
        Span<double> v = [1, 0, 0, 0, 1, 0, 0, 0, 1];
        for (int sweep = 0; sweep < 30; sweep++)
        {
            double off = (a[1] * a[1]) + (a[2] * a[2]) + (a[5] * a[5]);
            double diagonal = (a[0] * a[0]) + (a[4] * a[4]) + (a[8] * a[8]);
            if (off <= 1e-34 * diagonal || off == 0) break;
            Turn(a, v, 0, 1);
            Turn(a, v, 0, 2);
            Turn(a, v, 1, 2);
        }

        int i1 = 0, i2 = 1, i3 = 2;
        if (a[i2 * 4] > a[i1 * 4]) (i1, i2) = (i2, i1);
        if (a[i3 * 4] > a[i1 * 4]) (i1, i3) = (i3, i1);
        if (a[i3 * 4] > a[i2 * 4]) (i2, i3) = (i3, i2);
        return new Eigen3(
            a[i1 * 4],
            a[i2 * 4],
            a[i3 * 4],
            new Vec3(v[i1], v[3 + i1], v[6 + i1]),
            new Vec3(v[i2], v[3 + i2], v[6 + i2]),
            new Vec3(v[i3], v[3 + i3], v[6 + i3]));
    }

    private static void Turn(Span<double> a, Span<double> v, int p, int q)
    {
        double apq = a[(p * 3) + q];
        if (apq == 0) return;
        double theta = (a[q * 4] - a[p * 4]) / (2 * apq);
        double t = (theta >= 0 ? 1 : -1) / (Math.Abs(theta) + Math.Sqrt((theta * theta) + 1));
        double c = 1 / Math.Sqrt((t * t) + 1), s = t * c;
        int r = 3 - p - q;
        double arp = a[(r * 3) + p], arq = a[(r * 3) + q];
        a[p * 4] -= t * apq;
        a[q * 4] += t * apq;
        a[(p * 3) + q] = a[(q * 3) + p] = 0;
        a[(r * 3) + p] = a[(p * 3) + r] = (c * arp) - (s * arq);
        a[(r * 3) + q] = a[(q * 3) + r] = (s * arp) + (c * arq);
        for (int k = 0; k < 3; k++)
        {
            double vkp = v[(k * 3) + p], vkq = v[(k * 3) + q];
            v[(k * 3) + p] = (c * vkp) - (s * vkq);
            v[(k * 3) + q] = (s * vkp) + (c * vkq);
        }
    }
}
