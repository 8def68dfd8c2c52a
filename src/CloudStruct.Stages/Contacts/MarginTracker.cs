using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>Follows both margins of one dike from a first guess to clean trace cells: find the strongest lines of class changes,
/// fit them stretch by stretch, move the reference sheet onto them, and again.</summary>
/// <remarks>Changes around islands (lichen, clasts, mistakes) face the wrong way or lie away from the lines. Three passes: the
/// first tolerates a guess that is off by a third of the width or ten degrees, the last keeps what lies within a fifth.</remarks>
internal sealed partial class MarginTracker
{
    private static readonly double[] Corridors = [0.35, 0.25, 0.2];   // of the width
    private const double CorridorMinM = 0.12, CorridorMaxM = 0.8, FacingMin = 0.3;
    private readonly MarginEdge[] edges;
    private readonly Vec3? forward;
    private readonly double turnDeg, spacingM;
    private readonly Vec3 levelTrend;
    private readonly ContactSettings settings;

    public MarginTracker(MarginEdge[] edges, Vec3? forward, double turnDeg, Vec3 levelTrend, double spacingM, ContactSettings settings)
    {
        this.edges = edges;
        this.forward = forward;
        this.turnDeg = turnDeg;
        this.levelTrend = levelTrend;
        this.spacingM = spacingM;
        this.settings = settings;
    }

    /// <summary>Reference sheet of the last pass.</summary>
    public Sheet Sheet { get; private set; } = null!;

    /// <summary>Margins along strike after the last pass.</summary>
    public MarginGuess Guess { get; private set; } = null!;

    /// <summary>Cells of both traces in order of s.</summary>
    public TraceCell[] Cells { get; private set; } = [];

    /// <summary>Length of the fitting window [m].</summary>
    public double WindowM { get; private set; }

    /// <summary>Edge of the cells [m].</summary>
    public double CellM { get; private set; }

    /// <summary>Runs the passes.</summary>
    /// <param name="pieces">First guess, at least one piece.</param>
    /// <returns>False when no margin could be followed.</returns>
    public bool Follow(SheetPiece[] pieces)
    {
        for (int pass = 0; pass < Corridors.Length; pass++)
        {
            Sheet = Sheet.Through(pieces, forward, turnDeg, levelTrend);
            double width = Median([.. pieces.Select(p => p.WidthM)]);
            WindowM = Math.Max(settings.WindowWidths * width, settings.WindowMinM);
            CellM = settings.CellM ?? Math.Max(0.25, Math.Max(4 * spacingM, WindowM / 80));
            SheetEdge[] placed = OnSheet();
            if (placed.Length < 8) return false;
            Guess = Peaks(placed, Expected(pieces, placed[0].At.S, placed[^1].At.S), pass == 0 ? 0.5 : Corridors[pass - 1]);
            Cells = CellsOf(placed, Corridors[pass]);
            if (Cells.Length < 4) return false;
            SheetPiece[] next = Refit();
            if (next.Length == 0) return false;
            pieces = next;
        }

        Cells = WithoutStrays();
        Cells = WithoutExcursions();
        return Cells.Length >= 4;
    }

    private SheetEdge[] OnSheet()
    {
        var placed = new SheetEdge[edges.Length];
        for (int i = 0; i < edges.Length; i++)
        {
            SheetPoint at = Sheet.Of(edges[i].Place);
            double facing = edges[i].Outward.Dot(Sheet.At(at.S).Normal);
            placed[i] = new SheetEdge(i, at, facing, edges[i].Weight * Math.Abs(facing));
        }

        Array.Sort(placed, (a, b) => a.At.S != b.At.S ? a.At.S.CompareTo(b.At.S) : a.Edge.CompareTo(b.Edge));
        return placed;
    }

