using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Maths.Rates;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Sets;

/// <summary>The rock that was seen, in cubes wider than its blocks: how the ground as a whole lies there, not its faces.</summary>
/// <param name="Cells">The cubes that hold enough rock, in order of place.</param>
internal sealed record SurfaceCells(SurfaceCells.Cell[] Cells)
{
    /// <summary>Side of a cube [m]: a few blocks.</summary>
    public const double SideM = 2.5;

    private const int FewestPoints = 40;

    // Planes that nowhere make more than this angle with the surface could not have been seen on it.
    private static readonly double BlindSine = Math.Sin(10 * Math.PI / 180);

    /// <summary>Surface of the points given.</summary>
    /// <param name="cloud">The cloud.</param>
    /// <param name="areaM2">Surface that each point stands for; empty: all alike.</param>
    /// <param name="rock">Per point: a face of the domain that it lies on, 0-based, or -1.</param>
    public static SurfaceCells Of(WorkingCloud cloud, float[] areaM2, int[] rock)
    {
        var cells = new SortedDictionary<(int X, int Y, int Z), List<int>>();
        for (int i = 0; i < rock.Length; i++)
        {
            if (rock[i] < 0) continue;
            var key = ((int)Math.Floor(cloud.X[i] / SideM), (int)Math.Floor(cloud.Y[i] / SideM), (int)Math.Floor(cloud.Z[i] / SideM));
            if (!cells.TryGetValue(key, out List<int>? own)) cells[key] = own = [];
            own.Add(i);
        }

        var result = new List<Cell>();
        foreach (List<int> own in cells.Values)
        {
            if (own.Count < FewestPoints) continue;
            Vec3 middle = default;
            foreach (int i in own) middle += cloud.Place(i);
            middle *= 1.0 / own.Count;
            var scatter = default(Symmetric3);
            double area = 0;
            foreach (int i in own)
            {
                scatter += Symmetric3.Outer(cloud.Place(i) - middle, 1);
                area += areaM2.Length > i ? areaM2[i] : cloud.SpacingM * cloud.SpacingM;
            }

            result.Add(new Cell([.. own], scatter.Eigen().V3, area));
        }

        return new SurfaceCells([.. result]);
    }

    /// <summary>Mean sine of the angle between planes of a pole and the surface: what part of their area shows as trace; 1 without rock.</summary>
    public double Visibility(Vec3 pole)
    {
        double sum = 0, all = 0;
        foreach (Cell c in Cells)
        {
            sum += c.AreaM2 * pole.Cross(c.Normal).Length;
            all += c.AreaM2;
        }

        return all > 0 ? sum / all : 1;
    }

    /// <summary>Weight of a plane by what the surface can show of its like (Terzaghi), at most ten.</summary>
    public double Weight(Vec3 pole) => Terzaghi.Capped(Visibility(pole));

    /// <summary>Share of all orientations that lie within the blind angle of the whole surface; null without rock.</summary>
    public double? BlindShare()
    {
        if (Cells.Length == 0) return null;
        int blind = 0, all = 0;
        for (int j = -20; j <= 20; j++)
        {
            for (int i = -20; i <= 20; i++)
            {
                var p = new Point2(i / 20.0, j / 20.0);
                if ((p.X * p.X) + (p.Y * p.Y) > 1) continue;
                all++;
                if (Visibility(EqualAreaNet.Direction(p)) < BlindSine) blind++;
            }
        }

        return (double)blind / all;
    }

    /// <summary>One cube.</summary>
    /// <param name="Points">Its rock points.</param>
    /// <param name="Normal">Pole of the plane through them.</param>
    /// <param name="AreaM2">Surface [m²].</param>
    internal sealed record Cell(int[] Points, Vec3 Normal, double AreaM2);
}
