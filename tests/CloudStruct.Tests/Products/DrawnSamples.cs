using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Drawings;

namespace CloudStruct.Tests.Products;

/// <summary>Findings with a surface wide enough for a map, and what the stage drawings makes of them.</summary>
internal static class DrawnSamples
{
    /// <summary>The sample dike on a tilted, coloured square of rock; its first face has an L-shaped outline.</summary>
    public static Findings Findings()
    {
        Findings f = Samples.Dike();
        const int side = 60;
        const float step = 0.25f;
        float[] x = new float[side * side], y = new float[x.Length], z = new float[x.Length];
        for (int i = 0; i < x.Length; i++) (x[i], y[i], z[i]) = ((i % side * step) - 7, (i / side * step) - 7, 0.1f * (i % side * step));
        byte[] bright = [.. x.Select((_, i) => (byte)(80 + (i % 100)))];
        var cloud = new WorkingCloud
        {
            Frame = f.Intake.Frame,
            X = x,
            Y = y,
            Z = z,
            Red = bright,
            Green = [.. bright.Select(b => (byte)(b / 2))],
            Blue = [.. bright.Select(b => (byte)(b / 4))],
            SpacingM = step,
            Grid = new SortedGrid { MinX = -7, MinY = -7, CellM = 1, NX = 15, NY = 15, NZ = 2 },
        };
        Vec3 n = new Vec3(-0.1, 0, 1).Unit();
        Face[] faces = [.. f.Faces.Faces.Select(a => a with { Normal = a.Attitude.UpwardNormal(f.Intake.Frame.TurnDeg) })];
        faces[0] = faces[0] with { Outline = Ell(faces[0]) };
        return f with
        {
            Described = new DescribedCloud
            {
                Cloud = cloud,
                NormalX = [.. x.Select(_ => (float)n.X)],
                NormalY = [.. x.Select(_ => (float)n.Y)],
                NormalZ = [.. x.Select(_ => (float)n.Z)],
            },
            Faces = f.Faces with { Faces = faces, FaceOfPoint = [] },
            Classes = f.Classes with { Class = [] },
            Width = f.Width with { Stations = [.. f.Width.Stations.Select((s, i) => i < 3 ? s with { AtA = OnMargin(s.ChainageM, -1), AtB = OnMargin(s.ChainageM, 1) } : s)] },
            Sets = f.Sets with { Sets = [.. f.Sets.Sets.Select(s => s with { Normal = s.Mean.UpwardNormal(), Cone95Deg = 4 })] },
            Contacts = f.Contacts with
            {
                Contacts = [.. f.Contacts.Contacts.Select(c => c with { Normal = c.Attitude?.UpwardNormal(f.Intake.Frame.TurnDeg) })],
                Traces = [Trace(Margin.A, 0, 3), Trace(Margin.A, 4, 5), Trace(Margin.B, 0, 5)],
            },
        };
    }

    /// <summary>What is drawn of them.</summary>
    public static DrawingsRecord Drawn(Findings findings) => new DrawingsStage().Run(findings, new DrawingSettings(), StageContext.Plain());

    private static Vec3 OnMargin(double chainage, int side) =>
        new((chainage + side) * Math.Sqrt(0.5), (chainage - side) * Math.Sqrt(0.5), 0);

    // A metre to either side of a line toward the north-east.
    private static MarginTrace Trace(Margin margin, double from, double to)
    {
        double side = (margin == Margin.A ? -1 : 1) * Math.Sqrt(0.5);
        double[] chainage = [.. Enumerable.Range(0, 9).Select(i => from + ((to - from) * i / 8))];
        return new MarginTrace(1, margin, [.. chainage.Select(c => new Vec3((c * Math.Sqrt(0.5)) + side, (c * Math.Sqrt(0.5)) - side, 0.2 * Math.Sin(c)))], chainage, [.. chainage.Select(_ => 0.02)]);
    }

    // Six corners about the middle, on the plane: 3 of 4 quarters of a square of 2 m.
    private static Vec3[] Ell(Face face)
    {
        Vec3 along = face.Normal.Cross(Vec3.Up).Unit(), up = face.Normal.Cross(along);
        (double U, double V)[] corners = [(-1, -1), (1, -1), (1, 0), (0, 0), (0, 1), (-1, 1), (-1, -1)];
        return [.. corners.Select(c => face.Middle + (along * c.U) + (up * c.V))];
    }
}
