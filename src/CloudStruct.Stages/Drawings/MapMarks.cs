using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Symbols and labels of the map, those first that must not be missing: stations, contacts, then faces by area.</summary>
internal static class MapMarks
{
    // A disc about bar, tick and figure of a symbol, its middle moved toward the tick [mm of paper].
    private const double SymbolMm = 3.0, SymbolShiftMm = 1.0;

    private const double LabelMm = 3.2, LabelEveryMm = 16, LabelGapMm = 4.5;

    // Below this dip a strike means nothing (DESIGN section 3); a dip that rounds to 90 is shown as vertical.
    private const double LeastDipDeg = 5, UprightDeg = 89.5;

    /// <summary>All stations; labels at round chainages where there is room.</summary>
    public static MapStation[] Stations(Findings input, MapRoom room)
    {
        double step = Round(room.OfMm(LabelEveryMm));
        var marks = new List<MapStation>();
        var labelled = new HashSet<(int, long)>();
        foreach (Station s in input.Width.Stations)
        {
            Vec3 along = Sections.Along(input, s), across = new(along.Y, -along.X, 0);
            double half = (s.ApparentWidthM ?? s.TrueWidthM ?? input.Width.Dikes.FirstOrDefault(d => d.Dike == s.Dike)?.WidthMeanM?.Value ?? 0) / 2;
            Vec3 beside = s.Place + (across * (half + room.OfMm(LabelGapMm)));
            var labelAt = new Point2(beside.X, beside.Y);
            long whole = (long)Math.Round(s.ChainageM / step);
            bool round = Math.Abs(s.ChainageM - (whole * step)) < Math.Max(1e-6, input.Width.StationM / 2) && labelled.Add((s.Dike, whole));
            string label = round && room.Take(labelAt, LabelMm) ? Invariant($"{s.ChainageM:0.#} m") : "";
            marks.Add(new MapStation(new Point2(s.Place.X, s.Place.Y), s.Dike, s.Number, s.Status, label, labelAt, Azimuth.Of(across)));
        }

        return [.. marks];
    }

    /// <summary>Symbols of contacts, then of faces in place by falling area, as long as there is room.</summary>
    public static MapSymbol[] Symbols(Findings input, MapRoom room, out int leftOut)
    {
        var symbols = new List<MapSymbol>();
        foreach (Contact c in input.Contacts.Contacts)
        {
            if (c.Normal is { } n) Add(c.Middle, n, 0, "contact", "contact");
        }

        leftOut = 0;
        Face[] faces = input.Faces.Faces;
        FaceDomain[] domain = input.Contacts.DomainOfFace;
        InPlace[] place = input.Contacts.InPlaceOfFace;
        string[] sets = input.Sets.SetOfFace;
        for (int f = 0; f < faces.Length; f++)
        {
            if ((place.Length == faces.Length ? place[f] : faces[f].InPlace) == InPlace.No) continue;
            string side = (domain.Length == faces.Length ? domain[f] : FaceDomain.Unknown).ToString().ToLowerInvariant();
            if (!Add(faces[f].Middle, faces[f].Normal, faces[f].FaceId, sets.Length == faces.Length ? sets[f] : "", side)) leftOut++;
        }

        return [.. symbols];

        bool Add(Vec3 at, Vec3 normal, int faceId, string group, string side)
        {
            Attitude grid = Attitude.FromNormal(normal);
            string kind = grid.DipDeg < LeastDipDeg ? "horizontal" : grid.DipDeg >= UprightDeg ? "vertical" : "inclined";
            (double s, double c) = Math.SinCos(grid.DipDirectionDeg * Math.PI / 180);
            double shift = kind == "inclined" ? room.OfMm(SymbolShiftMm) : 0;
            if (!room.Take(new Point2(at.X + (shift * s), at.Y + (shift * c)), SymbolMm)) return false;
            symbols.Add(new MapSymbol(new Point2(at.X, at.Y), kind, grid.StrikeDeg, (int)Math.Round(grid.DipDeg), faceId, group, side));
            return true;
        }
    }

    private static double Round(double least)
    {
        double power = Math.Pow(10, Math.Floor(Math.Log10(least)));
        return (least <= 1.0000001 * power ? 1 : least <= 2 * power ? 2 : least <= 5 * power ? 5 : 10) * power;
    }
}
