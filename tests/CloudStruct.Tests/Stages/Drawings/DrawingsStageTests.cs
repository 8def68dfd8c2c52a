using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using CloudStruct.Stages.Drawings;

namespace CloudStruct.Tests.Stages.Drawings;

public class DrawingsStageTests
{
    private const double Degree = Math.PI / 180;

    [Fact]
    public void Nothing_found_is_nothing_drawn()
    {
        DrawingsRecord r = Run(new Findings());
        Assert.Empty(r.Nets);
        Assert.Empty(r.Widths);
        Assert.Empty(r.Views);
    }

    [Theory]
    [InlineData(1, "Poles of the one face in the host rock", "1 face.")]
    [InlineData(2, "Poles of 2 faces in the host rock", "2 faces.")]
    public void One_or_two_faces_make_a_net_without_contours(int count, string title, string words)
    {
        NetDrawing net = Assert.Single(Run(WithFaces([.. Enumerable.Range(1, count).Select(i => Face(i, new Attitude(10 * i, 60)))])).Nets);
        Assert.Equal("net-host", net.Name);
        Assert.Equal(title, net.Title);
        Assert.Equal(count, net.Poles.Length);
        Assert.Empty(net.Curves);
        Assert.Contains(words, net.Sentence);
        Assert.DoesNotContain("Contours", net.Sentence);
    }

    [Fact]
    public void Poles_lie_where_their_trend_and_plunge_say_about_the_stated_north()
    {
        Findings f = WithFaces([Face(1, new Attitude(40, 60)), Face(2, new Attitude(0, 90)), Face(3, new Attitude(123, 0))], turn: 2);
        NetDrawing net = Run(f).Nets[0];

        // Pole of 040/60: trend 310 (grid), 312 (true), plunge 30.
        Point2 expected = EqualAreaNet.OfDirection(new TrendPlunge(312, 30).ToVector());
        Assert.Equal(expected.X, net.Poles[0].At.X, 1e-9);
        Assert.Equal(expected.Y, net.Poles[0].At.Y, 1e-9);
        Assert.Equal(1, Math.Sqrt(Math.Pow(net.Poles[1].At.X, 2) + Math.Pow(net.Poles[1].At.Y, 2)), 1e-9);
        Assert.Equal(0, Math.Abs(net.Poles[2].At.X) + Math.Abs(net.Poles[2].At.Y), 1e-9);
        Assert.Contains("Azimuths are from true north, 2.00 deg more than from grid north.", net.Sentence);
        Assert.True(net.HasNorth);
    }

    [Fact]
    public void A_model_that_nothing_ties_to_north_has_no_arrow_and_says_so()
    {
        Findings f = WithFaces([Face(1, new Attitude(40, 60))], north: North.Model);
        NetDrawing net = Run(f).Nets[0];
        Assert.False(net.HasNorth);
        Assert.Contains("which nothing ties to north", net.Sentence);
    }

    [Fact]
    public void Each_domain_has_its_net_with_its_sets_and_loose_faces_are_counted_out()
    {
        Face[] faces = [.. Enumerable.Range(1, 30).Select(i => Face(i, new Attitude((40 + (i % 7)) % 360, 60)))];
        FaceDomain[] domain = [.. faces.Select((_, i) => i < 20 ? FaceDomain.Host : FaceDomain.Dike)];
        InPlace[] place = [.. faces.Select((_, i) => i == 0 ? InPlace.No : InPlace.Yes)];
        var set = new OrientationSet { Set = "host-1", Domain = FaceDomain.Host, Normal = new Attitude(43, 60).UpwardNormal(), Cone95Deg = 4, Weighting = "count" };
        Findings f = WithFaces(faces) with
        {
            Contacts = new ContactsRecord { DomainOfFace = domain, InPlaceOfFace = place },
            Sets = new SetsRecord { Sets = [set], SetOfFace = [.. domain.Select(d => d == FaceDomain.Host ? "host-1" : "")] },
        };
        Assert.Equal(["net-host", "net-host-weighted", "net-dike", "net-dike-weighted"], Run(f).Nets.Select(n => n.Name));
        NetDrawing[] nets = Run(f, new DrawingSettings { WeightedNets = false }).Nets;
        Assert.Equal(["net-host", "net-dike"], nets.Select(n => n.Name));
        Assert.Equal(19, nets[0].Poles.Length);
        Assert.Equal(["host-1"], nets[0].Groups);
        Assert.Empty(nets[1].Groups);
        Assert.Contains("1 face out of place is left out.", nets[0].Sentence);
        Assert.Contains("1 set:", nets[0].Sentence);
        NetCurve circle = Assert.Single(nets[0].Curves, c => c.Kind == "great_circle");
        Assert.All(circle.Points, p => Assert.Equal(0, EqualAreaNet.Direction(p).Dot(set.Normal), 1e-9));
        foreach (Point2 p in nets[0].Curves.Where(c => c.Kind == "cone").SelectMany(c => c.Points))
        {
            Assert.Equal(4, Math.Acos(Math.Abs(EqualAreaNet.Direction(p).Dot(set.Normal))) / Degree, 1e-6);
        }
    }

