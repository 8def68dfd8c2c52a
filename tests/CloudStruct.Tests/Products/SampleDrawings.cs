using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;

namespace CloudStruct.Tests.Products;

/// <summary>Drawings put together by hand, as crowded as those of a real survey.</summary>
internal static class SampleDrawings
{
    /// <summary>One net, one profile, one view.</summary>
    public static DrawingsRecord All() => new()
    {
        Nets = [Net(), ContactNet()],
        Widths = [Profile(1, 60, 3)],
        Views = [View()],
    };

    /// <summary>Three sets of poles, strays, mean planes, cones and contours.</summary>
    public static NetDrawing Net(int perSet = 90)
    {
        var random = new Random(5);
        (string Name, double Trend, double Plunge)[] sets = [("host-1", 40, 12), ("host-2", 128, 20), ("host-3", 250, 65)];
        var poles = new List<NetPole>();
        foreach (var (name, trend, plunge) in sets)
        {
            for (int i = 0; i < perSet; i++)
                poles.Add(new(OnNet(trend + (12 * Normal(random)), plunge + (9 * Normal(random))), Math.Exp(-2.5 + (1.3 * Normal(random))), name, poles.Count + 1));
        }
        for (int i = 0; i < perSet / 3; i++)
            poles.Add(new(OnNet(random.NextDouble() * 360, random.NextDouble() * 90), 0.1, "", poles.Count + 1));
        var curves = new List<NetCurve>();
        foreach (var (name, trend, plunge) in sets)
        {
            curves.Add(new("great_circle", name, 0, GreatCircle(trend, plunge)));
            curves.Add(new("cone", name, 0, Ring(trend, plunge, 3)));
            for (int level = 1; level <= 3; level++) curves.Add(new("contour", "", 2 * level, Ring(trend, plunge, 26 - (6 * level))));
        }
        return new NetDrawing
        {
            Name = "net-host",
            Title = "Fracture faces in the host",
            Poles = [.. poles],
            Curves = [.. curves],
            Groups = [.. sets.Select(s => s.Name)],
            Sentence = $"Equal-area lower-hemisphere net of {poles.Count} poles to faces of 0.05 m² or more, weighted by area; true north. Contours (exponential kernel, Kamb 1959) at 2, 4 and 6 standard deviations above uniform.",
        };
    }

    /// <summary>Contact poles in a model that nothing ties to the ground.</summary>
    public static NetDrawing ContactNet() => new()
    {
        Name = "net-contacts",
        Title = "Contacts of dike 1, in the frame of a model that nothing ties to the ground",
        Poles = [.. Enumerable.Range(0, 12).Select(i => new NetPole(OnNet(130 + i, 4 + i), 0, i % 2 == 0 ? "A" : "B", 0))],
        Curves = [new("great_circle", "A", 0, GreatCircle(130, 8)), new("great_circle", "B", 0, GreatCircle(138, 12))],
        Groups = ["A", "B"],
        Sentence = "Poles to 12 windows along the margins. The top of the net is the y axis of the model.",
        HasNorth = false,
    };

    /// <summary>A profile with hidden stretches on one and both sides and an unconstrained end.</summary>
    public static WidthDrawing Profile(int dike, int stations, double width)
    {
        var points = new WidthPoint[stations];
        for (int i = 0; i < stations; i++)
        {
            double w = width * (1 + (0.2 * Math.Sin(i * 0.15)) + (i > stations / 2 ? 0.25 : 0)), s = i + 0.5;
            points[i] = (10 * i / stations) switch
            {
                2 => new(s, null, null, null, null, w * 0.6, StationStatus.AHidden),
                5 => new(s, null, null, null, null, null, StationStatus.BothHidden),
                9 => new(s, null, null, null, w * 1.05, null, StationStatus.Unconstrained),
                _ => new(s, w, w - 0.15, w + 0.18, w * 1.02, null, StationStatus.Measured),
            };
        }
        return new WidthDrawing
        {
            Dike = dike,
            Title = "Width of dike 1 along strike",
            Points = points,
            Sentence = $"True width at {stations * 7 / 10} of {stations} stations every 1 m: mean 3.21 m (95 %: 3.05 to 3.37), calibrated in simulation.",
        };
    }

    /// <summary>A profile with a step, a taper, leans of both margins, one of them only a line, and a histogram with laws.</summary>
    public static WidthDrawing Full() => Profile(1, 60, 3) with
    {
        Trends =
        [
            new WidthTrend { Dike = 1, Kind = WidthTrendKind.Step, ChainageM = new(31, 29, 34), SizeM = new(0.75, 0.6, 0.9), WidthBeforeM = 3, WidthAfterM = 3.75 },
            new WidthTrend { Dike = 1, Kind = WidthTrendKind.Taper, ChainageM = new(10, 0, 20), SizeM = new(0.4, 0.2, 0.6), WidthBeforeM = 3, WidthAfterM = 3.4 },
        ],
        Leans =
        [
            new(Records.Contacts.Margin.A, 0, 25, -6, -8, -4), new(Records.Contacts.Margin.A, 20, 60, 4, 1, 7),
            new(Records.Contacts.Margin.B, 0, 30, -5, -7.5, -2), new(Records.Contacts.Margin.B, 30, 60, null, null, null),
        ],
        Histogram = new(2.5, 0.25, [2, 9, 14, 12, 5], [new(ThicknessLawKind.Lognormal, true, [new(2.5, 1), new(3, 13), new(3.7, 3)]), new(ThicknessLawKind.Weibull, false, [new(2.5, 3), new(3.7, 3)])]),
    };

