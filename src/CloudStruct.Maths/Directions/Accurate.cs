namespace CloudStruct.Maths.Directions;

/// <summary>ln(1 + x) and exp(x) - 1 without the loss of digits near 0 that the plain forms have.</summary>
/// <remarks>W. Kahan's correction (from memory): the rounding error made in 1 + x, or in exp(x), is divided out again.</remarks>
internal static class Accurate
{
    /// <summary>ln(1 + x), x &gt; -1.</summary>
    public static double LogOnePlus(double x)
    {
        double u = 1 + x;
        return u == 1 ? x : Math.Log(u) * (x / (u - 1));
    }

    /// <summary>exp(x) - 1.</summary>
    public static double ExpMinusOne(double x)
    {
        double u = Math.Exp(x);
        if (u == 1) return x;
        double v = u - 1;
        return v == -1 ? -1 : v * (x / Math.Log(u));
    }
}
