using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Density contours of axes on the net.</summary>
/// <remarks>The density is taken at equal steps of the net itself, so that all nodes stand for equal areas of the hemisphere.
/// The grid reaches over the primitive: there a node stands for the axis whose lower end lies opposite, so that curves meet
/// across the rim without any seam to mend. Only then they are cut at radius 1.</remarks>
public sealed class NetContours
{
    // Steps from the middle to the rim: the narrowest kernel falls to 1/e over six of them.
    private const int Steps = 60;
    private const int Columns = (2 * (Steps + 2)) + 1;

    private readonly double[] excess;

    private NetContours(double[] excess, double highest) => (this.excess, Highest) = (excess, highest);

    /// <summary>Highest density at a node within the primitive [standard deviations above uniform].</summary>
    public double Highest { get; }

    /// <summary>Density on the grid.</summary>
    /// <param name="axes">Unit vectors of either sign, grid frame; at least 1.</param>
    /// <param name="density">The counting kernel.</param>
    /// <param name="threads">Workers; never changes a result.</param>
    /// <param name="stop">Cancels.</param>
    /// <param name="weights">One an axis; null counts all alike.</param>
    public static NetContours Of(Vec3[] axes, SmoothDensity density, int threads, CancellationToken stop, double[]? weights = null)
    {
        double[] excess = new double[Columns * Columns];
        BlockParallel.For(Columns, threads, stop, (from, to) =>
        {
            for (int i = from * Columns; i < to * Columns; i++)
            {
                Point2 p = Place(i % Columns, i / Columns);

                // Two steps past the rim are enough for the curves to cross it.
                excess[i] = Math.Sqrt((p.X * p.X) + (p.Y * p.Y)) > 1 + (2.0 / Steps)
                    ? double.NaN
                    : weights is null ? density.Excess(axes, EqualAreaNet.Direction(p)) : density.Excess(axes, weights, EqualAreaNet.Direction(p));
            }
        }, 8);

        double highest = double.NegativeInfinity;
        for (int i = 0; i < excess.Length; i++)
        {
            Point2 p = Place(i % Columns, i / Columns);
            if ((p.X * p.X) + (p.Y * p.Y) <= 1) highest = Math.Max(highest, excess[i]);
        }

        return new NetContours(excess, highest);
    }

    /// <summary>Curves of one level, cut at the primitive and turned to the stated north.</summary>
    /// <param name="level">Standard deviations above uniform.</param>
    /// <param name="turnDeg">Degrees from grid to the stated north.</param>
    public IReadOnlyList<Point2[]> Curves(double level, double turnDeg = 0)
    {
        var curves = new List<Point2[]>();
        foreach (Point2[] onGrid in LevelCurves.Trace(excess, Columns, level))
        {
            Point2[] line = [.. onGrid.Select(p => Place(p.X, p.Y))];

            // Past the rim a closed curve may be open, cut by the NaN ring; it is inside that matters.
            foreach (Point2[] piece in NetCurves.CutAtPrimitive(line))
            {
                curves.Add(turnDeg == 0 ? piece : [.. piece.Select(p => EqualAreaNet.Turned(p, turnDeg))]);
            }
        }

        return curves;
    }

    /// <summary>Levels for a drawing: equal steps of 2, 4, 8, ... standard deviations, the smallest with at most six levels
    /// below the highest density; none when uniform axes would do as well.</summary>
    public double[] Levels()
    {
        double step = 2;
        while (Highest / step > 7) step *= 2;
        var levels = new List<double>();
        for (double l = step; l < Highest; l += step) levels.Add(l);
        return [.. levels];
    }

    private static Point2 Place(double column, double row) =>
        new((column - (Steps + 2)) / Steps, (row - (Steps + 2)) / Steps);
}