    [Fact]
    public void Contour_levels_are_those_the_sentence_states()
    {
        Vec3 mean = new Attitude(40, 60).UpwardNormal();
        Face[] faces = [.. Enumerable.Range(1, 60).Select(i =>
        {
            var d = new Draws(3, 3, (ulong)i);
            return Face(i, Attitude.FromNormal(Fisher.Draw(mean, 60, ref d)));
        })];
        NetDrawing net = Run(WithFaces(faces)).Nets[0];
        double[] levels = [.. net.Curves.Where(c => c.Kind == "contour").Select(c => c.Level).Distinct().Order()];
        Assert.NotEmpty(levels);
        string listed = levels.Length == 1 ? $"{levels[0]:0}" : string.Join(", ", levels[..^1].Select(l => $"{l:0}")) + $" and {levels[^1]:0}";
        Assert.Contains($"at {listed} standard deviations above uniform", net.Sentence);
        Assert.Contains("Vollmer (1995), k = 15.3", net.Sentence);   // 2 (1 + 60/9)
        Assert.Empty(Run(WithFaces(faces), new DrawingSettings { Contours = false }).Nets[0].Curves);
    }

    [Fact]
    public void Contacts_are_poles_with_cones_or_directions_of_traces()
    {
        Vec3 n = new Attitude(10, 85).UpwardNormal();
        Findings f = new()
        {
            Contacts = new ContactsRecord
            {
                Dikes = [new DikeFrame { Dike = 1 }],
                Contacts =
                [
                    new Contact { Dike = 1, Margin = Margin.A, Constraint = Constraint.Plane, Normal = n, Region = new PoleRegion { Cone95Deg = 3 } },
                    new Contact { Dike = 1, Margin = Margin.B, Constraint = Constraint.Line, LineTrendDeg = 200, LinePlungeDeg = 5 },
                ],
            },
        };
        NetDrawing net = Assert.Single(Run(f).Nets);
        Assert.Equal("net-contacts", net.Name);
        Assert.Equal(["dike 1 margin A", "dike 1 margin B, trace"], net.Groups);
        Point2 trace = EqualAreaNet.OfDirection(new TrendPlunge(200, 5).ToVector());
        Assert.Equal(trace.X, net.Poles[1].At.X, 1e-9);
        Assert.Equal(trace.Y, net.Poles[1].At.Y, 1e-9);
        Assert.Contains(net.Curves, c => c is { Kind: "cone", Group: "dike 1 margin A" });
        Assert.Contains("1 stretch of contact shown by its pole, each with its 95 % cone", net.Sentence);
        Assert.Contains("1 stretch whose trace is too straight to give a dip is shown by the direction of the trace", net.Sentence);
    }

