using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Planar;

/// <summary>Closed rings in the plane.</summary>
public static class Ring
{
    /// <summary>Whether a place lies inside the outer ring and outside the holes, by the parity of crossings.</summary>
    /// <param name="rings">Outer ring first, then holes, each closed (first vertex equals last); z is not looked at.</param>
    /// <param name="x">Place.</param>
    /// <param name="y">Place.</param>
    /// <remarks>A place exactly on an edge belongs to one of the two sides, the same one each time, so that polygons that
    /// share an edge never both hold it. Overlapping rings follow parity.</remarks>
    public static bool Holds(Vec3[][] rings, double x, double y)
    {
        bool inside = false;
        foreach (Vec3[] ring in rings)
        {
            for (int i = 0; i + 1 < ring.Length; i++)
            {
                Vec3 a = ring[i], b = ring[i + 1];
                if (a.Y > y == b.Y > y) continue;
                if (x < a.X + ((y - a.Y) / (b.Y - a.Y) * (b.X - a.X))) inside = !inside;
            }
        }

        return inside;
    }
}
