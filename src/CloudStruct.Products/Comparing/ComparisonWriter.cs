using CloudStruct.Formats.Tables;
using CloudStruct.Products.Plots;
using CloudStruct.Records.Comparing;

namespace CloudStruct.Products.Comparing;

/// <summary>Writes a comparison: its table and its figure.</summary>
public static class ComparisonWriter
{
    /// <summary>Writes tables/NAME.csv with NAME-summary.csv and plots/NAME.svg, .pdf and .png below a folder.</summary>
    /// <returns>Relative names.</returns>
    public static IReadOnlyList<string> Write(string folder, ComparisonRecord record, RunFacts facts)
    {
        var files = new ResultFolder(folder);
        Write(files, Pairs(record));
        Write(files, Summary(record));
        if (record.Curves.Any(c => !c.Expected))
        {
            Figure figure = SharesFigure.Make(record, facts.RunId);
            files.Write($"plots/{figure.Name}.svg", FigureFiles.Svg(figure, facts.RunId));
            files.Write($"plots/{figure.Name}.pdf", FigureFiles.Pdf(figure, facts));
            files.Write($"plots/{figure.Name}.png", FigureFiles.Png(figure, facts.RunId));
        }

        return files.Written;
    }

    /// <summary>One row a pair.</summary>
    public static CsvSheet Pairs(ComparisonRecord record)
    {
        var sheet = new CsvSheet(
            record.Name + ".csv", record.Title,
            new("kind", CsvKind.Text, "", "face, contact or width."),
            new("group", CsvKind.Text, "", "Set of the face, or dike and margin; empty for none."),
            new("first", CsvKind.Text, "", "Its name in the first results."),
            new("second", CsvKind.Text, "", "Its name in the second results, or id of the reading."),
            new("x_m", CsvKind.Metres, "metre", "Place in the first, map x."),
            new("y_m", CsvKind.Metres, "metre", "Place in the first, map y."),
            new("z_m", CsvKind.Metres, "metre", "Place in the first, height."),
            new("distance_m", CsvKind.Metres, "metre", "How far apart the two are."),
            new("area_m2", CsvKind.Number, "square metre", "Area of the face in the first."),
            new("angle_deg", CsvKind.AngleDeg, "degree", "Angle between the two as they are."),
            new("rest_deg", CsvKind.AngleDeg, "degree", "Angle that is left when the common rotation is taken off."),
            new("width_difference_m", CsvKind.Metres, "metre", "Second width minus first."),
            new("normalised", CsvKind.Number, "", "Difference over its stated standard deviation."),
            new("within95", CsvKind.YesNo, "", "Whether it lies in its stated 95 % region."),
            new("counts", CsvKind.YesNo, "", "no: taken for another face, in no statistic."));
        foreach (ComparedPair p in record.Pairs)
        {
            sheet.Add(
                p.Kind, p.Group, p.First, p.Second, p.Place.X, p.Place.Y, p.Place.Z, p.DistanceM, p.AreaM2 > 0 ? p.AreaM2 : null, p.AngleDeg, p.RestDeg, p.WidthDifferenceM,
                p.Normalised, p.Within95, p.Counts);
        }

        return sheet;
    }

    /// <summary>What was found: a row per group, test, rotation and shift.</summary>
    public static CsvSheet Summary(ComparisonRecord record)
    {
        var sheet = new CsvSheet(
            record.Name + "-summary.csv", record.Title + ": what was found",
            new("what", CsvKind.Text, "", "Quantity."),
            new("of", CsvKind.Text, "", "Which pairs it rests on."),
            new("pairs", CsvKind.Integer, "", "How many."),
            new("value", CsvKind.Number, "", "Value, in the unit that the name ends in."),
            new("low95", CsvKind.Number, "", "Lower 95 % limit."),
            new("high95", CsvKind.Number, "", "Upper 95 % limit."));
        foreach (ComparedGroup g in record.Groups)
        {
            sheet.Add("share_within95", g.Name, g.Pairs, g.Share95, g.ShareLow95, g.ShareHigh95);
            sheet.Add("real_over_stated_spread", g.Name, g.Pairs, g.Spread, null, null);
            sheet.Add(g.Kind == "width" ? "median_difference_m" : "median_difference_deg", g.Name, g.Pairs, g.MedianDifference, null, null);
        }

        if (record.Rotation is { } r)
        {
            sheet.Add("azimuth_deg", "common rotation, clockwise positive", r.Pairs, r.AzimuthDeg, r.AzimuthLow95Deg, r.AzimuthHigh95Deg);
            sheet.Add("tilt_deg", "common rotation", r.Pairs, r.TiltDeg, r.TiltLow95Deg, r.TiltHigh95Deg);
            sheet.Add("tilt_toward_deg", "common rotation, grid azimuth", r.Pairs, r.TiltTowardDeg, null, null);
        }

        if (record.ShiftM is { } s)
        {
            foreach ((string name, double v) in new[] { ("shift_x_m", s.X), ("shift_y_m", s.Y), ("shift_z_m", s.Z) }) sheet.Add(name, "common shift", null, v, null, null);
        }

        foreach (ComparedMean m in record.Means)
        {
            sheet.Add("angle_of_means_deg", m.Group, m.Pairs, m.AngleDeg, 0.0, m.CriticalDeg);
            sheet.Add("p_common_mean", m.Group, m.Pairs, m.P, null, null);
        }

        foreach ((string kind, int first, int second) in record.Alone)
        {
            sheet.Add("without_partner_in_first", kind, first, null, null, null);
            sheet.Add("without_partner_in_second", kind, second, null, null, null);
        }

        return sheet;
    }

    private static void Write(ResultFolder files, CsvSheet sheet)
    {
        using FileStream stream = files.Create("tables/" + sheet.FileName);
        sheet.Write(stream);
    }
}
