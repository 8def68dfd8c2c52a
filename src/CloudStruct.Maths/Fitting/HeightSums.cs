namespace CloudStruct.Maths.Fitting;

/// <summary>Running sums for the plane height = a + b u + c v by least squares; cells come and go.</summary>
internal struct HeightSums
{
    private double n, u, v, r, uu, uv, vv, ur, vr, rr;

    /// <summary>Adds a height; times -1 takes it out again.</summary>
    public void Add(double pu, double pv, double pr, double times = 1)
    {
        n += times;
        u += times * pu;
        v += times * pv;
        r += times * pr;
        uu += times * pu * pu;
        uv += times * pu * pv;
        vv += times * pv * pv;
        ur += times * pu * pr;
        vr += times * pv * pr;
        rr += times * pr * pr;
    }

    /// <summary>Sum of squared residuals about the best plane; about the mean height when the places lie in a line.</summary>
    public readonly double Squares(out (double A, double B, double C) plane)
    {
        double mu = u / n, mv = v / n, mr = r / n;
        double suu = uu - (u * mu), suv = uv - (u * mv), svv = vv - (v * mv), sur = ur - (u * mr), svr = vr - (v * mr);
        double det = (suu * svv) - (suv * suv), b = 0, c = 0;
        if (det > 1e-9 * (suu + svv) * (suu + svv))   // else the places lie in a line
        {
            b = ((sur * svv) - (svr * suv)) / det;
            c = ((svr * suu) - (sur * suv)) / det;
        }

        plane = (mr - (b * mu) - (c * mv), b, c);
        return Math.Max(0, rr - (r * mr) - (b * sur) - (c * svr));
    }
}
