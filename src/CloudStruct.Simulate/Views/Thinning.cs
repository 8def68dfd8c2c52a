using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Views;

/// <summary>Merges the photographs into one cloud of a wanted size: the first sight in each small cube stays.</summary>
internal static class Thinning
{
    /// <summary>A plane that lies anyhow passes through 1.5 cubes per area of a cube's side.</summary>
    private const double CubesPerArea = 1.5;

    /// <summary>Sights that stay, in their order: the wanted number, or all when there are fewer.</summary>
    public static Sight[] To(int wanted, Sight[] sights, ulong seed)
    {
        if (sights.Length == 0 || wanted <= 0) return [];
        double area = Occupied(sights, 0.25).Length * 0.25 * 0.25 / CubesPerArea;
        double cube = Math.Sqrt(area * CubesPerArea / wanted);
        int[] kept = Occupied(sights, cube);
        for (int round = 0; round < 6 && kept.Length < wanted; round++)
        {
            cube *= Math.Clamp(Math.Sqrt((double)kept.Length / wanted), 0.5, 0.93);
            kept = Occupied(sights, cube);
        }

        if (kept.Length > wanted)
        {
            // By lot, not by order: the last camera must not lose most.
            ulong[] lots = [.. kept.Select(i => new Dice(seed, Purpose.Keep, (ulong)i).Bits())];
            var sorted = (ulong[])lots.Clone();
            Array.Sort(sorted);
            ulong limit = sorted[wanted];
            kept = [.. kept.Where((_, k) => lots[k] < limit)];
        }

        return [.. kept.Select(i => sights[i])];
    }

    /// <summary>Index of the first sight in each cube, on a lattice that is square to no axis.</summary>
    private static int[] Occupied(Sight[] sights, double cube)
    {
        int size = 1 << 12;
        while (size < 2 * sights.Length) size <<= 1;
        var slots = new ulong[size];
        var kept = new List<int>();
        double k = 1 / (7 * cube);
        for (int i = 0; i < sights.Length; i++)
        {
            Vec3 p = sights[i].Place;
            ulong x = (ulong)(long)Math.Floor(((2 * p.X) + (3 * p.Y) + (6 * p.Z)) * k) & 0x1FFFFF;
            ulong y = (ulong)(long)Math.Floor(((3 * p.X) - (6 * p.Y) + (2 * p.Z)) * k) & 0x1FFFFF;
            ulong z = (ulong)(long)Math.Floor(((6 * p.X) + (2 * p.Y) - (3 * p.Z)) * k) & 0x1FFFFF;
            ulong key = 1 + (x | (y << 21) | (z << 42));
            int slot = (int)(Dice.Scramble(key) & (ulong)(size - 1));
            while (slots[slot] != 0 && slots[slot] != key) slot = (slot + 1) & (size - 1);
            if (slots[slot] == key) continue;
            slots[slot] = key;
            kept.Add(i);
        }

        return [.. kept];
    }
}
