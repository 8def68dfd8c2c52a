namespace CloudStruct.Maths.Directions;

/// <summary>Bingham's law of axes: density exp(k1 x² + k2 y²) / (4π B), x and y the components of the axis along two unit
/// vectors square to the mean axis. k1 ≤ k2 ≤ 0 is a cluster, k2 = 0 a girdle, k1 = k2 Watson's law.</summary>
public static class Bingham
{
    // Gauss-Legendre, 20 nodes on [-1, 1]: the positive half.
    private static readonly (double At, double Weight)[] Nodes = GaussLegendre(20);

    /// <summary>ln B, B the mean of exp(k1 x² + k2 y²) over the sphere.</summary>
    /// <param name="k1">Either sign.</param>
    /// <param name="k2">Either sign.</param>
    /// <remarks>The longitude integrates to a Bessel function; what is left, over the angle a from the mean axis, is smooth:
    /// exp(k sin² a) I0e(d sin² a) sin a with k = max(k1, k2), d = |k1 - k2|/2. The panels double in width from the
    /// narrowest scale that the two exponents have.</remarks>
    public static double LogNormaliser(double k1, double k2) => Integrate(k1, k2).LogB;

    /// <summary>ln B with the means of x² and y² (its two slopes), which equal the eigenvalues of the orientation tensor at
    /// the maximum of the likelihood.</summary>
    public static (double LogB, double MeanX2, double MeanY2) Integrate(double k1, double k2)
    {
        double top = Math.Max(k1, k2), d = Math.Abs(k1 - k2) / 2, lift = Math.Max(0, top);
        double panel = Math.Min(Math.PI / 2, 1.5 / Math.Sqrt(1 + Math.Max(Math.Abs(top), 2 * d)));
        double b = 0, sum2 = 0, difference = 0;
        for (double from = 0; from < Math.PI / 2; panel *= 2)
        {
            double to = Math.Min(Math.PI / 2, from + panel);
            if (Math.PI / 2 - to < 1e-9) to = Math.PI / 2;
            for (int i = 0; i < Nodes.Length; i++)
            {
                double a = from + ((to - from) / 2 * (1 + Nodes[i].At));
                double sine = Math.Sin(a), s = sine * sine;
                double g = Math.Exp((top * s) - lift) * sine * Nodes[i].Weight * (to - from) / 2;
                double i0 = ScaledBessel.I0(d * s), i1 = ScaledBessel.I1(d * s);
                b += g * i0;
                sum2 += g * i0 * s;          // x² + y²
                difference += g * i1 * s;    // square of the favoured component minus that of the other
            }

            from = to;
        }

        double favoured = (sum2 + difference) / (2 * b), other = (sum2 - difference) / (2 * b);
        return k1 >= k2 ? (Math.Log(b) + lift, favoured, other) : (Math.Log(b) + lift, other, favoured);
    }

    /// <summary>(k1, k2) by maximum likelihood from the two smaller eigenvalues of the orientation tensor.</summary>
    /// <param name="s3">Smallest eigenvalue, above 0; goes with k1.</param>
    /// <param name="s2">Middle eigenvalue, at most (1 - s3)/2; goes with k2.</param>
    /// <param name="tolerance">Relative error of either exponent.</param>
    /// <returns>k1 ≤ k2 ≤ 0.</returns>
    public static (double K1, double K2) KappasOf(double s3, double s2, double tolerance = 1e-10)
    {
        // Tight clusters are normal in the tangent plane, where the mean of x² is -1/(2 k1): so 1/mean is nearly linear in k,
        // and Newton's rule on it (slopes by differences) needs few rounds.
        double k1 = -0.5 / s3, k2 = -0.5 / s2;
        for (int i = 0; i < 60; i++)
        {
            double h1 = 1e-4 * (1 + Math.Abs(k1)), h2 = 1e-4 * (1 + Math.Abs(k2));
            (double f1, double f2) = Miss(k1, k2, s3, s2);
            (double a1, double a2) = Miss(k1 - h1, k2, s3, s2);
            (double b1, double b2) = Miss(k1, k2 - h2, s3, s2);
            double m11 = (f1 - a1) / h1, m21 = (f2 - a2) / h1, m12 = (f1 - b1) / h2, m22 = (f2 - b2) / h2;
            double det = (m11 * m22) - (m12 * m21);
            double d1 = ((f1 * m22) - (f2 * m12)) / det, d2 = ((f2 * m11) - (f1 * m21)) / det;

            // Not past zero, nor more than fourfold, in one round.
            double n1 = Math.Clamp(k1 - d1, (4 * k1) - 1, 0), n2 = Math.Clamp(k2 - d2, (4 * k2) - 1, 0);
            bool done = Math.Abs(n1 - k1) <= tolerance * (1 + Math.Abs(k1)) && Math.Abs(n2 - k2) <= tolerance * (1 + Math.Abs(k2));
            (k1, k2) = (n1, n2);
            if (done) break;
        }

        return (k1, k2);
    }

    private static (double F1, double F2) Miss(double k1, double k2, double s3, double s2)
    {
        (_, double x2, double y2) = Integrate(k1, k2);
        return ((0.5 / s3) - (0.5 / x2), (0.5 / s2) - (0.5 / y2));
    }

    private static (double At, double Weight)[] GaussLegendre(int n)
    {
        var nodes = new (double At, double Weight)[n];
        for (int i = 0; i < n; i++)
        {
            double x = Math.Cos(Math.PI * (i + 0.75) / (n + 0.5)), slope = 1;
            for (int round = 0; round < 100; round++)
            {
                double p0 = 1, p1 = x;
                for (int k = 2; k <= n; k++) (p0, p1) = (p1, ((((2 * k) - 1) * x * p1) - ((k - 1) * p0)) / k);
                slope = n * ((x * p1) - p0) / ((x * x) - 1);
                double move = p1 / slope;
                x -= move;
                if (Math.Abs(move) < 1e-16) break;
            }

            nodes[i] = (x, 2 / ((1 - (x * x)) * slope * slope));
        }

        return nodes;
    }
}