    [Fact]
    public void Width_is_drawn_only_where_it_was_measured()
    {
        Findings f = new()
        {
            Contacts = new ContactsRecord { Dikes = [new DikeFrame { Dike = 1 }] },
            Width = new WidthRecord
            {
                StationM = 1,
                Stations =
                [
                    new Station { Dike = 1, ChainageM = 0, Status = StationStatus.Measured, TrueWidthM = 2.3512, TrueWidthLow95M = 2.3, TrueWidthHigh95M = 2.4 },
                    new Station { Dike = 1, ChainageM = 1, Status = StationStatus.AHidden, TrueWidthM = 9, VisibleWidthM = 1.5 },
                    new Station { Dike = 1, ChainageM = 2, Status = StationStatus.Unconstrained, ApparentWidthM = 2.6 },
                ],
                Dikes = [new DikeSummary { Dike = 1, WidthMeanM = new Estimate(2.3512, 2.3, 2.4) }],
            },
        };
        WidthDrawing w = Assert.Single(Run(f).Widths);
        Assert.Equal(2.3512, w.Points[0].WidthM);
        Assert.Null(w.Points[1].WidthM);
        Assert.Equal(1.5, w.Points[1].VisibleM);
        Assert.Equal(2.6, w.Points[2].ApparentM);
        Assert.Equal(
            "True width at 1 of 3 stations, 1.00 m apart: 2.35 m. Mean 2.35 m (95 %: 2.30 to 2.40 m). At 1 station a margin is hidden. "
            + "At 1 station nothing fixes the dip, and only the apparent width is known. The band holds the internal errors; those of the whole model come on top.",
            w.Sentence);
    }

    [Fact]
    public void Plan_shows_north_up_and_east_right_and_the_upper_surface_hides_the_lower()
    {
        // A level sheet 4 by 3 m: red in the north-east corner, blue elsewhere; a green sheet one metre beneath it.
        Findings f = Sheets();
        ViewImage plan = Assert.Single(Run(f).Views, v => v.Name == "view-colour-plan");
        Assert.Equal(0, plan.UpAzimuthDeg);
        Assert.True(IsLike(plan, 0.9, 0.1, red: true));
        Assert.True(IsLike(plan, 0.1, 0.9, red: false));
        Assert.Equal(4.0 / 3, (double)plan.Width / plan.Height, 0.1);
        Assert.Contains("grid north is up", plan.Sentence);

        static bool IsLike(ViewImage v, double x, double y, bool red)
        {
            int at = 4 * (((int)(y * v.Height) * v.Width) + (int)(x * v.Width));
            Assert.Equal(255, v.Rgba[at + 3]);
            Assert.Equal(0, v.Rgba[at + 1]);   // no green shines through
            return red ? v.Rgba[at] > 100 && v.Rgba[at + 2] == 0 : v.Rgba[at + 2] > 100 && v.Rgba[at] == 0;
        }
    }

    [Fact]
    public void Class_and_set_colours_are_those_of_their_keys()
    {
        Findings f = Sheets();
        int n = f.Described.Cloud.Count;
        f = f with
        {
            Classes = new ClassifiedCloud { Class = [.. Enumerable.Repeat((byte)RockClass.Dike, n)] },
            Faces = new FaceSet { Faces = [Face(1, new Attitude(0, 0))], FaceOfPoint = [.. Enumerable.Repeat(1, n)] },
            Sets = new SetsRecord { Sets = [new OrientationSet { Set = "host-1", Domain = FaceDomain.Host, Normal = Vec3.Up }], SetOfFace = ["host-1"] },
        };
        ViewImage[] views = Run(f).Views;
        Assert.Equal(
            ["view-colour-plan", "view-classes-plan", "view-faces-plan", "view-colour-front", "view-classes-front", "view-faces-front"],
            views.Select(v => v.Name));
        ViewKey dike = Assert.Single(views[1].Key);
        Assert.Equal("dike 100 %", dike.Label);
        Assert.Equal("host-1", Assert.Single(views[2].Key).Label);

        // A level sheet is lit evenly: hue as in the key, at one lightness.
        int at = 4 * ((views[1].Height / 2 * views[1].Width) + (views[1].Width / 2));
        double light = (double)views[1].Rgba[at] / dike.Red;
        Assert.Equal(dike.Green * light, views[1].Rgba[at + 1], 1.5);
        Assert.Equal(dike.Blue * light, views[1].Rgba[at + 2], 1.5);
    }