    // Margins of the pieces at even steps along strike, held beyond the ends.
    private MarginGuess Expected(SheetPiece[] pieces, double from, double to)
    {
        double step = Math.Max(0.5, WindowM / 10);
        int count = Math.Max(2, (int)Math.Ceiling((to - from) / step) + 1);
        var at = pieces.Select(p => (Sheet.Of(p.Middle), p.WidthM, Tilt: TiltOf(p))).OrderBy(p => p.Item1.S).ToArray();
        var guess = new MarginGuess(from, step, new double[count], new double[count], new double[count]);
        int k = 0;
        for (int i = 0; i < count; i++)
        {
            double s = from + (i * step);
            while (k + 1 < at.Length && at[k + 1].Item1.S <= s) k++;
            int next = Math.Min(k + 1, at.Length - 1);
            double gap = at[next].Item1.S - at[k].Item1.S, f = gap > 0 ? Math.Clamp((s - at[k].Item1.S) / gap, 0, 1) : 0;
            double Mid(int j) => at[j].Item1.Q - (at[j].Tilt * at[j].Item1.T);
            double middle = Mid(k) + (f * (Mid(next) - Mid(k))), width = at[k].WidthM + (f * (at[next].WidthM - at[k].WidthM));
            guess.A[i] = middle - (width / 2);
            guess.B[i] = middle + (width / 2);
            guess.Tilt[i] = at[k].Tilt + (f * (at[next].Tilt - at[k].Tilt));
        }

        return guess;
    }

    private double TiltOf(SheetPiece p)
    {
        SheetAxes a = Sheet.At(Sheet.Of(p.Middle).S);
        double along = p.Normal.Dot(a.Normal);
        return Math.Abs(along) < 0.3 ? 0 : Math.Clamp(-p.Normal.Dot(a.Up) / along, -1, 1);
    }

    // The strongest line of changes that face the right way, near where each margin is expected.
    private MarginGuess Peaks(SheetEdge[] placed, MarginGuess expected, double reach)
    {
        double half = Math.Max(expected.StepM, WindowM / 6);
        var found = expected with { A = [.. expected.A], B = [.. expected.B] };
        int lo = 0;
        for (int i = 0; i < expected.Count; i++)
        {
            double s = expected.SOf(i), width = Math.Max(0.1, expected.B[i] - expected.A[i]);
            while (lo < placed.Length && placed[lo].At.S < s - half) lo++;
            foreach (Margin m in (Margin[])[Margin.A, Margin.B])
            {
                var near = new List<(double D, double W)>();
                double range = Math.Clamp(reach * width, CorridorMinM, Math.Max(2 * CorridorMaxM, 0.2 * width));
                for (int j = lo; j < placed.Length && placed[j].At.S <= s + half; j++)
                {
                    if (m == Margin.A ? placed[j].Facing > -FacingMin : placed[j].Facing < FacingMin) continue;
                    double d = expected.Distance(m, placed[j].At);
                    if (Math.Abs(d) <= range) near.Add((d, placed[j].Weight * Math.Exp(-0.5 * d * d / (range * range * 0.5))));
                }

                (m == Margin.A ? found.A : found.B)[i] += Peak(near, Math.Max(0.05, 0.04 * width));
            }
        }

        return found with { A = Smooth(found.A), B = Smooth(found.B) };
    }

    // Place of the heaviest band of a given half-width: the weighted mean in it. 0 without data.
    private static double Peak(List<(double D, double W)> near, double half)
    {
        if (near.Count < 3) return 0;
        near.Sort();
        double sum = 0, moment = 0, best = -1, place = 0;
        int lo = 0;
        foreach ((double d, double w) in near)
        {
            sum += w;
            moment += w * d;
            while (near[lo].D < d - (2 * half))
            {
                sum -= near[lo].W;
                moment -= near[lo].W * near[lo].D;
                lo++;
            }

            if (sum > best) (best, place) = (sum, moment / sum);
        }

        return place;
    }

    private static double[] Smooth(double[] line)
    {
        var smooth = new double[line.Length];
        for (int i = 0; i < line.Length; i++) smooth[i] = Median(line[Math.Max(0, i - 2)..Math.Min(line.Length, i + 3)]);
        return smooth;
    }

    internal static double Median(double[] values)
    {
        Array.Sort(values);
        int n = values.Length;
        return n % 2 == 1 ? values[n / 2] : (values[(n / 2) - 1] + values[n / 2]) / 2;
    }
}
