using CloudStruct.Products;
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

namespace CloudStruct.Tests.Products;

/// <summary>Small findings put together by hand, so that every sheet can be tested without running a stage.</summary>
internal static class Samples
{
    /// <summary>Where the local origin of the samples lies on the map.</summary>
    public static readonly Vec3 Origin = new(512300, 4178900, 1200);

    /// <summary>One dike, five faces, two sets, six stations of every status.</summary>
    public static Findings Dike() => new()
    {
        SurveyName = "Ravine <north> & \"south\"",
        Intake = new IntakeRecord
        {
            Frame = new SurveyFrame
            {
                Origin = Origin,
                Crs = new CrsInfo { Kind = CrsKind.Projected, Name = "WGS 84 / UTM zone 33N", Epsg = 32633 },
                North = North.True,
                ConvergenceDeg = 0.42,
                Reference = new ModelReference { Kind = ReferenceKind.Control, TiltSigmaDeg = 0.05, AzimuthSigmaDeg = 0.08, ScaleSigma = 0.0004, Source = "control points" },
            },
            HasColour = true,
            Points = 4,
            Control =
            [
                new ControlResidual { Id = "P1", Role = "control", DxM = 0.0123, DyM = -0.0004, DzM = 0.02, AlongNormalM = 0.011 },
                new ControlResidual { Id = "P2, \"rock\"", Role = "check" },
            ],
        },
        Described = Cloud(),
        Classes = new ClassifiedCloud
        {
            Class = [64, 65, 66, 64],
            DikeProbability = [3, 250, 10, 0],
            DikeOfPoint = [0, 1, 0, 0],
            Dikes = [new DikeBody { Dike = 1, ByColour = true, Separation = 0.97, MarginWanderM = 0.05 }],
            ThinnestDikeM = 0.3,
            UsedColour = true,
            Summary =
            [
                new ClassSummary { Class = RockClass.Host, Points = 61234, AreaM2 = 512.345, Precision = 0.98123, Recall = 0.99, Iou = 0.9712 },
                new ClassSummary { Class = RockClass.Dike, Points = 20111, AreaM2 = 98.7654, Precision = 0.96, Recall = 0.95, Iou = 0.91 },
                new ClassSummary { Class = RockClass.Cover, Points = 5012, AreaM2 = 30.5 },
            ],
        },
        Faces = new FaceSet
        {
            Faces =
            [
                FaceOf(1, 123.456, 78.9, 4.2, 0.8, 1.1), FaceOf(2, 359.998, 45, 2.02, 1.9, 2.4),
                FaceOf(3, 30, 88.5, 0.61, 3.9, 4.4), FaceOf(4, 212.25, 12.126, 0.25, 5.1, 6.0), FaceOf(5, 120, 80, 0.0512, 8, 8.2),
            ],
            FaceOfPoint = [1, 2, 0, 1],
            SmallestFaceM2 = 0.05,
            ToleranceM = 0.02,
        },
        Contacts = new ContactsRecord
        {
            DomainOfFace = [FaceDomain.Host, FaceDomain.Dike, FaceDomain.Margin, FaceDomain.Unknown, FaceDomain.Host],
            InPlaceOfFace = [InPlace.Yes, InPlace.Yes, InPlace.Yes, InPlace.Unknown, InPlace.No],
            Dikes =
            [
                new DikeFrame { Dike = 1, CentreLine = [new(0, 0, 0), new(3.5, 3.5, 0)], ChainageM = [0, 5], Normal = [new(0.7, -0.7, 0), new(0.7, -0.7, 0)] },
            ],
            Contacts = [ContactPlane(Margin.A, 1, 0, 3), ContactPlane(Margin.B, 1, 0, 2), ContactLine(Margin.B, 2, 2, 5)],
        },
        Width = new WidthRecord
        {
            StationM = 1,
            Stations =
            [
                StationAt(1, StationStatus.Measured, 2.5), StationAt(2, StationStatus.Measured, 2.6),
                StationAt(3, StationStatus.AHidden, null), StationAt(4, StationStatus.BothHidden, null),
                StationAt(5, StationStatus.Unconstrained, null), StationAt(6, StationStatus.Measured, 2.4),
            ],
            Dikes =
            [
                new DikeSummary
                {
                    Dike = 1, Mean = new Attitude(45.2, 84.6), Normal = new Vec3(0.7, -0.7, 0.1),
                    Region = new PoleRegion { Cone95Deg = 1.2, Cone95TotalDeg = 1.4 },
                    TrendDeg = 45.2, SeenLengthM = 3, HiddenLengthM = 2,
                    WidthMeanM = new(2.5, 2.44, 2.56), WidthMedianM = new(2.5, 2.43, 2.57), WidthMinM = new(2.4, 2.3, 2.5), WidthMaxM = new(2.6, 2.5, 2.7),
                    Measured = 3, NEffective = 2.345678, WindowM = 4, AspectRatioMin = 2, ThinnestDikeM = 0.3,
                },
            ],
        },
        Sets = new SetsRecord
        {
            SetOfFace = ["host-1", "dike-1", "", "", "host-1"],
            Sets =
            [
                new OrientationSet
                {
                    Set = "host-1", Domain = FaceDomain.Host, Count = 2, Mean = new Attitude(121.7, 79.4), Kappa = 123.456, Cone95Deg = 4.5,
                    S1 = 0.95, S2 = 0.03, S3 = 0.02, Shape = 8.52, Strength = 3.86, SpacingM = new(0.71, 0.5, 0.98), P32PerM = new(1.2345, 0.9, 1.6),
                    ExposedLengthMeanM = 1.5, Weighting = "area", NEffective = 1.9,
                },
                new OrientationSet
                {
                    Set = "dike-1", Domain = FaceDomain.Dike, Count = 1, Mean = new Attitude(0, 45), Kappa = double.PositiveInfinity, Cone95Deg = double.NaN,
                    S1 = 1, S2 = 0, S3 = 0, Shape = double.NaN, Strength = double.PositiveInfinity, Weighting = "area", NEffective = 1,
                },
            ],
        },
        Remarks =
        [
            new Remark("intake", "2 points were not numbers and were dropped.", false),
            new Remark("contacts", "Margin B is only a line between chainage 2 and 5 m: its trace departs from a straight line by 0.02 m. A view of the overhang would mend that.", true),
        ],
    };

