using CloudStruct.Formats;
using CloudStruct.Formats.Tables;
using CloudStruct.Products.Tables;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;

namespace CloudStruct.Products.Map;

/// <summary>The layers of map/structures.gpkg: the rows of the tables with all their digits, and shapes.</summary>
/// <remarks>Columns are those of the tables, so that a script reads either. Added is rotation_grid_deg: strike about grid
/// north, by which map symbols turn, whatever north the tables use.</remarks>
internal static class MapLayers
{
    /// <summary>faces, contacts, stations, sets, outline, in this order.</summary>
    public static GeoLayer[] Of(Findings findings, DrawingsRecord drawings) =>
        [Faces(findings), Contacts(findings, drawings), Stations(findings, drawings), Sets(findings), Outline(findings, drawings)];

    private static GeoLayer Faces(Findings f)
    {
        Face[] faces = f.Faces.Faces;
        GeoLayer layer = FromTable(f, "faces.csv", "faces", GeoShape.Point, [new("rotation_grid_deg", CsvKind.AzimuthDeg), new("symbol", CsvKind.Text)], (i, values) =>
        {
            Records.Attitudes.Attitude grid = Records.Attitudes.Attitude.FromNormal(faces[i].Normal);
            string symbol = grid.DipDeg < 5 ? "horizontal" : grid.DipDeg >= 89.5 ? "vertical" : "inclined";
            return [new GeoFeature([f.Intake.Frame.ToMap(faces[i].Middle)], [.. values, grid.StrikeDeg, symbol])];
        });
        return layer with { Sld = MapStyles.Faces };
    }

    private static GeoLayer Contacts(Findings f, DrawingsRecord drawings)
    {
        Contact[] contacts = f.Contacts.Contacts;
        ILookup<int, ContactStrip> strips = drawings.Strips.ToLookup(s => s.Contact);
        SurveyFrame frame = f.Intake.Frame;
        GeoLayer layer = FromTable(f, "contacts.csv", "contacts", GeoShape.Line, [new("rotation_grid_deg", CsvKind.AzimuthDeg)], (i, values) =>
        {
            Contact c = contacts[i];
            double? turn = c.Normal is { } n ? Records.Attitudes.Attitude.FromNormal(n).StrikeDeg : null;
            object?[] cells = [.. values, turn];
            // The trace runs in the middle of its strip; a stretch without one is a straight piece along its line.
            Vec3[][] lines = [.. strips[i].Select(s => s.Upper.Select((p, k) => frame.ToMap((p + s.Lower[k]) / 2)).ToArray())];
            return lines.Length > 0 ? lines.Select(l => new GeoFeature(l, cells)) : [new GeoFeature(Straight(c, frame), cells)];
        });
        return layer with { Sld = MapStyles.Contacts };
    }

    private static Vec3[] Straight(Contact c, SurveyFrame frame)
    {
        (double s, double k) = Math.SinCos((c.LineTrendDeg - frame.TurnDeg) * Math.PI / 180);
        (double down, double level) = Math.SinCos(c.LinePlungeDeg * Math.PI / 180);
        Vec3 half = new Vec3(s * level, k * level, -down) * Math.Max(0.05, (c.ChainageToM - c.ChainageFromM) / 2);
        return [frame.ToMap(c.Middle - half), frame.ToMap(c.Middle + half)];
    }

    private static GeoLayer Stations(Findings f, DrawingsRecord drawings)
    {
        Station[] stations = f.Width.Stations;
        MapStation[] drawn = drawings.Map?.Stations ?? [];
        GeoLayer layer = FromTable(f, "width.csv", "stations", GeoShape.Point, [new("rotation_grid_deg", CsvKind.AzimuthDeg)], (i, values) =>
            [new GeoFeature([f.Intake.Frame.ToMap(stations[i].Place)], [.. values, i < drawn.Length ? drawn[i].AcrossGridDeg : null])]);
        return layer with { Sld = MapStyles.Stations };
    }

    private static GeoLayer Sets(Findings f) =>
        FromTable(f, "sets.csv", "sets", GeoShape.None, [], (_, values) => [new GeoFeature([], values)]);

    private static GeoLayer Outline(Findings f, DrawingsRecord drawings)
    {
        SurveyFrame frame = f.Intake.Frame;
        return new GeoLayer
        {
            Name = "outline",
            Meaning = "The ground of each dike between its contacts, where both show.",
            Shape = GeoShape.Polygon,
            Columns = [new("dike", CsvKind.Integer), new("area_m2", CsvKind.Number)],
            Features = [.. (drawings.Map?.DikeAreas ?? []).Select(a => new GeoFeature(
                [.. a.Points.Select(p => frame.ToMap(new Vec3(p.X, p.Y, 0)))], [(long)a.Dike, Area(a.Points)]))],
            Sld = MapStyles.Outline,
        };
    }

    // Twice the area of a ring is the sum of its cross products (shoelace formula), about its own corner to keep digits.
    private static double Area(Point2[] ring)
    {
        double twice = 0;
        for (int i = 0; i + 1 < ring.Length; i++)
            twice += ((ring[i].X - ring[0].X) * (ring[i + 1].Y - ring[0].Y)) - ((ring[i + 1].X - ring[0].X) * (ring[i].Y - ring[0].Y));
        return Math.Abs(twice) / 2;
    }

    private static GeoLayer FromTable(
        Findings f, string file, string name, GeoShape shape, GeoColumn[] more, Func<int, object?[], IEnumerable<GeoFeature>> features)
    {
        ITableSheet table = Tables.Sheets.All.First(t => t.File == file);
        return new GeoLayer
        {
            Name = name,
            Meaning = table.Meaning,
            Shape = shape,
            HasZ = shape != GeoShape.None,
            Columns = [.. table.Columns.Select(c => new GeoColumn(c.Name, c.Kind)), .. more],
            Features = [.. table.Values(f).SelectMany((values, i) => features(i, values))],
        };
    }
}
