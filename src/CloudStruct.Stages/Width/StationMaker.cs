using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Width;

/// <summary>Measures the stations of one dike.</summary>
internal sealed class StationMaker
{
    private const double EndM = 0.1;   // a trace's last cell stands for a little more than its mean place
    private readonly DikeFrame frame;
    private readonly MarginTrace[] traces;
    private readonly CentreLine line;
    private readonly TraceVertex[] vertices;   // in order of chainage
    private readonly DikePoints points;
    private readonly SurveyFrame survey;
    private readonly WidthSettings settings;
    private readonly double usualM;

    /// <summary>Ready to measure.</summary>
    public StationMaker(DikeFrame frame, IEnumerable<MarginTrace> traces, DikePoints points, SurveyFrame survey, WidthSettings settings)
    {
        this.frame = frame;
        this.traces = [.. traces];
        this.points = points;
        this.survey = survey;
        this.settings = settings;
        line = new CentreLine(frame);
        vertices = [.. this.traces.SelectMany(t => t.Points.Select((p, i) => new TraceVertex(t.Margin, p, t.ChainageM[i]))).OrderBy(v => v.ChainageM)];
        usualM = UsualWidth();
    }

    /// <summary>Chainages of the stations: the multiples of the step within the centre line.</summary>
    public IEnumerable<double> Chainages()
    {
        double step = settings.StationM;
        for (double k = Math.Ceiling((line.FromM / step) - 1e-9); (k * step) <= line.ToM + 1e-9; k++) yield return (k * step) + 0.0;   // + 0.0: no minus zero
    }

    /// <summary>Unit normal of the dike at a chainage, from A to B.</summary>
    public Vec3 NormalAt(double chainageM) => line.At(chainageM).Normal;

    /// <summary>Measures one station.</summary>
    /// <param name="chainageM">Its chainage [m].</param>
    /// <param name="number">Its number.</param>
    public Station Measure(double chainageM, int number)
    {
        (Vec3 place, Vec3 normal, Vec3 along, Vec3 up, double dipSigma, bool isFixed) = line.At(chainageM);
        bool seesA = Sees(Margin.A, chainageM), seesB = Sees(Margin.B, chainageM);
        if (!isFixed)   // only level distances mean anything
        {
            normal = new Vec3(normal.X, normal.Y, 0) is { Length: > 1e-6 } level ? level.Unit() : along.Cross(Vec3.Up);
            up = Vec3.Up;
        }

        var station = new Station
        {
            Dike = frame.Dike, Number = number, ChainageM = chainageM, Place = place,
            Attitude = isFixed ? Attitude.FromNormal(normal, survey.TurnDeg) : null,
            TrendAlongDeg = Azimuth.Of(along, survey.TurnDeg),
            LeanToBDeg = isFixed ? -Math.Asin(Math.Clamp(normal.Z, -1, 1)) * 180 / Math.PI : null,
            Status = (seesA, seesB) switch
            {
                (true, true) => isFixed ? StationStatus.Measured : StationStatus.Unconstrained,
                (false, true) => StationStatus.AHidden,
                (true, false) => StationStatus.BHidden,
                _ => StationStatus.BothHidden,
            },
        };
        double reach = Math.Clamp(0.75 * usualM, 1.5, 5);
        TraceVertex[] near = Near(chainageM, reach);
        StationFit? fit = seesA && seesB
            ? StationFit.Of(near, place, normal, along, up, isFixed ? Math.Tan(Math.Min(60, dipSigma) * Math.PI / 180) : 0, frame)
            : null;
        return fit is { WidthM: > 0 } f && double.IsFinite(f.WidthM + f.OffsetAM + f.OffsetBM + f.HeightAM + f.HeightBM + f.SigmaM + (normal + up + place).Length)
            ? With(station, f, normal, up, isFixed)
            : Hidden(fit is null && !(seesA && seesB) ? station : station with { Status = StationStatus.BothHidden }, near, seesA, seesB, normal, along);
    }