    /// <summary>Nothing but rock: no dike, no face, no colour, no coordinate system.</summary>
    public static Findings Nothing() => new()
    {
        SurveyName = "bare",
        Intake = new IntakeRecord { Frame = new SurveyFrame { North = North.Model, Reference = new ModelReference { Kind = ReferenceKind.None } } },
        Classes = new ClassifiedCloud { ThinnestDikeM = 0.25 },
    };

    /// <summary>Facts of a run.</summary>
    public static RunFacts Facts() => new()
    {
        ToolVersion = "0.1.0",
        RunId = "1f2e3d4c5b6a",
        InputDate = new DateOnly(2025, 6, 14),
        Licence = "CC-BY-4.0",
        Citation = "Example survey, 2025",
        RecipeName = "dike-survey",
        Recipe = "thin:\n  spacing_m: 0.05   # <b>bold</b>\n",
        Inputs = [new InputFile("clouds/ravine.las", 123456, new string('a', 64))],
        Seed = 7,
        NorthText = "Azimuths are from true north: grid azimuth plus a meridian convergence of 0.42 deg.",
        Versions = [new HeaderFact("CloudStruct", "0.1.0"), new HeaderFact(".NET", "10.0.0")],
    };

    private static Face FaceOf(int id, double strike, double dip, double area, double cone, double total) => new()
    {
        FaceId = id,
        Middle = new Vec3(id, 2 * id, -0.0002),
        Attitude = new Attitude(strike, dip),
        Normal = new Attitude(strike, dip).UpwardNormal(),
        Region = new PoleRegion { Cone95Deg = cone, Cone95TotalDeg = total, Ellipse95MajorDeg = cone * 1.1, Ellipse95MinorDeg = cone * 0.9, Ellipse95RakeDeg = 179.999 },
        AreaM2 = area,
        LengthM = Math.Sqrt(area),
        HeightM = 1.23456,
        RmsM = 0.0123,
        NoiseM = 0.004,
        WavinessM = 0.011,
        Points = 1000 / id,
        EndsHidden = id == 3 ? null : id % 3,
    };

