using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;

namespace CloudStruct.Stages.Sets;

/// <summary>What lies in a zone.</summary>
internal static class ZonePlaces
{
    /// <summary>Whether a place lies in a zone, in map view: inside its outer ring and in no hole (even-odd rule over all rings).</summary>
    /// <param name="zone">The zone.</param>
    /// <param name="map">Map coordinates [m].</param>
    public static bool Holds(Zone zone, Vec3 map)
    {
        bool inside = false;
        foreach (Vec3[] ring in zone.Rings)
        {
            for (int i = 0, j = ring.Length - 1; i < ring.Length; j = i++)
            {
                Vec3 a = ring[i], b = ring[j];
                if ((a.Y > map.Y) != (b.Y > map.Y) && map.X < a.X + ((map.Y - a.Y) / (b.Y - a.Y) * (b.X - a.X))) inside = !inside;
            }
        }

        return inside;
    }
}
