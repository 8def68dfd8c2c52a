using System.Globalization;

namespace CloudStruct.Formats.Magnetic;

/// <summary>The World Magnetic Model 2025 (NOAA/NCEI and British Geological Survey; coefficients in the public domain): magnetic
/// declination at a place and date.</summary>
/// <remarks>Spherical harmonics to degree 12 with Schmidt's quasi-normalised functions about a sphere of 6371.2 km, coefficients that
/// change evenly with time from 2025.0, and the field turned from geocentric into geodetic north on WGS 84. It knows the core's field
/// only: magnetic rock under one's feet, dikes among them, turns a compass by degrees more.</remarks>
public static class WorldMagneticModel
{
    /// <summary>First date it covers, in years.</summary>
    public const double FromYear = 2025;

    /// <summary>End of the time it covers, in years.</summary>
    public const double ToYear = 2030;

    private const int Degree = 12;
    private const double SphereKm = 6371.2, SemiMajorKm = 6378.137, Flattening = 1 / 298.257223563;

    private static readonly (double G, double H, double GDot, double HDot)[,] Coefficients = Load();

    /// <summary>A date as a year with its fraction.</summary>
    public static double YearOf(DateOnly date) => date.Year + ((date.DayOfYear - 1.0) / (DateTime.IsLeapYear(date.Year) ? 366 : 365));

    /// <summary>Magnetic declination [deg], east positive: true azimuth = magnetic azimuth + declination.</summary>
    /// <param name="latitudeDeg">Geodetic latitude, below 89.9 either way.</param>
    /// <param name="longitudeDeg">East positive.</param>
    /// <param name="heightKm">Above the ellipsoid.</param>
    /// <param name="year">From <see cref="FromYear"/> to <see cref="ToYear"/>.</param>
    /// <returns>NaN outside of these dates.</returns>
    public static double DeclinationDeg(double latitudeDeg, double longitudeDeg, double heightKm, double year)
    {
        if (!(year is >= FromYear and <= ToYear)) return double.NaN;
        (double north, double east, _) = FieldNt(latitudeDeg, longitudeDeg, heightKm, year);
        return Math.Atan2(east, north) * 180 / Math.PI;
    }

    /// <summary>North, east and down parts of the field in the geodetic frame [nT].</summary>
    public static (double North, double East, double Down) FieldNt(double latitudeDeg, double longitudeDeg, double heightKm, double year)
    {
        double latitude = latitudeDeg * Math.PI / 180, longitude = longitudeDeg * Math.PI / 180, time = year - FromYear;

        // Geodetic to geocentric.
        double e2 = Flattening * (2 - Flattening), prime = SemiMajorKm / Math.Sqrt(1 - (e2 * Math.Sin(latitude) * Math.Sin(latitude)));
        double rho = (prime + heightKm) * Math.Cos(latitude), axial = ((prime * (1 - e2)) + heightKm) * Math.Sin(latitude);
        double r = Math.Sqrt((rho * rho) + (axial * axial)), geocentric = Math.Asin(axial / r);
        (double[,] p, double[,] slope) = Legendre(geocentric);

        double north = 0, east = 0, down = 0, cosine = Math.Cos(geocentric), ratio = SphereKm / r, power = ratio * ratio;
        for (int n = 1; n <= Degree; n++)
        {
            power *= ratio;
            for (int m = 0; m <= n; m++)
            {
                (double g0, double h0, double gDot, double hDot) = Coefficients[n, m];
                double g = g0 + (time * gDot), h = h0 + (time * hDot), c = Math.Cos(m * longitude), s = Math.Sin(m * longitude);
                north -= power * ((g * c) + (h * s)) * slope[n, m];
                east += power * m * ((g * s) - (h * c)) * p[n, m] / cosine;
                down -= power * (n + 1) * ((g * c) + (h * s)) * p[n, m];
            }
        }

        double turn = geocentric - latitude;
        return ((north * Math.Cos(turn)) - (down * Math.Sin(turn)), east, (north * Math.Sin(turn)) + (down * Math.Cos(turn)));
    }

    // P(n, m) of sin(latitude) and its slope along the latitude, by the recursions in degree; Schmidt's factors come last.
    private static (double[,] P, double[,] Slope) Legendre(double latitude)
    {
        double x = Math.Sin(latitude), z = Math.Cos(latitude);
        var p = new double[Degree + 1, Degree + 1];
        var d = new double[Degree + 1, Degree + 1];
        p[0, 0] = 1;
        for (int n = 1; n <= Degree; n++)
        {
            for (int m = 0; m <= n; m++)
            {
                if (n == m)
                {
                    p[n, n] = z * p[n - 1, n - 1] * ((2 * n) - 1);
                    d[n, n] = ((2 * n) - 1) * ((z * d[n - 1, n - 1]) - (x * p[n - 1, n - 1]));
                }
                else
                {
                    double before = n > 1 ? p[n - 2, m] : 0, slopeBefore = n > 1 ? d[n - 2, m] : 0;
                    p[n, m] = ((((2 * n) - 1) * x * p[n - 1, m]) - ((n + m - 1) * before)) / (n - m);
                    d[n, m] = ((((2 * n) - 1) * ((x * d[n - 1, m]) + (z * p[n - 1, m]))) - ((n + m - 1) * slopeBefore)) / (n - m);
                }
            }
        }

        for (int n = 1; n <= Degree; n++)
        {
            double factor = 1;
            for (int m = 1; m <= n; m++)
            {
                factor /= (n - m + 1.0) * (n + m);
                double schmidt = Math.Sqrt(2 * factor);
                p[n, m] *= schmidt;
                d[n, m] *= schmidt;
            }
        }

        return (p, d);
    }

    private static (double G, double H, double GDot, double HDot)[,] Load()
    {
        var all = new (double, double, double, double)[Degree + 1, Degree + 1];
        using Stream stream = typeof(WorldMagneticModel).Assembly.GetManifestResourceStream("wmm2025.csv")!;
        using var text = new StreamReader(stream);
        text.ReadLine();
        while (text.ReadLine() is { Length: > 0 } line)
        {
            double[] c = [.. line.Split(',').Select(v => double.Parse(v, CultureInfo.InvariantCulture))];
            all[(int)c[0], (int)c[1]] = (c[2], c[3], c[4], c[5]);
        }

        return all;
    }
}