    private static Contact ContactPlane(Margin margin, int segment, double from, double to) => new()
    {
        Dike = 1, Margin = margin, Segment = segment, ChainageFromM = from, ChainageToM = to, Middle = new Vec3(1, 1, 0.5),
        Constraint = Constraint.Plane, Normal = new Vec3(0.7, -0.7, 0.1), Attitude = new Attitude(45, 84.3),
        Region = new PoleRegion { Cone95Deg = 1.5, Cone95TotalDeg = 1.9, Ellipse95MajorDeg = 1.6, Ellipse95MinorDeg = 0.4, Ellipse95RakeDeg = 91 },
        ReliefM = 0.42, RmsM = 0.031, Points = 87, TrendAlongDeg = 45, LeanToBDeg = -5.7, LeanLow95Deg = -7.1, LeanHigh95Deg = -4.3,
        LineTrendDeg = 46.1, LinePlungeDeg = 3.2, Evidence = margin == Margin.A ? Evidence.Trace : Evidence.BothMargins,
        MarginFacing = margin == Margin.A ? "NW" : "SE", WindowM = 4,
    };

    private static Contact ContactLine(Margin margin, int segment, double from, double to) => new()
    {
        Dike = 1, Margin = margin, Segment = segment, ChainageFromM = from, ChainageToM = to, Middle = new Vec3(3, 3, 0.5),
        Constraint = Constraint.Line, ReliefM = 0.02, RmsM = 0.015, Points = 44, LineTrendDeg = 44.4, LinePlungeDeg = 1.1,
        Evidence = Evidence.Trace, MarginFacing = "SE", WindowM = 4,
    };

    private static Station StationAt(int n, StationStatus status, double? width) => new()
    {
        Dike = 1, Number = n, ChainageM = n - 0.5, Place = new Vec3(n * 0.7, n * 0.7, 0), Status = status,
        Attitude = status == StationStatus.Unconstrained ? null : new Attitude(45, 84),
        ApparentWidthM = status is StationStatus.Measured or StationStatus.Unconstrained ? (width ?? 2.7) + 0.02 : null,
        TrueWidthM = width, TrueWidthLow95M = width - 0.08, TrueWidthHigh95M = width + 0.09,
        TrueWidthTotalLow95M = width - 0.085, TrueWidthTotalHigh95M = width + 0.095,
        VisibleWidthM = status == StationStatus.AHidden ? 1.4 : null, ExposedWidthM = width + 0.3, TrendAlongDeg = 45,
        LeanToBDeg = status == StationStatus.Unconstrained ? null : -6,
    };

    // Four points on a line, 1 m apart, in a grid of cells of 1 m.
    private static DescribedCloud Cloud() => new()
    {
        Cloud = new WorkingCloud
        {
            Frame = new SurveyFrame { Origin = Origin },
            X = [0.5f, 1.5f, 2.5f, 3.5f], Y = [0.5f, 0.5f, 0.5f, 0.5f], Z = [0.5f, 0.5f, 0.5f, 0.5f],
            Red = [10, 20, 30, 40], Green = [11, 21, 31, 41], Blue = [12, 22, 32, 255], SourceClass = [2, 2, 5, 2], Support = [1, 1, 1, 1],
            SpacingM = 1,
            Grid = new SortedGrid { MinX = 0, MinY = 0, MinZ = 0, CellM = 1, NX = 4, NY = 1, NZ = 1, Keys = [0, 1, 2, 3], Starts = [0, 1, 2, 3, 4] },
        },
        RoughnessM = [0.01f, 0.02f, float.NaN, 0.04f],
        RoughnessRadiusM = 0.25,
        NormalRadiusM = 0.2,
        NoiseM = 0.004,
    };
}
