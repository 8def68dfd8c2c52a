namespace CloudStruct.Stages.Contacts;

/// <summary>The cells that a margin's own neighbourhood believes: stretches of half a metre or so where soil, shade or lichen led the
/// trace astray say nothing about the contact's attitude.</summary>
/// <remarks>Robust local planes (Cleveland 1979, locally weighted regression, from memory): tricube weights over ten cells, Tukey's
/// bisquare over rounds. Kriging one cell from all others does not see such stretches: the neighbours err alike. Behind the real
/// classifier nine tenths of the cells lie within 5 cm and some lie 20 to 90 cm away; with those left in, a fit took them for waves
/// of the margin (contact errors 1.3 deg in the median instead of 1.0, at smaller cones). The traces keep them: a step of the margin
/// itself departs from its neighbourhood too.</remarks>
internal static class SteadyCells
{
    private const double ReachCells = 10;
    private const double CutScales = 4;
    private const double LeastScaleM = 0.015;
    private const int Rounds = 5;

    // Slopes against the sheet are small: a tenth of a neighbourhood's mass holds them where cells lie in a line.
    private const double SlopePrior = 0.3;

    /// <summary>Cells within four robust standard deviations of their neighbourhood, in the order given, and that standard deviation.</summary>
    /// <param name="cells">Cells of both margins in order of s.</param>
    /// <param name="cellM">Edge of a cell [m].</param>
    public static (TraceCell[] Cells, double ScaleM) Of(TraceCell[] cells, double cellM)
    {
        if (cells.Length == 0) return (cells, LeastScaleM);
        double reach = ReachCells * cellM, scale = LeastScaleM;
        var residual = new double[cells.Length];
        var weight = new double[cells.Length];
        Array.Fill(weight, 1);
        for (int round = 0; round < Rounds; round++)
        {
            for (int i = 0, from = 0; i < cells.Length; i++)
            {
                while (cells[from].At.S < cells[i].At.S - reach) from++;
                residual[i] = cells[i].At.Q - Local(cells, i, from, reach, weight);
            }

            scale = Math.Max(LeastScaleM, 1.4826 * MarginTracker.Median([.. residual.Select(Math.Abs)]));
            for (int i = 0; i < cells.Length; i++)
            {
                double u = residual[i] / (CutScales * scale), w = Math.Max(0, 1 - (u * u));
                weight[i] = w * w;
            }
        }

        return ([.. cells.Where((_, i) => weight[i] > 0)], scale);
    }

    // Value at cell i of the plane through the cells of its margin about it.
    private static double Local(TraceCell[] cells, int i, int from, double reach, double[] weight)
    {
        TraceCell own = cells[i];
        double w0 = 0, ws = 0, wt = 0, ss = 0, st = 0, tt = 0, q = 0, sq = 0, tq = 0;
        for (int j = from; j < cells.Length && cells[j].At.S <= own.At.S + reach; j++)
        {
            if (cells[j].Margin != own.Margin) continue;
            double ds = cells[j].At.S - own.At.S, dt = cells[j].At.T - own.At.T, d = TraceNoise.Distance(ds, dt) / reach;
            if (d >= 1) continue;
            double tri = 1 - (d * d * d), w = tri * tri * tri * weight[j];
            w0 += w;
            ws += w * ds;
            wt += w * dt;
            ss += w * ds * ds;
            st += w * ds * dt;
            tt += w * dt * dt;
            q += w * cells[j].At.Q;
            sq += w * ds * cells[j].At.Q;
            tq += w * dt * cells[j].At.Q;
        }

        if (w0 < 1e-9) return own.At.Q;   // nobody believed stands by: it is judged by no one
        ss += SlopePrior * w0;
        tt += SlopePrior * w0;
        double minorS = (ss * tt) - (st * st), minorT = (ws * tt) - (st * wt), minorU = (ws * st) - (ss * wt);
        double det = (w0 * minorS) - (ws * minorT) + (wt * minorU);
        double top = (q * minorS) - (ws * ((sq * tt) - (st * tq))) + (wt * ((sq * st) - (ss * tq)));
        return top / det;
    }
}
