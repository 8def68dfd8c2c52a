using System.Globalization;
using CloudStruct.Formats.Crs;
using CloudStruct.Formats.Magnetic;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;

namespace CloudStruct.Formats;

/// <summary>What a survey says of magnetic declination: a number, the World Magnetic Model, or nothing.</summary>
public sealed class Declination
{
    private readonly double? fixedDeg;
    private readonly bool model;
    private readonly CrsInfo crs;
    private readonly DateOnly? day;

    /// <summary>Of survey.yaml.</summary>
    /// <param name="text">A number of degrees, east positive; "wmm"; null for nothing said.</param>
    /// <param name="crs">The survey's system; the model needs longitude and latitude from it.</param>
    /// <param name="day">Day for readings without one.</param>
    public Declination(string? text, CrsInfo crs, DateOnly? day)
    {
        model = text == "wmm";
        fixedDeg = text is null || model ? null : double.Parse(text, CultureInfo.InvariantCulture);
        this.crs = crs;
        this.day = day;
    }

    /// <summary>Declination for one reading [deg], east positive.</summary>
    /// <param name="place">Map coordinates.</param>
    /// <param name="date">Its own day when it has one.</param>
    /// <param name="where">File and line, for the complaint.</param>
    /// <exception cref="InputException">Nothing is said, or the model cannot be used here.</exception>
    public double At(Vec3 place, DateOnly? date, string where)
    {
        if (fixedDeg is { } number) return number;
        if (!model)
        {
            throw new InputException(where, "a magnetic azimuth has no declination", "neither declination_deg in the row nor declination in survey.yaml",
                "Write one of them (degrees, east positive), or declination: wmm for dates from 2025 to 2029");
        }

        if ((date ?? day) is not { } when)
        {
            throw new InputException(where, "the World Magnetic Model needs a date", "no date in the row and no flight_date in survey.yaml", "Write the day as 2026-05-31");
        }

        if (TransverseGrid.Of(crs) is not { } grid)
        {
            throw new InputException(where, "the World Magnetic Model needs longitude and latitude", $"a coordinate system without a way back to them ({(crs.Name.Length > 0 ? crs.Name : "none stated")})",
                "Write the declination as a number of degrees, east positive");
        }

        double unit = crs.HorizontalUnitM > 0 ? crs.HorizontalUnitM : 1;
        (double east, double latitude) = grid.Back(place.X * unit, place.Y * unit);
        double height = double.IsFinite(place.Z) ? place.Z / 1000 : 0, d = WorldMagneticModel.DeclinationDeg(latitude, grid.MeridianDeg + east, height, WorldMagneticModel.YearOf(when));
        return double.IsFinite(d) ? d : throw new InputException(where, "the World Magnetic Model 2025 does not cover this date", when.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture),
            "Write the declination of that day as a number of degrees, east positive");
    }
}
