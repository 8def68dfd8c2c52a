using System.Globalization;
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
}
