namespace CloudStruct.Maths.Fitting;

/// <summary>Whether heights over a plane are better told by two planes that part along a straight line.</summary>
/// <param name="Angle">Direction across the line, from u toward v [rad].</param>
/// <param name="At">Place of the line along that direction [m].</param>
/// <param name="OneSquares">Sum of squared residuals about one plane [m²].</param>
/// <param name="TwoSquares">About two [m²].</param>
/// <param name="Low">Plane on the side of lower values: height = A + B u + C v.</param>
/// <param name="High">Plane on the other side.</param>
public readonly record struct PlaneSplit(
    double Angle, double At, double OneSquares, double TwoSquares, (double A, double B, double C) Low, (double A, double B, double C) High)
{
    private const int Directions = 12;

    /// <summary>How much the two planes turn against each other, as a slope [rad].</summary>
    public double Turn => Math.Sqrt(((High.B - Low.B) * (High.B - Low.B)) + ((High.C - Low.C) * (High.C - Low.C)));

    /// <summary>Best split over twelve directions and all places of the line.</summary>
    /// <param name="u">First coordinate per cell [m].</param>
    /// <param name="v">Second coordinate [m].</param>
    /// <param name="r">Mean height per cell [m].</param>
    /// <param name="fewest">Fewest cells on a side, 4 or more.</param>
    /// <returns>Null when there are too few cells.</returns>
    public static PlaneSplit? Best(double[] u, double[] v, double[] r, int fewest)
    {
        int n = u.Length;
        if (n < 2 * fewest) return null;
        var all = new HeightSums();
        for (int i = 0; i < n; i++) all.Add(u[i], v[i], r[i]);
        double one = all.Squares(out _);
        var key = new double[n];
        var order = new int[n];
        PlaneSplit? best = null;
        for (int k = 0; k < Directions; k++)
        {
            double angle = Math.PI * k / Directions, cos = Math.Cos(angle), sin = Math.Sin(angle);
            for (int i = 0; i < n; i++) (key[i], order[i]) = ((cos * u[i]) + (sin * v[i]), i);
            Array.Sort(key, order);
            var low = new HeightSums();
            HeightSums high = all;
            for (int i = 0; i < n - fewest; i++)
            {
                int c = order[i];
                low.Add(u[c], v[c], r[c]);
                high.Add(u[c], v[c], r[c], -1);
                if (i + 1 < fewest || key[i + 1] - key[i] < 1e-9) continue;
                double two = low.Squares(out var lowPlane) + high.Squares(out var highPlane);
                if (best is null || two < best.Value.TwoSquares)
                    best = new PlaneSplit(angle, (key[i] + key[i + 1]) / 2, one, two, lowPlane, highPlane);
            }
        }

        return best;
    }
}
