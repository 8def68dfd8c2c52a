using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Simulate.Rock;

namespace CloudStruct.Simulate.Views;

/// <summary>Casts the rays of all cameras: only what at least one of them sees becomes a point, fewer where seen obliquely.</summary>
internal static class Photographs
{
    private const int Block = 8192;

    /// <summary>What the cameras see, in order of camera and pixel.</summary>
    /// <param name="massif">The rock.</param>
    /// <param name="cameras">The flight.</param>
    /// <param name="rays">Rays in all.</param>
    /// <param name="seed">Seed of the outcrop.</param>
    /// <param name="threads">Workers.</param>
    public static Sight[] Take(Massif massif, Camera[] cameras, int rays, ulong seed, int threads)
    {
        int edge = Math.Max(2, (int)Math.Sqrt((double)rays / cameras.Length)), pixels = edge * edge, all = pixels * cameras.Length;
        var parts = new Sight[(all + Block - 1) / Block][];
        var rim = new LatticeField(seed, 60, 1.5);
        Workers.For(all, threads, Block, (from, to) =>
        {
            var crossings = new CrossingList();
            var seen = new List<Sight>();
            for (int i = from; i < to; i++)
            {
                int camera = i / pixels, pixel = i % pixels;
                var dice = new Dice(seed, Purpose.Pixels, (ulong)i);
                double x = ((pixel % edge) + dice.Unit()) * 2 / edge - 1, y = ((pixel / edge) + dice.Unit()) * 2 / edge - 1;
                Vec3 place = cameras[camera].Place, toward = cameras[camera].Ray(x, y);
                if (!massif.Cast(place, toward, 80, crossings, out Hit hit)) continue;
                double slant = -hit.Normal.Dot(toward);
                // Matching fails on surfaces seen edge-on: none beyond 85 deg, half of them at about 77 deg.
                if (slant < 0.09 || (slant < 0.35 && dice.Unit() > (slant - 0.09) / 0.26)) continue;
                Vec3 p = place + (toward * hit.T);
                if (!Inside(massif.Terrain, rim, p)) continue;
                bool back = hit.Kind switch
                {
                    Hit.Kinds.Plane => massif.Trees[hit.Rock].Plane(hit.Surface).Normal.Dot(toward) > 0,
                    Hit.Kinds.Margin => massif.Dikes[hit.Surface / 2].Across.Dot(toward) > 0,
                    _ => false,
                };
                seen.Add(new((float)p.X, (float)p.Y, (float)p.Z, hit.Surface, hit.Kind, (byte)hit.Rock, (byte)camera, back));
            }

            parts[from / Block] = [.. seen];
        });
        return [.. parts.SelectMany(p => p)];
    }

    /// <summary>Surveys end at a ragged line, not at a saw cut.</summary>
    private static bool Inside(Terrain terrain, LatticeField rim, Vec3 p)
    {
        (double a, double b) = terrain.Site(p);
        double inset = 0.5 + (0.18 * rim.At(new(a, b, 0)));
        return a > inset && b > inset && a < terrain.LengthM - inset && b < terrain.BreadthM - inset;
    }
}
