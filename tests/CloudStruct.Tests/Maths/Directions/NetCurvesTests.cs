using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CsCheck;

namespace CloudStruct.Tests.Maths.Directions;

public class NetCurvesTests
{
    private const double Degree = Math.PI / 180;

    [Fact]
    public void Every_line_of_a_great_circle_lies_in_its_plane() =>
        Gen.Select(Gen.Double[0, 359.9], Gen.Double[0, 90]).Sample((strike, dip) =>
        {
            Vec3 n = new Attitude(strike, dip).UpwardNormal();
            Point2[] curve = NetCurves.GreatCircle(-n);
            foreach (Point2 p in curve)
            {
                Assert.Equal(0, EqualAreaNet.Direction(p).Dot(n), 1e-9);
                Assert.True((p.X * p.X) + (p.Y * p.Y) <= 1 + 1e-12);
            }
        });

    [Fact]
    public void Level_plane_is_the_primitive_and_a_vertical_one_a_straight_line()
    {
        foreach (Point2 p in NetCurves.GreatCircle(Vec3.Up)) Assert.Equal(1, Math.Sqrt((p.X * p.X) + (p.Y * p.Y)), 1e-12);
        foreach (Point2 p in NetCurves.GreatCircle(new Vec3(1, 0, 0))) Assert.Equal(0, p.X, 1e-12);
    }

    [Fact]
    public void The_middle_of_a_great_circle_is_the_line_of_dip()
    {
        Point2[] curve = NetCurves.GreatCircle(new Attitude(30, 40).UpwardNormal(), turnDeg: 2);
        Point2 dip = EqualAreaNet.OfDirection(new TrendPlunge(122, 40).ToVector());
        Assert.Equal(dip.X, curve[45].X, 1e-12);
        Assert.Equal(dip.Y, curve[45].Y, 1e-12);
    }

    [Fact]
    public void Every_place_on_a_cone_lies_at_its_angle_from_the_axis() =>
        Gen.Select(Gen.Double[0, 359.9], Gen.Double[0, 90], Gen.Double[0.1, 89.9]).Sample((trend, plunge, angle) =>
        {
            Vec3 axis = new TrendPlunge(trend, plunge).ToVector();
            foreach (Point2 p in NetCurves.SmallCircle(-axis, angle).SelectMany(c => c))
            {
                // At the rim the crossing is found on the chord between two vertices 5 deg apart: 0.06 deg at most.
                double found = Math.Acos(Math.Min(1, Math.Abs(EqualAreaNet.Direction(p).Dot(axis)))) / Degree;
                Assert.Equal(angle, found, 0.06);
                Assert.True((p.X * p.X) + (p.Y * p.Y) <= 1 + 1e-12);
            }
        });

    [Fact]
    public void A_cone_inside_the_net_is_one_closed_curve_and_one_over_the_rim_is_two_pieces_that_meet()
    {
        Point2[] whole = Assert.Single(NetCurves.SmallCircle(new TrendPlunge(77, 45).ToVector(), 20));
        Assert.Equal(whole[0], whole[^1]);

        IReadOnlyList<Point2[]> cut = NetCurves.SmallCircle(new TrendPlunge(77, 5).ToVector(), 20);
        Assert.Equal(2, cut.Count);
        Point2[] ends = [.. cut.SelectMany(c => new[] { c[0], c[^1] })];
        foreach (Point2 e in ends)
        {
            Assert.Equal(1, Math.Sqrt((e.X * e.X) + (e.Y * e.Y)), 1e-12);
            Assert.Contains(ends, o => Math.Abs(o.X + e.X) < 1e-9 && Math.Abs(o.Y + e.Y) < 1e-9);
        }
    }

    [Fact]
    public void A_line_that_leaves_and_returns_is_cut_on_the_circle()
    {
        IReadOnlyList<Point2[]> pieces = NetCurves.CutAtPrimitive([new(-2, 0.6), new(0, 0.6), new(2, 0.6), new(2, -0.6), new(-2, -0.6)]);
        Assert.Single(pieces);   // the lower crossing has no vertex inside: coarse lines need a vertex to be seen
        Assert.Equal(-0.8, pieces[0][0].X, 1e-12);
        Assert.Equal(0.8, pieces[0][^1].X, 1e-12);
    }

    [Fact]
    public void A_closed_line_cut_once_is_one_piece()
    {
        Point2[] square = [new(0, 0), new(0.5, 0), new(1.5, 0), new(1.5, 0.5), new(0.5, 0.5), new(0, 0.5), new(0, 0)];
        Point2[] piece = Assert.Single(NetCurves.CutAtPrimitive(square));
        Assert.Equal(1, piece[^1].X, 1e-12);
        Assert.Equal(0.5, piece[0].Y, 1e-12);
    }
}
