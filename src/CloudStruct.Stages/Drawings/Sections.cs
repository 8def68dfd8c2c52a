using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Kernels;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Thin vertical slices of the cloud square to a dike, one per station.</summary>
internal static class Sections
{
    // Four spacings of rock give a line of points that is closed and does not yet blur a bend.
    private const double SliceInSpacings = 4;

    // Of the width to each side of the station: the dike and as much host on either hand.
    private const double ReachInWidths = 1.5;
    private const double LeastReachM = 1, MostReachM = 60;

    // More stations than these would cost more than the rest of the drawings, more points than these a sheet cannot show.
    private const int MostSections = 240, MostPoints = 3000;

    /// <summary>The sections, dike after dike in order of chainage; of very many stations every second, third, ...</summary>
    /// <param name="input">What was found.</param>
    /// <param name="onSheet">Number of the station that has a sheet of its own; 0 takes one in the middle of each dike.</param>
    /// <param name="context">Threads.</param>
    public static CrossSection[] Of(Findings input, int onSheet, StageContext context)
    {
        Station[] stations = input.Width.Stations;
        int step = (stations.Length + MostSections - 1) / Math.Max(1, MostSections);
        HashSet<Station> sheets = [.. stations.GroupBy(s => s.Dike).Select(d => OnSheet([.. d], onSheet))];
        Station[] shown = [.. stations.Where((s, i) => i % Math.Max(1, step) == 0 || sheets.Contains(s))];
        var sections = new CrossSection[shown.Length];
        BlockParallel.For(shown.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++) sections[i] = One(input, shown[i]) with { OnSheet = sheets.Contains(shown[i]) };
        }, 1);
        return sections;
    }

    // The station asked for; else of those measured, or of all, the one nearest the middle.
    private static Station OnSheet(Station[] own, int wanted)
    {
        if (own.FirstOrDefault(s => s.Number == wanted) is { } asked) return asked;
        Station[] measured = [.. own.Where(s => s.Status == StationStatus.Measured)];
        if (measured.Length == 0) measured = own;
        double middle = (own[0].ChainageM + own[^1].ChainageM) / 2;
        return measured.MinBy(s => Math.Abs(s.ChainageM - middle))!;
    }

    private static CrossSection One(Findings input, Station station)
    {
        WorkingCloud cloud = input.Described.Cloud;
        Vec3 along = Along(input, station), across = new(along.Y, -along.X, 0);
        double width = station.TrueWidthM ?? station.ApparentWidthM ?? station.VisibleWidthM
            ?? input.Width.Dikes.FirstOrDefault(d => d.Dike == station.Dike)?.WidthMeanM?.Value ?? 2;
        double reach = Math.Clamp(ReachInWidths * width, LeastReachM, MostReachM), half = SliceInSpacings / 2 * cloud.SpacingM;
        Vec3 o = station.Place;
        var found = new List<int>();
        VerticalSlice.Find(cloud.X, cloud.Y, (float)o.X, (float)o.Y, (float)along.X, (float)along.Y, (float)half, (float)reach, found);
        found.RemoveAll(i => Math.Abs(cloud.Z[i] - o.Z) > 2 * reach);
        int every = (found.Count + MostPoints - 1) / MostPoints;
        int[] kept = [.. found.Where((_, i) => i % Math.Max(1, every) == 0)];
        byte[] classes = input.Classes.Class;
        return new CrossSection
        {
            Dike = station.Dike,
            Station = station.Number,
            ChainageM = station.ChainageM,
            Status = station.Status,
            LookingDeg = Azimuth.Of(along, cloud.Frame.TurnDeg),
            SliceM = 2 * half,
            Across = Array.ConvertAll(kept, i => (float)(cloud.Place(i) - o).Dot(across)),
            Up = Array.ConvertAll(kept, i => (float)(cloud.Z[i] - o.Z)),
            Class = classes.Length == cloud.Count ? Array.ConvertAll(kept, i => classes[i]) : [],
            Rgb = cloud.HasColour ? [.. kept.SelectMany(i => new[] { cloud.Red[i], cloud.Green[i], cloud.Blue[i] })] : [],
            HeightAtM = cloud.Frame.ToMap(o).Z,
            AtA = At(station.AtA),
            AtB = At(station.AtB),
            LeanToBDeg = station.LeanToBDeg,
            Sentence = Sentence(station, 2 * half),
        };

        Point2? At(Vec3? margin) => margin is { } m ? new Point2((m - o).Dot(across), m.Z - o.Z) : null;
    }

    /// <summary>Level unit vector along the dike, toward increasing chainage.</summary>
    public static Vec3 Along(Findings input, Station station)
    {
        if (station.TrendAlongDeg is { } trend && double.IsFinite(trend))
        {
            (double s, double c) = Math.SinCos((trend - input.Described.Cloud.Frame.TurnDeg) * Math.PI / 180);
            return new Vec3(s, c, 0);
        }

        DikeFrame? dike = input.Contacts.Dikes.FirstOrDefault(d => d.Dike == station.Dike);
        if (dike is null || dike.CentreLine.Length < 2) return new Vec3(0, 1, 0);
        int i = Array.FindIndex(dike.ChainageM, c => c > station.ChainageM);
        i = Math.Clamp(i < 0 ? dike.CentreLine.Length - 1 : i, 1, dike.CentreLine.Length - 1);
        Vec3 d = dike.CentreLine[i] - dike.CentreLine[i - 1];
        return new Vec3(d.X, d.Y, 0).Unit();
    }

    private static string Sentence(Station s, double sliceM)
    {
        string width = s.Status switch
        {
            StationStatus.Measured when s is { TrueWidthM: { } w, TrueWidthLow95M: { } low, TrueWidthHigh95M: { } high } =>
                Invariant($"True width {Words.Short(w)} m (95 %: {Words.Short(low)} to {Words.Short(high)} m)"),
            StationStatus.Unconstrained when s.ApparentWidthM is { } a => Invariant($"Apparent width {Words.Short(a)} m; nothing here fixes the dip"),
            StationStatus.AHidden or StationStatus.BHidden when s.VisibleWidthM is { } v =>
                Invariant($"At least {Words.Short(v)} m wide; margin {(s.Status == StationStatus.AHidden ? "A" : "B")} is hidden"),
            _ => "The width could not be measured here",
        };
        string lean = s.LeanToBDeg is { } l
            ? Math.Abs(l) < 0.5 ? "the dike stands upright" : Invariant($"the dike leans {Math.Abs(l):0} deg toward {(l > 0 ? "B" : "A")}")
            : "its lean is not known";
        return Invariant($"{width}; {lean}. Points of a slice {Words.Short(sliceM)} m thick, no exaggeration of height.");
    }
}