    private Station With(Station station, StationFit fit, Vec3 normal, Vec3 up, bool isFixed)
    {
        Vec3 atA = station.Place + (normal * fit.OffsetAM) + (up * fit.HeightAM), atB = station.Place + (normal * fit.OffsetBM) + (up * fit.HeightBM);
        station = station with { AtA = atA, AtB = atB, ExposedWidthM = (atB - atA).Length };
        if (!isFixed) return station with { ApparentWidthM = fit.WidthM };
        double error = 1.96 * Math.Sqrt((fit.SigmaM * fit.SigmaM) + (2 * settings.EdgeErrorM * settings.EdgeErrorM));
        double total = Math.Sqrt((error * error) + Math.Pow(1.96 * survey.Reference.ScaleSigma * fit.WidthM, 2));
        return station with
        {
            TrueWidthM = fit.WidthM, TrueWidthLow95M = Math.Max(0, fit.WidthM - error), TrueWidthHigh95M = fit.WidthM + error,
            TrueWidthTotalLow95M = Math.Max(0, fit.WidthM - total), TrueWidthTotalHigh95M = fit.WidthM + total,
            ApparentWidthM = WidthGeometry.Apparent(normal, fit.WidthM),
        };
    }

    // What shows: from the margin that is seen to the last dike rock on the other side, or from end to end.
    private Station Hidden(Station station, TraceVertex[] near, bool seesA, bool seesB, Vec3 normal, Vec3 along)
    {
        if (points.Extent(station.Place, normal, along, settings.StationM / 2, 1.5 * usualM) is not { } extent) return station;
        double low = extent.Low, high = extent.High;
        if (seesA) low = Offset(near, Margin.A, station, normal, ref station);
        if (seesB) high = Offset(near, Margin.B, station, normal, ref station);
        return high > low ? station with { VisibleWidthM = high - low } : station;
    }

    private double Offset(TraceVertex[] near, Margin margin, Station at, Vec3 normal, ref Station station)
    {
        TraceVertex[] own = [.. near.Where(v => v.Margin == margin && Math.Abs(v.ChainageM - at.ChainageM) <= Math.Max(0.5, settings.SeenWithinM))];
        Vec3 mean = own.Aggregate(default(Vec3), (sum, v) => sum + v.Place) / own.Length;
        station = margin == Margin.A ? station with { AtA = mean } : station with { AtB = mean };
        return (mean - at.Place).Dot(normal);
    }

    // Between two vertices of one unbroken trace, and one of them close by.
    private bool Sees(Margin margin, double chainageM)
    {
        foreach (MarginTrace t in traces)
        {
            if (t.Margin != margin || t.ChainageM.Min() > chainageM + EndM || t.ChainageM.Max() < chainageM - EndM) continue;
            double usual = (t.ChainageM.Max() - t.ChainageM.Min()) / t.ChainageM.Length;
            if (t.ChainageM.Min(c => Math.Abs(c - chainageM)) <= Math.Max(settings.SeenWithinM, usual)) return true;
        }

        return false;
    }

    private TraceVertex[] Near(double chainageM, double reachM)
    {
        int lo = 0, hi = vertices.Length;
        while (lo < hi)
        {
            int mid = (lo + hi) / 2;
            if (vertices[mid].ChainageM < chainageM - reachM) lo = mid + 1;
            else hi = mid;
        }

        int end = lo;
        while (end < vertices.Length && vertices[end].ChainageM <= chainageM + reachM) end++;
        return vertices[lo..end];
    }

    // Distance of the traces along the normal, roughly: how far about a station it pays to look.
    private double UsualWidth()
    {
        var widths = new List<double>();
        foreach (double c in Chainages())
        {
            (Vec3 place, Vec3 normal, _, _, _, _) = line.At(c);
            double[] a = [.. Near(c, 1).Where(v => v.Margin == Margin.A).Select(v => (v.Place - place).Dot(normal))];
            double[] b = [.. Near(c, 1).Where(v => v.Margin == Margin.B).Select(v => (v.Place - place).Dot(normal))];
            if (a.Length > 0 && b.Length > 0) widths.Add(b.Average() - a.Average());
        }

        widths.Sort();
        return widths.Count == 0 ? 1 : Math.Max(0.1, widths[widths.Count / 2]);
    }
}
