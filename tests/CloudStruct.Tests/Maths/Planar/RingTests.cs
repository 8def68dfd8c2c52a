using CloudStruct.Maths.Planar;
using CloudStruct.Records.Frame;

namespace CloudStruct.Tests.Maths.Planar;

public sealed class RingTests
{
    private static Vec3[] Square(double from, double to) =>
        [new(from, from, 0), new(to, from, 0), new(to, to, 0), new(from, to, 0), new(from, from, 0)];

    [Fact]
    public void Inside_outside_and_hole()
    {
        Vec3[][] rings = [Square(0, 10), Square(4, 6)];
        Assert.True(Ring.Holds(rings, 1, 5));
        Assert.False(Ring.Holds(rings, 5, 5));
        Assert.False(Ring.Holds(rings, 11, 5));
        Assert.False(Ring.Holds(rings, 5, -1));
    }

    [Fact]
    public void A_shared_edge_belongs_to_one_polygon_only()
    {
        Vec3[][] left = [[new(0, 0, 0), new(5, 0, 0), new(5, 5, 0), new(0, 5, 0), new(0, 0, 0)]];
        Vec3[][] right = [[new(5, 0, 0), new(9, 0, 0), new(9, 5, 0), new(5, 5, 0), new(5, 0, 0)]];
        Assert.True(Ring.Holds(left, 5, 2) ^ Ring.Holds(right, 5, 2));
    }
}
