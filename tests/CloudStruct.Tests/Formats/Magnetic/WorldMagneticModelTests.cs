using System.Globalization;
using CloudStruct.Formats;
using CloudStruct.Formats.Crs;
using CloudStruct.Formats.Magnetic;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats.Magnetic;

public class WorldMagneticModelTests
{
    /// <summary>checks.md C4: test values of the World Magnetic Model 2025 (NOAA/NCEI and BGS), declination printed to 0.01 deg; the
    /// field's parts from an independent evaluation of the same coefficients.</summary>
    [Fact]
    public void Published_test_values_come_out()
    {
        int rows = 0;
        foreach (string line in File.ReadLines(Repo.Path("testdata/reference/wmm2025_tests.csv")).Skip(1))
        {
            double[] c = [.. line.Split(',').Select(v => double.Parse(v, CultureInfo.InvariantCulture))];
            Assert.Equal(c[4], WorldMagneticModel.DeclinationDeg(c[2], c[3], c[1], c[0]), 0.0051);
            (double north, double east, double down) = WorldMagneticModel.FieldNt(c[2], c[3], c[1], c[0]);
            Assert.Equal(c[7], north, 1e-3);
            Assert.Equal(c[8], east, 1e-3);
            Assert.Equal(c[9], down, 1e-3);
            rows++;
        }

        Assert.Equal(16, rows);
    }

    /// <summary>checks.md C5: WMM2025 report, table 3b, 2027.5, 100 km, 80 S 240 E.</summary>
    [Fact]
    public void The_reports_own_example_comes_out_to_a_thousandth()
    {
        (double north, double east, double down) = WorldMagneticModel.FieldNt(-80, 240, 100, 2027.5);
        Assert.Equal(5983.9760496518, north, 1e-3);
        Assert.Equal(14760.1359757868, east, 1e-3);
        Assert.Equal(-49317.6706154255, down, 1e-3);
        Assert.Equal(1.1856308407, Math.Atan2(east, north), 1e-9);
    }

    [Fact]
    public void A_place_on_a_grid_gets_the_declination_of_its_longitude_and_latitude()
    {
        // 9 E 60 N is 500000, 6651411.190 in UTM zone 32N (pyproj with PROJ 9.1.1, checks.md C1).
        var utm = new Declination("wmm", CrsText.Parse("EPSG:32632"), new DateOnly(2026, 7, 2));
        double expected = WorldMagneticModel.DeclinationDeg(60, 9, 0, WorldMagneticModel.YearOf(new DateOnly(2026, 7, 2)));
        Assert.Equal(expected, utm.At(new Vec3(500_000, 6_651_411.190, 0), null, "row"), 1e-6);
        Assert.InRange(expected, 2, 6);
    }

    [Theory]
    [InlineData(null, "2026-05-01", "no declination")]
    [InlineData("wmm", "2031-05-01", "does not cover")]
    [InlineData("wmm", null, "needs a date")]
    public void What_cannot_be_known_is_refused(string? text, string? day, string says)
    {
        var d = new Declination(text, CrsText.Parse("EPSG:32632"), day is null ? null : DateOnly.Parse(day, CultureInfo.InvariantCulture));
        InputException e = Assert.Throws<InputException>(() => d.At(new Vec3(500_000, 6_651_411, 0), null, "readings.csv, line 2"));
        Assert.Contains(says, e.Message, StringComparison.Ordinal);
        Assert.Contains("readings.csv, line 2", e.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Without_a_grid_the_model_cannot_be_placed()
    {
        var d = new Declination("wmm", CrsInfo.None, new DateOnly(2026, 5, 1));
        Assert.Throws<InputException>(() => d.At(new Vec3(1, 2, 3), null, "row"));
    }
}
