using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <content>Cells from edges, and the robust fit that moves the sheet.</content>
internal sealed partial class MarginTracker
{
    private const double ScaleFloorM = 0.015;
    private const double StrayReachM = 0.9, ExcursionReachM = 0.5;

    // Weight of "the dip is that of the last pass, give or take six degrees" against squared residuals: (0.03 m)² of scatter, five
    // cells to carry the news of one, over 0.1². On a pavement without it the sheet tilts into the ground pass by pass.
    private const double TiltPrior = 0.03 * 0.03 * 5 / (0.1 * 0.1);

    // Means over cells of the map grid, each margin apart.
    private TraceCell[] CellsOf(SheetEdge[] placed, double corridor)
    {
        var sums = new Dictionary<(Margin, int, int, int), (double W, Vec3 Sum)>();
        var order = new List<(Margin M, int, int, int)>();
        foreach (SheetEdge e in placed)
        {
            if (Math.Abs(e.Facing) < FacingMin) continue;
            Margin m = e.Facing < 0 ? Margin.A : Margin.B;
            double tolerance = Math.Clamp(corridor * Guess.WidthAt(e.At.S), CorridorMinM, CorridorMaxM);
            if (Math.Abs(Guess.Distance(m, e.At)) > tolerance) continue;
            Vec3 p = edges[e.Edge].Place;
            var key = (m, (int)Math.Floor(p.X / CellM), (int)Math.Floor(p.Y / CellM), (int)Math.Floor(p.Z / CellM));
            if (!sums.TryGetValue(key, out (double W, Vec3 Sum) old)) order.Add(key);
            sums[key] = (old.W + e.Weight, old.Sum + (p * e.Weight));
        }

        var cells = new List<TraceCell>(order.Count);
        foreach ((Margin M, int, int, int) key in order)
        {
            (double w, Vec3 sum) = sums[key];
            Vec3 place = sum / w;
            cells.Add(new TraceCell(key.M, place, Sheet.Of(place), w));
        }

        double usual = cells.Count == 0 ? 0 : Median([.. cells.Select(c => c.Weight)]);
        cells.RemoveAll(c => c.Weight < 0.1 * usual);   // corners of cells: a few edges say little
        return [.. cells.OrderBy(c => c.At.S).ThenBy(c => c.At.T)];
    }

    // Robust fits along strike; drops cells that no fit near them wants, and gives the pieces for the next pass.
    private SheetPiece[] Refit()
    {
        var pieces = new List<SheetPiece>();
        var vote = new double[Cells.Length];
        double step = WindowM / 6, from = Cells[0].At.S, to = Cells[^1].At.S;
        int count = Math.Max(1, (int)Math.Round((to - from) / step));
        for (int i = 0; i <= count; i++)
        {
            double s = from + ((to - from) * i / count);
            if (FitAt(s, vote) is { } piece) pieces.Add(piece);
        }

        Cells = [.. Cells.Where((_, i) => vote[i] > 0.1)];
        return [.. pieces];
    }

    // A margin runs on smoothly: a cell far from what its neighbours on the same margin say is a corner of wrong labels.
    private TraceCell[] WithoutStrays()
    {
        var keep = new List<TraceCell>();
        var near = new List<double>();
        int lo = 0;
        for (int i = 0; i < Cells.Length; i++)
        {
            TraceCell c = Cells[i];
            while (Cells[lo].At.S < c.At.S - StrayReachM) lo++;
            near.Clear();
            for (int k = lo; k < Cells.Length && Cells[k].At.S <= c.At.S + StrayReachM; k++)
            {
                if (k != i && Cells[k].Margin == c.Margin) near.Add(Guess.Distance(c.Margin, Cells[k].At));
            }

            if (near.Count >= 3)
            {
                double middle = Median([.. near]), spread = 1.4826 * Median([.. near.Select(d => Math.Abs(d - middle))]);
                if (Math.Abs(Guess.Distance(c.Margin, c.At) - middle) > 3.5 * Math.Max(ScaleFloorM, spread)) continue;
            }

            keep.Add(c);
        }

        return [.. keep];
    }

