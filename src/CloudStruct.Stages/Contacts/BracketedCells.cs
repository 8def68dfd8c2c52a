using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Contacts;

/// <summary>Fills gaps of a trace where both rocks show but no two of their points are neighbours: a wall along the contact that
/// the view did not reach. Dike below and host above still bracket the margin along its normal.</summary>
internal static class BracketedCells
{
    private const double FlankM = 0.25;      // how far from the margin points speak
    private const double LargestGapM = 0.1;  // between the two rocks, along the normal
    private const int Enough = 6;            // points of each rock
    private const double LargestWrong = 0.15, LargestHidden = 0.2;

    /// <summary>The cells with those added, in order of s.</summary>
    public static TraceCell[] Added(TraceCell[] cells, WorkingCloud cloud, ClassifiedCloud classes, int dike, MarginTracker tracker)
    {
        if (cells.Length == 0) return cells;
        double from = cells[0].At.S, step = tracker.CellM;
        int bins = (int)((cells[^1].At.S - from) / step) + 1;
        var full = new bool[2, bins];
        foreach (TraceCell c in cells)
        {
            int at = (int)((c.At.S - from) / step);
            for (int b = Math.Max(0, at - 1); b <= Math.Min(bins - 1, at + 1); b++) full[(int)c.Margin, b] = true;
        }

        var near = new Dictionary<(int, int), List<(double D, double T, byte Class)>>();
        for (int i = 0; i < cloud.Count; i++)
        {
            SheetPoint at = tracker.Sheet.Of(cloud.Place(i));
            double bin = Math.Floor((at.S - from) / step);
            if (bin < 0 || bin >= bins) continue;
            for (int m = 0; m < 2; m++)
            {
                if (full[m, (int)bin]) continue;
                double d = tracker.Guess.Distance((Margin)m, at) * (m == 0 ? -1 : 1);
                if (Math.Abs(d) > FlankM) continue;
                if (!near.TryGetValue((m, (int)bin), out List<(double D, double T, byte Class)>? list)) near[(m, (int)bin)] = list = [];
                byte kind = classes.Class[i];
                if (kind is (byte)RockClass.Dike or (byte)RockClass.Inclusion) kind = classes.DikeOfPoint[i] == dike ? (byte)RockClass.Dike : (byte)RockClass.Unknown;
                list.Add((d, at.T, kind));
            }
        }

        var added = new List<TraceCell>(cells);
        double usual = MarginTracker.Median([.. cells.Select(c => c.Weight)]);
        foreach (((int m, int bin), List<(double D, double T, byte Class)> list) in near.OrderBy(p => p.Key))
        {
            if (Edge(list) is not { } edge) continue;
            double s = from + ((bin + 0.5) * step);
            double q = -tracker.Guess.Distance((Margin)m, new SheetPoint(s, 0, edge.T)) + (edge.D * (m == 0 ? -1 : 1));
            var at = new SheetPoint(s, q, edge.T);
            added.Add(new TraceCell((Margin)m, tracker.Sheet.Place(at), at, usual / 2));
        }

        return [.. added.OrderBy(c => c.At.S).ThenBy(c => c.At.T)];
    }

    // The offset that parts the two rocks with the fewest points on the wrong side.
    private static (double D, double T)? Edge(List<(double D, double T, byte Class)> list)
    {
        List<(double D, double T, byte Class)> rock = [.. list.Where(p => p.Class is (byte)RockClass.Host or (byte)RockClass.Dike)];
        if (list.Count - rock.Count > LargestHidden * list.Count) return null;
        rock.Sort();
        int host = 0, dike = rock.Count(p => p.Class == (byte)RockClass.Dike), allDike = dike, least = int.MaxValue, cut = 0;
        for (int k = 0; k <= rock.Count; k++)   // k points lie inside
        {
            int wrong = host + dike;
            if (wrong < least) (least, cut) = (wrong, k);
            if (k == rock.Count) break;
            if (rock[k].Class == (byte)RockClass.Dike) dike--;
            else host++;
        }

        if (cut < Enough || rock.Count - cut < Enough || allDike < Enough || rock.Count - allDike < Enough || least > LargestWrong * rock.Count) return null;
        (double D, double T, byte Class) inner = rock[cut - 1], outer = rock[cut];
        return outer.D - inner.D > LargestGapM ? null : ((inner.D + outer.D) / 2, (inner.T + outer.T) / 2);
    }
}
