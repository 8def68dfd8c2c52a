using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using CloudStruct.Stages.Contacts;
using CloudStruct.Stages.Width;

namespace CloudStruct.Tests.Stages.Contacts;

/// <summary>A planar dike across stepped or level ground, as a labelled cloud: grid points with neighbours, no simulator.</summary>
internal sealed record DikeScene
{
    public double StrikeDeg { get; init; } = 30;
    public double DipDeg { get; init; } = 70;
    public double WidthM { get; init; } = 2;
    public double Scale { get; init; } = 1;
    public bool Steps { get; init; } = true;
    public (double FromM, double ToM) Cover { get; init; } = (1, -1);   // along strike
    public double GuessOffDeg { get; init; } = 4;
    public double EndsAtM { get; init; } = double.PositiveInfinity;   // along strike: host rock beyond
    public (double AtM, double ByM) Step { get; init; } = (0, 0);   // margin B moves out

    private Vec3 Along => new(Math.Sin(StrikeDeg * Math.PI / 180), Math.Cos(StrikeDeg * Math.PI / 180), 0);

    public Vec3 Normal => new Attitude(StrikeDeg, DipDeg).UpwardNormal();

    public (DescribedCloud Described, ClassifiedCloud Classes) Make()
    {
        const double step = 0.08;
        const int half = 110, across = 50;
        Vec3 right = Along.Cross(Vec3.Up);
        int rows = (2 * half) + 1, columns = (2 * across) + 1, n = rows * columns;
        var cloud = new WorkingCloud
        {
            X = new float[n], Y = new float[n], Z = new float[n], SpacingM = step * Scale, Neighbours = new int[n * WorkingCloud.K], NeighbourRadiusM = 3 * step * Scale,
        };
        var classes = new ClassifiedCloud { Class = new byte[n], DikeProbability = new byte[n], DikeOfPoint = new byte[n] };
        double Height(double s, double y) => Steps ? 0.9 * Math.Sin((0.9 * s) + (0.35 * y)) + (0.5 * Math.Sin((2.3 * s) - y)) : 0.02 * s;
        for (int i = 0; i < n; i++)
        {
            // A little off the grid, the same way for every orientation.
            double s = ((i / columns) - half + (0.3 * Math.Sin(12.9 * i))) * step, y = ((i % columns) - across + (0.3 * Math.Sin(78.2 * i))) * step;
            Vec3 p = (Along * s) + (right * y) + (Vec3.Up * Height(s, y));
            double q = Normal.Dot(p);
            (cloud.X[i], cloud.Y[i], cloud.Z[i]) = ((float)(p.X * Scale), (float)(p.Y * Scale), (float)(p.Z * Scale));
            bool dike = q > -WidthM / 2 && q < (WidthM / 2) + (s > Step.AtM ? Step.ByM : 0) && s < EndsAtM, hidden = s >= Cover.FromM && s <= Cover.ToM;
            classes.Class[i] = (byte)(hidden ? RockClass.Cover : dike ? RockClass.Dike : RockClass.Host);
            classes.DikeOfPoint[i] = (byte)(dike && !hidden ? 1 : 0);
            classes.DikeProbability[i] = (byte)(dike && !hidden ? 250 : 5);
            int k = 0;
            for (int dr = -2; dr <= 2 && k < WorkingCloud.K; dr++)
            {
                for (int dc = -2; dc <= 2 && k < WorkingCloud.K; dc++)
                {
                    int r = (i / columns) + dr, c = (i % columns) + dc;
                    if ((dr != 0 || dc != 0) && Math.Abs(dr) + Math.Abs(dc) <= 3 && r >= 0 && r < rows && c >= 0 && c < columns) cloud.Neighbours[(i * WorkingCloud.K) + k++] = (r * columns) + c;
                }
            }

            while (k < WorkingCloud.K) cloud.Neighbours[(i * WorkingCloud.K) + k++] = -1;
        }

        double off = GuessOffDeg * Math.PI / 180;
        Vec3 up = Normal.Cross(Along), guess = ((Normal * Math.Cos(off)) + (up * Math.Sin(off))).Unit();
        SlabWindow[] windows = [.. Enumerable.Range(-2, 5).Select(k => new SlabWindow(((Along * (k * 3.4)) + (Normal * 0.15)) * Scale, guess, 3.4 * Scale, WidthM * 1.1 * Scale))];
        return (new DescribedCloud { Cloud = cloud }, classes with { Dikes = [new DikeBody { Dike = 1, Windows = windows, ByColour = false }] });
    }

    public static (ContactsRecord Contacts, WidthRecord Width, List<Remark> Said) Measure(
        (DescribedCloud Described, ClassifiedCloud Classes) scene, int threads = 2, Vec3[]? baseline = null, FaceSet? faces = null, FieldReading[]? readings = null)
    {
        var said = new List<Remark>();
        StageContext context = StageContext.Plain(1, threads, said.Add);
        faces ??= new FaceSet { FaceOfPoint = new int[scene.Described.Cloud.Count] };
        ContactsRecord contacts = new ContactsStage().Run(new ContactsInput(scene.Described, scene.Classes, faces, baseline ?? []) { Readings = readings ?? [] }, new ContactSettings(), context);
        return (contacts, new WidthStage().Run(new WidthInput(scene.Described, scene.Classes, contacts), new WidthSettings(), context), said);
    }
}
