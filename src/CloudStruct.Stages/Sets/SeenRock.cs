using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;

namespace CloudStruct.Stages.Sets;

/// <summary>The rock of a domain that was seen, in the whole survey or in a zone.</summary>
/// <param name="Rock">Per point: a face of the domain that it lies on, 0-based, or -1.</param>
/// <param name="Surface">The same in cubes.</param>
/// <param name="Grid">The same by place.</param>
internal sealed record SeenRock(int[] Rock, SurfaceCells Surface, RockGrid Grid)
{
    /// <summary>From the faces of a domain.</summary>
    /// <param name="input">The stage's input.</param>
    /// <param name="members">Indices of the faces of the domain.</param>
    /// <param name="zone">Zone, or null for the whole survey.</param>
    public static SeenRock Of(SetsInput input, int[] members, Zone? zone)
    {
        WorkingCloud cloud = input.Described.Cloud;
        bool[] inDomain = new bool[input.Faces.Faces.Length];
        foreach (int m in members) inDomain[m] = true;
        int[] rock = new int[Math.Min(input.Faces.FaceOfPoint.Length, cloud.Count)];
        for (int i = 0; i < rock.Length; i++)
        {
            int face = input.Faces.FaceOfPoint[i] - 1;
            bool inside = face >= 0 && inDomain[face] && (zone is null || ZonePlaces.Holds(zone, input.Frame.ToMap(cloud.Place(i))));
            rock[i] = inside ? face : -1;
        }

        return new SeenRock(rock, SurfaceCells.Of(cloud, input.Described.AreaM2, rock), new RockGrid(cloud, rock));
    }
}