    [Fact]
    public void The_front_looks_into_the_wall()
    {
        // A vertical wall facing south: seen looking north, its west end on the left.
        var x = new List<float>();
        var z = new List<float>();
        for (double a = 0; a < 6; a += 0.05) for (double b = 0; b < 3; b += 0.05) { x.Add((float)a); z.Add((float)b); }
        int n = x.Count;
        var cloud = new WorkingCloud
        {
            X = [.. x], Y = new float[n], Z = [.. z], SpacingM = 0.05,
            Red = [.. x.Select(a => (byte)(a < 3 ? 200 : 0))], Green = new byte[n], Blue = [.. x.Select(a => (byte)(a < 3 ? 0 : 200))],
        };
        var d = new DescribedCloud
        {
            Cloud = cloud, NormalX = new float[n], NormalY = [.. Enumerable.Repeat(-1f, n)], NormalZ = new float[n], AreaM2 = [.. Enumerable.Repeat(0.0025f, n)],
        };
        ViewImage front = Assert.Single(Run(new Findings { Described = d }).Views, v => v.Name == "view-colour-front");
        Assert.StartsWith("Seen looking toward 000 deg, level.", front.Sentence);
        Assert.Null(front.UpAzimuthDeg);
        int left = 4 * ((front.Height / 2 * front.Width) + (front.Width / 10)), right = left + (4 * (front.Width * 8 / 10));
        Assert.True(front.Rgba[left] > 100 && front.Rgba[right + 2] > 100);
    }

    [Fact]
    public void A_cloud_of_one_point_is_a_picture_too()
    {
        var cloud = new WorkingCloud { X = [1], Y = [2], Z = [3], SpacingM = 0.02 };
        ViewImage[] views = Run(new Findings { Described = new DescribedCloud { Cloud = cloud } }).Views;
        Assert.Equal(2, views.Length);
        Assert.All(views, v => Assert.Equal(4 * v.Width * v.Height, v.Rgba.Length));
        Assert.Contains(views[0].Rgba.Chunk(4), p => p[3] == 255);
    }

    [Fact]
    public void Threads_change_no_pixel()
    {
        Findings f = Sheets();
        ViewImage[] one = Run(f, threads: 1).Views, four = Run(f, threads: 4).Views;
        foreach ((ViewImage a, ViewImage b) in one.Zip(four)) Assert.Equal(a.Rgba, b.Rgba);
    }

    [Fact]
    public void A_picture_never_exceeds_its_size_and_settings_name_their_fault()
    {
        Assert.All(Run(Sheets(), new DrawingSettings { PictureSizePx = 300 }).Views, v => Assert.InRange(Math.Max(v.Width, v.Height), 1, 301));
        Assert.Equal("drawings.picture_size_px", Assert.Single(new DrawingSettings { PictureSizePx = 0 }.Check()).Key);
    }

    private static Findings Sheets()
    {
        List<float> x = [], y = [], z = [];
        List<byte> r = [], g = [], b = [];
        foreach (double height in new[] { 0.0, -1 })
        {
            for (double a = 0; a < 4; a += 0.04)
            {
                for (double c = 0; c < 3; c += 0.04)
                {
                    bool corner = a > 2 && c > 1.5;
                    x.Add((float)a);
                    y.Add((float)c);
                    z.Add((float)height);
                    r.Add((byte)(height == 0 && corner ? 200 : 0));
                    g.Add((byte)(height == 0 ? 0 : 200));
                    b.Add((byte)(height == 0 && !corner ? 200 : 0));
                }
            }
        }

        int n = x.Count;
        var cloud = new WorkingCloud { X = [.. x], Y = [.. y], Z = [.. z], Red = [.. r], Green = [.. g], Blue = [.. b], SpacingM = 0.04 };
        return new Findings
        {
            Described = new DescribedCloud { Cloud = cloud, NormalX = new float[n], NormalY = new float[n], NormalZ = [.. Enumerable.Repeat(1f, n)] },
        };
    }

    private static Face Face(int id, Attitude attitude) => new()
    {
        FaceId = id, Normal = attitude.UpwardNormal(), Attitude = attitude, AreaM2 = 1, LengthM = 1, InPlace = InPlace.Yes,
    };

    private static Findings WithFaces(Face[] faces, double turn = 0, North north = North.Grid)
    {
        var frame = new SurveyFrame { North = turn != 0 ? North.True : north, ConvergenceDeg = turn };
        return new Findings { Described = new DescribedCloud { Cloud = new WorkingCloud { Frame = frame } }, Faces = new FaceSet { Faces = faces } };
    }

    private static DrawingsRecord Run(Findings input, DrawingSettings? settings = null, int threads = 2) =>
        new DrawingsStage().Run(input, settings ?? new DrawingSettings(), StageContext.Plain(1, threads));
}
