using System.Globalization;
using CloudStruct.Formats;
using CloudStruct.Formats.Crs;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats.Crs;

public class ConvergenceTests
{
    /// <summary>checks.md C1: pyproj Proj.get_factors with PROJ 9.1.1; convergence within 1e-6 deg.</summary>
    public static TheoryData<double, double, int, string, double, double, double> Utm()
    {
        var rows = new TheoryData<double, double, int, string, double, double, double>();
        foreach (string line in File.ReadLines(Repo.Path("testdata/reference/utm_convergence.csv")).Skip(1))
        {
            string[] c = line.Split(',');
            double N(int i) => double.Parse(c[i], CultureInfo.InvariantCulture);
            rows.Add(N(0), N(1), (int)N(2), c[3], N(4), N(5), N(6));
        }
        return rows;
    }

    [Theory]
    [MemberData(nameof(Utm))]
    public void Utm_agrees_with_the_projection_library(double lon, double lat, int zone, string side, double x, double y, double expected)
    {
        CrsInfo crs = CrsText.Parse($"EPSG:{(side == "N" ? 32600 : 32700) + zone}");
        double? c = Convergence.At(crs, x, y);
        Assert.True(Math.Abs(c!.Value - expected) < 1e-6, $"{lon} E {lat} N: {c} for {expected}");
    }

    /// <summary>Conic, polar and other grids from their texts, and those known by code: proj -V of PROJ 9.1.1, printed to 1e-8 deg.</summary>
    [Fact]
    public void Every_guaranteed_grid_agrees_with_the_projection_library_from_text_and_from_code()
    {
        ILookup<string, CrsSample> texts = CrsSample.All().ToLookup(t => t.Code);
        int fromText = 0, fromCode = 0;
        var faults = new List<string>();
        foreach (string line in File.ReadLines(Repo.Path("testdata/reference/grid_convergence.csv")).Skip(1))
        {
            string[] c = line.Split(',');
            double x = double.Parse(c[3], CultureInfo.InvariantCulture), y = double.Parse(c[4], CultureInfo.InvariantCulture);
            double expected = double.Parse(c[5], CultureInfo.InvariantCulture);
            foreach (CrsSample text in texts[c[0][5..]])
            {
                CrsInfo crs = CrsText.Parse(text.Text);
                double? found = Convergence.At(crs, x, y);
                if (c[0] is "EPSG:2056" or "EPSG:5530") Assert.Null(found);   // oblique Mercator, polyconic: grid north, and said so
                else if (found == null || Math.Abs(found.Value - expected) > 1e-6) faults.Add($"{line} as {text.Kind}: {found}");
                else fromText++;
            }
            if (CrsText.Parse(c[0]).Parameters.Length == 0) continue;
            fromCode++;
            double? coded = Convergence.At(CrsText.Parse(c[0]), x, y);
            if (coded == null || Math.Abs(coded.Value - expected) > 1e-6) faults.Add($"{line} by code: {coded}");
        }
        Assert.True(faults.Count == 0, string.Join("\n", faults));
        Assert.True(fromText >= 150 && fromCode >= 30, $"{fromText} {fromCode}");
    }

    [Fact]
    public void Where_nothing_can_be_said_nothing_is()
    {
        Assert.Null(Convergence.At(CrsInfo.None, 500000, 5000000));
        Assert.Null(Convergence.At(CrsText.Parse("EPSG:4326"), 10, 60));
        Assert.Null(Convergence.At(CrsText.Parse("EPSG:32632"), double.NaN, 0));
        Assert.Null(Convergence.At(CrsText.Parse("EPSG:3857"), 1e6, 6e6));
        Assert.Null(Convergence.At(CrsText.Parse("EPSG:3413"), 0, 0));   // the pole
    }

    // Lambert conic with one parallel: convergence = sin(parallel) times the difference of longitude (Snyder 1987, chapter
    // 15); here from Paris, 2.33722917 deg east of Greenwich, in grads. Easting and northing of 3.2 E, 45.6 N by PROJ 9.1.1.
    [Fact]
    public void A_prime_meridian_elsewhere_and_grads_are_followed()
    {
        double expected = (3.2 - 2.33722917) * Math.Sin(46.8 * Math.PI / 180);
        foreach (CrsSample text in CrsSample.All().Where(t => t.Code == "27572"))
            Assert.Equal(expected, Convergence.At(CrsText.Parse(text.Text), 667321.095761, 2066990.803604)!.Value, 1e-6);
    }

    // Grids that only GeoTIFF keys describe: their parameters given to invproj and proj -V of PROJ 9.1.1 by hand.
    [Theory]
    [InlineData("pd_prec3.las", 636034.83, 848941.72, -1.79573793)]        // Lambert, international feet
    [InlineData("pd_lots_of_vlr.las", 715001.346, 839349.171, 0.70683784)] // transverse Mercator, US survey feet
    public void Parameters_from_keys_give_the_convergence(string file, double x, double y, double expected)
    {
        CrsInfo crs = CloudFiles.Inspect(Repo.Path("testdata/las/" + file)).Crs;
        Assert.Equal(expected, Convergence.At(crs, x, y)!.Value, 1e-6);
        Assert.Equal(expected, Convergence.At(CrsText.Parse(crs.Wkt), x, y)!.Value, 1e-6);
    }
}
