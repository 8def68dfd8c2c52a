using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Sets;

/// <summary>Where rock of a domain was seen, in cubes of a given side.</summary>
internal sealed class RockGrid
{
    private readonly HashSet<(int X, int Y, int Z)> cells = [];
    private readonly double side;

    /// <summary>From the points of a domain.</summary>
    /// <param name="cloud">The cloud.</param>
    /// <param name="rock">Per point: a face of the domain that it lies on, or -1.</param>
    public RockGrid(WorkingCloud cloud, int[] rock)
    {
        side = Math.Max(1e-6, 4 * cloud.SpacingM);
        for (int i = 0; i < rock.Length; i++) if (rock[i] >= 0) cells.Add(Cell(cloud.Place(i)));
    }

    /// <summary>Whether any rock lies within about a distance of a place.</summary>
    public bool Any(Vec3 place, double distanceM)
    {
        (int x0, int y0, int z0) = Cell(place);
        int reach = Math.Max(1, (int)(distanceM / side));
        for (int x = -reach; x <= reach; x++)
        {
            for (int y = -reach; y <= reach; y++)
            {
                for (int z = -reach; z <= reach; z++) if (cells.Contains((x0 + x, y0 + y, z0 + z))) return true;
            }
        }

        return false;
    }

    private (int X, int Y, int Z) Cell(Vec3 p) => ((int)Math.Floor(p.X / side), (int)Math.Floor(p.Y / side), (int)Math.Floor(p.Z / side));
}
