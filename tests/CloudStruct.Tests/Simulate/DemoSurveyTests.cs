using System.Globalization;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Tests.Simulate;

public class DemoSurveyTests
{
    private static readonly DemoSurvey Made = DemoSurvey.Make(31, 20_000);
    private readonly DemoSurvey survey = Made;

    [Fact]
    public void Tiles_hold_every_point_once_and_overlap()
    {
        Assert.Equal(2, survey.Tiles.Length);
        Assert.Equal(Enumerable.Range(0, survey.Outcrop.Count), survey.Tiles.SelectMany(t => t.PointOf).Order());
        double[] along = [.. Enumerable.Range(0, survey.Outcrop.Count).Select(Uphill)];
        double lowerTop = survey.Tiles[0].PointOf.Max(i => along[i]), upperFoot = survey.Tiles[1].PointOf.Min(i => along[i]);
        Assert.InRange(lowerTop - upperFoot, 2.8, 3.0);
    }

    [Fact]
    public void Second_tile_lies_too_high_by_the_stated_offset()
    {
        DemoTile second = survey.Tiles[1];
        var block = second.Source.Read(CancellationToken.None).First();
        for (int k = 0; k < 100; k++) Assert.Equal(survey.Outcrop.Z[second.PointOf[k]] + DemoSurvey.TileOffsetM, block.Z[k], 1e-9);
        block.Dispose();
        Assert.Equal(0, survey.Tiles[0].ShiftZM);
    }

    [Fact]
    public void Check_labels_name_the_true_class()
    {
        string[] lines = survey.Files.Single(f => f.Path == "labels/check.csv").Text.TrimEnd('\n').Split('\n');
        Assert.Equal("x_m,y_m,z_m,class,use", lines[0]);
        Assert.True(lines.Length > 60);
        Assert.Contains(lines, l => l.Contains(",dike,", StringComparison.Ordinal));
        SimulatedDike dike = survey.Outcrop.Dikes[0];
        foreach (string[] cells in lines.Skip(1).Select(l => l.Split(',')))
        {
            double[] p = [.. cells.Take(3).Select(c => double.Parse(c, CultureInfo.InvariantCulture))];
            Assert.Equal("check", cells[4]);
            RockClass kind = Enum.Parse<RockClass>(cells[3], ignoreCase: true);
            if (kind is RockClass.Host or RockClass.Dike) Assert.Equal(kind == RockClass.Dike, dike.Contains(new Vec3(p[0], p[1], p[2])));
        }
    }

    private double Uphill(int i)
    {
        double azimuth = survey.Outcrop.UphillDeg * Math.PI / 180;
        Vec3 p = survey.Outcrop.Place(i) - survey.Outcrop.Origin;
        return (p.X * Math.Sin(azimuth)) + (p.Y * Math.Cos(azimuth));
    }
}