    // Where wet soil or shade passes for host the labels leave the margin for some metres and come back. A margin does not: a
    // step stays. So a place is judged by the median about it against the median of a window about it; what lies apart by an
    // eighth of the width and by four scatters is no margin.
    private TraceCell[] WithoutExcursions()
    {
        var keep = new List<TraceCell>();
        foreach (Margin m in (Margin[])[Margin.A, Margin.B])
        {
            TraceCell[] own = [.. Cells.Where(c => c.Margin == m)];
            double[] level = [.. own.Select(c => Guess.Distance(m, c.At) + Guess.OffsetAt(m, c.At.S))];
            var apart = new double[own.Length];
            for (int i = 0; i < own.Length; i++) apart[i] = MedianAbout(own, level, i, ExcursionReachM) - MedianAbout(own, level, i, WindowM / 2);
            if (own.Length == 0) continue;
            double usual = 1.4826 * Median([.. apart.Select(Math.Abs)]);
            for (int i = 0; i < own.Length; i++)
            {
                if (Math.Abs(apart[i]) <= Math.Max(Guess.WidthAt(own[i].At.S) / 8, 4 * usual)) keep.Add(own[i]);
            }
        }

        return [.. keep.OrderBy(c => c.At.S).ThenBy(c => c.At.T)];
    }

    private static double MedianAbout(TraceCell[] own, double[] level, int i, double reach)
    {
        int from = i, to = i + 1;
        while (from > 0 && own[i].At.S - own[from - 1].At.S <= reach) from--;
        while (to < own.Length && own[to].At.S - own[i].At.S <= reach) to++;
        return Median(level[from..to]);
    }

    private SheetPiece? FitAt(double s0, double[] vote)
    {
        const bool both = true;
        int p = WindowModel.Parameters(both);
        var index = new List<int>();
        int a = 0, b = 0;
        for (int i = 0; i < Cells.Length; i++)
        {
            if (Math.Abs(Cells[i].At.S - s0) > WindowM / 2) continue;
            index.Add(i);
            if (Cells[i].Margin == Margin.A) a++;
            else b++;
        }

        if (index.Count < 4) return null;
        double t0 = index.Sum(i => Cells[i].At.T) / index.Count;
        var design = new double[index.Count * p];
        var y = new double[index.Count];
        var prior = new double[index.Count];
        for (int k = 0; k < y.Length; k++)
        {
            TraceCell c = Cells[index[k]];
            double d = (c.At.S - s0) / (WindowM / 2);
            WindowModel.Row(design.AsSpan(k * p, p), c.Margin, c.At.S - s0, c.At.T - t0, both);
            y[k] = c.At.Q;
            prior[k] = Math.Min(1, c.Weight / 10) * (1 - (0.9 * d * d));   // the middle of the window counts most
        }

        // Weak priors hold what this stretch does not show: a margin out of sight, the dip on flat ground.
        double h = WindowM / 2, unit = y.Length * 1e-3;
        double[] precision = [unit * 1e-3, unit * h * h * 0.01, unit * 1e-3, unit * h * h * 0.01, unit * h * h * h * h, TiltPrior];
        double expectedA = -Guess.Distance(Margin.A, new SheetPoint(s0, 0, t0)), expectedB = -Guess.Distance(Margin.B, new SheetPoint(s0, 0, t0));
        for (int k = 0; k < y.Length; k++) y[k] -= Cells[index[k]].Margin == Margin.A ? expectedA : expectedB;
        double[] w = [.. prior], residual = new double[y.Length];
        double[]? beta = null;
        for (int round = 0; round < 6; round++)
        {
            beta = WeightedFit.Solve(design, y, w, precision);
            if (beta is null) return null;
            for (int k = 0; k < y.Length; k++)
            {
                double value = 0;
                for (int j = 0; j < p; j++) value += design[(k * p) + j] * beta[j];
                residual[k] = y[k] - value;
            }

            WeightedFit.Bisquare(residual, prior, ScaleFloorM, w);
        }

        for (int k = 0; k < y.Length; k++) vote[index[k]] = Math.Max(vote[index[k]], w[k] / Math.Max(prior[k], 1e-9));
        double qa = expectedA + beta![0], qb = expectedB + beta[2], slope = (beta[1] + beta[3]) / 2;
        SheetAxes axes = Sheet.At(s0);
        Vec3 normal = (axes.Normal - (axes.Along * slope) - (axes.Up * beta[WindowModel.Tilt(both)])).Unit();
        double width = (qb - qa) * normal.Dot(axes.Normal);
        double before = expectedB - expectedA;
        if (!(width > 0.6 * before && width < 1.6 * before)) return null;   // collapsed or run away
        Vec3 middle = axes.Origin + (axes.Normal * ((qa + qb) / 2)) + (axes.Up * t0);
        double spread = index.Sum(i => Math.Pow(Cells[i].At.T - t0, 2));
        return new SheetPiece(middle, normal, width, 0.01 + Math.Min(a, b) + spread);
    }
}