    /// <summary>A step of rock cut by a leaning dike.</summary>
    public static CrossSection Section() => new()
    {
        Dike = 1,
        Station = 7,
        ChainageM = 6,
        Status = StationStatus.Measured,
        LookingDeg = 47,
        SliceM = 0.1,
        Across = [.. Enumerable.Range(-200, 401).Select(i => i * 0.02f)],
        Up = [.. Enumerable.Range(-200, 401).Select(i => i < 0 ? 0.6f : 0.1f)],
        Class = [.. Enumerable.Range(-200, 401).Select(i => (byte)(Math.Abs(i) < 60 ? 65 : 64))],
        HeightAtM = 1203.4,
        AtA = new Point2(-1.2, 0.6),
        AtB = new Point2(1.2, 0.1),
        LeanToBDeg = 12,
        Sentence = "True width 2.35 m (95 %: 2.2 to 2.5 m).",
    };

    /// <summary>A small picture with a hole that nothing fills.</summary>
    public static ViewImage View(int width = 600, int height = 240)
    {
        byte[] rgba = new byte[width * height * 4];
        for (int y = 0; y < height; y++)
        {
            for (int x = 0; x < width; x++)
            {
                bool seen = Math.Pow((x - (width / 2.0)) / (width / 2.2), 2) + Math.Pow((y - (height / 2.0)) / (height / 2.2), 2) < 1;
                int at = 4 * ((y * width) + x);
                rgba[at] = (byte)(100 + (x * 100 / width));
                rgba[at + 1] = (byte)(90 + (y * 60 / height));
                rgba[at + 2] = 80;
                rgba[at + 3] = seen ? (byte)255 : (byte)0;
            }
        }
        return new ViewImage("view-colour-plan", "The outcrop from above, natural colour", width, height, 0.05, rgba, "Plan view; the top of the picture is an azimuth of 30 deg.", 30)
        {
            Key = [new(213, 94, 0, "dike"), new(0, 114, 178, "host"), new(0, 158, 115, "cover"), new(120, 120, 120, "loose"), new(210, 210, 210, "unknown")],
        };
    }

    private static double Normal(Random random) => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());

    // Lambert's equal-area projection, lower hemisphere, primitive radius 1: r = sqrt(2) sin((90 - plunge) / 2).
    private static Point2 OnNet(double trendDeg, double plungeDeg)
    {
        if (plungeDeg < 0) (trendDeg, plungeDeg) = (trendDeg + 180, -plungeDeg);
        if (plungeDeg > 90) (trendDeg, plungeDeg) = (trendDeg + 180, 180 - plungeDeg);
        double r = Math.Sqrt(2) * Math.Sin((90 - plungeDeg) / 2 * Math.PI / 180), a = trendDeg * Math.PI / 180;
        return new(r * Math.Sin(a), r * Math.Cos(a));
    }

    private static Point2[] GreatCircle(double poleTrendDeg, double polePlungeDeg)
    {
        double t = poleTrendDeg * Math.PI / 180, p = polePlungeDeg * Math.PI / 180;
        double[] strike = [Math.Cos(t), -Math.Sin(t), 0], down = [-Math.Sin(p) * Math.Sin(t), -Math.Sin(p) * Math.Cos(t), -Math.Cos(p)];
        return [.. Enumerable.Range(0, 91).Select(i => i * Math.PI / 90).Select(a => Project(
            (Math.Cos(a) * strike[0]) + (Math.Sin(a) * down[0]), (Math.Cos(a) * strike[1]) + (Math.Sin(a) * down[1]), Math.Sin(a) * down[2]))];
    }

    private static Point2[] Ring(double trendDeg, double plungeDeg, double radiusDeg)
    {
        var points = new List<Point2>();
        double t = trendDeg * Math.PI / 180, p = plungeDeg * Math.PI / 180, r = radiusDeg * Math.PI / 180;
        double[] axis = [Math.Cos(p) * Math.Sin(t), Math.Cos(p) * Math.Cos(t), -Math.Sin(p)];
        double[] u = [Math.Cos(t), -Math.Sin(t), 0], v = [Math.Sin(p) * Math.Sin(t), Math.Sin(p) * Math.Cos(t), Math.Cos(p)];
        for (int i = 0; i <= 60; i++)
        {
            (double s, double c) = Math.SinCos(i * Math.PI / 30);
            double[] d = [.. Enumerable.Range(0, 3).Select(k => (Math.Cos(r) * axis[k]) + (Math.Sin(r) * ((c * u[k]) + (s * v[k]))))];
            if (d[2] <= 0) points.Add(Project(d[0], d[1], d[2]));
        }
        return [.. points];
    }

    private static Point2 Project(double x, double y, double z)
    {
        double f = Math.Sqrt(1 / (1 - z));
        return new(x * f, y * f);
    }
}
