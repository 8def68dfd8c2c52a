using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Simulate.Rock;

namespace CloudStruct.Simulate.Views;

/// <summary>The camera places of a drone flight: rows looking down, and rows looking obliquely into the steps.</summary>
internal static class Flight
{
    /// <summary>Places the cameras of a plan.</summary>
    public static Camera[] Plan(OutcropPlan plan, Terrain terrain, ulong seed)
    {
        var cameras = new Camera[plan.Cameras];
        int down = plan.Cameras / 2;
        for (int i = 0; i < cameras.Length; i++)
        {
            var dice = new Dice(seed, Purpose.Cameras, (ulong)i);
            bool looksDown = i < down;
            int k = looksDown ? i : i - down, of = looksDown ? down : cameras.Length - down;
            double share = (k + 0.5) / of, side = k % 2 == 0 ? 0.22 : 0.78;
            double a = (share * terrain.LengthM) + dice.Between(-0.7, 0.7), b = (side * terrain.BreadthM) + dice.Between(-0.7, 0.7);
            double ground = terrain.Height(a, b);
            if (looksDown)
            {
                double height = dice.Between(13, 16);
                cameras[i] = new(terrain.Place(a, b, ground + height), Aim(terrain.Place(a, b, ground + height), terrain.Place(a + 0.5, terrain.BreadthM / 2, ground)), 0.95);
            }
            else
            {
                // From downhill and to the side, so that both flanks of buttresses and the under-sides of ledges show.
                double off = k % 2 == 0 ? -dice.Between(5, 9) : dice.Between(5, 9);
                Vec3 at = terrain.Place(a, b, terrain.Height(a, terrain.BreadthM / 2));
                Vec3 from = terrain.Place(a - dice.Between(8, 11), (terrain.BreadthM / 2) + off, Math.Max(at.Z + dice.Between(2, 7), terrain.Height(a - 10, b) + 2.5));
                cameras[i] = new(from, Aim(from, terrain.Place(a, terrain.BreadthM / 2, at.Z)), 0.9);
            }
        }

        return cameras;
    }

    private static Vec3 Aim(Vec3 from, Vec3 at) => (at - from).Unit();
}
