using System.Numerics;

namespace CloudStruct.Maths.Kernels;

/// <summary>Points near a vertical plane.</summary>
public static class VerticalSlice
{
    /// <summary>Indices of the points with |(x - x0) dx + (y - y0) dy| ≤ half and |(x - x0) dy - (y - y0) dx| ≤ reach, ascending.</summary>
    /// <param name="x">East.</param>
    /// <param name="y">North, as long as x.</param>
    /// <param name="x0">A place on the plane.</param>
    /// <param name="y0">A place on the plane.</param>
    /// <param name="dx">Level unit normal of the plane.</param>
    /// <param name="dy">Level unit normal of the plane.</param>
    /// <param name="half">Half the thickness of the slice, in the unit of x.</param>
    /// <param name="reach">Farthest along the plane from the place.</param>
    /// <param name="found">[out] Indices are added.</param>
    /// <remarks>Most points lie in no slice, so that lanes are looked at one by one only where one of them lies within half.
    /// The test is made again for the single point in the same order of operations: lane and tail agree.</remarks>
    public static void Find(
        ReadOnlySpan<float> x, ReadOnlySpan<float> y, float x0, float y0, float dx, float dy, float half, float reach, List<int> found)
    {
        int i = 0, lanes = Vector<float>.Count;
        var (vx0, vy0, vdx, vdy, vhalf) = (new Vector<float>(x0), new Vector<float>(y0), new Vector<float>(dx), new Vector<float>(dy), new Vector<float>(half));
        for (; i <= x.Length - lanes; i += lanes)
        {
            Vector<float> off = ((new Vector<float>(x[i..]) - vx0) * vdx) + ((new Vector<float>(y[i..]) - vy0) * vdy);
            if (!Vector.LessThanOrEqualAny(Vector.Abs(off), vhalf)) continue;
            for (int k = i; k < i + lanes; k++) Test(x, y, x0, y0, dx, dy, half, reach, k, found);
        }

        for (; i < x.Length; i++) Test(x, y, x0, y0, dx, dy, half, reach, i, found);
    }

    private static void Test(
        ReadOnlySpan<float> x, ReadOnlySpan<float> y, float x0, float y0, float dx, float dy, float half, float reach, int i, List<int> found)
    {
        float off = ((x[i] - x0) * dx) + ((y[i] - y0) * dy), along = ((x[i] - x0) * dy) - ((y[i] - y0) * dx);
        if (MathF.Abs(off) <= half && MathF.Abs(along) <= reach) found.Add(i);
    }
}
