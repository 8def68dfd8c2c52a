using CloudStruct.Formats.Tables;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Products;

/// <summary>Frame, north and coordinate system in plain words.</summary>
internal static class FrameWords
{
    private static readonly string[] CompassPoints =
        ["N", "NNE", "NE", "ENE", "E", "ESE", "SE", "SSE", "S", "SSW", "SW", "WSW", "W", "WNW", "NW", "NNW"];

    /// <summary>What the metadata says of every table.</summary>
    public static TableFacts OfTables(Findings findings, RunFacts facts) => new()
    {
        RunId = facts.RunId,
        Frame = "x east, y north, z up, map coordinates in metres",
        North = NorthSentence(findings.Intake.Frame, facts),
        Crs = Crs(findings.Intake.Frame.Crs),
        Licence = facts.Licence,
        Citation = facts.Citation,
    };

    /// <summary>The north of every azimuth in a sentence: the run's own words, else what the frame says.</summary>
    public static string NorthSentence(SurveyFrame frame, RunFacts facts) =>
        facts.NorthText.Length > 0 ? facts.NorthText.TrimEnd('.') + "." : frame.North switch
        {
            North.True => Invariant($"Azimuths are from true north: grid azimuth plus a meridian convergence of {frame.ConvergenceDeg ?? 0:F2} deg."),
            North.Grid => "Azimuths are from grid north, the y axis of the map grid.",
            _ => "Azimuths are from the y axis of the model, which nothing ties to the ground.",
        };

    /// <summary>Name and code of the coordinate system.</summary>
    public static string Crs(CrsInfo crs)
    {
        string name = crs.Name.Length > 0 ? crs.Name : crs.Epsg > 0 ? Invariant($"EPSG:{crs.Epsg}") : "none stated";
        if (crs.Name.Length > 0 && crs.Epsg > 0) name += Invariant($" (EPSG:{crs.Epsg})");
        if (crs.VerticalName.Length > 0) name += $", heights {crs.VerticalName}";
        return name;
    }

    /// <summary>Which way chainage of a dike increases: "toward 047° (NE)".</summary>
    public static string Toward(Findings findings, int dike)
    {
        double? trend = findings.Width.Dikes.FirstOrDefault(d => d.Dike == dike)?.TrendDeg;
        if (trend is not { } t || !double.IsFinite(t)) return "along the centre line";
        return findings.Intake.Frame.North == North.Model
            ? Invariant($"toward {t:000}° of the model") : Invariant($"toward {t:000}° ({Compass(t)})");
    }

    /// <summary>The nearest of sixteen compass points.</summary>
    public static string Compass(double azimuthDeg) => CompassPoints[(int)Math.Round(Azimuth.Wrap360(azimuthDeg) / 22.5) % 16];
}
