using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Simulate.Views;

namespace CloudStruct.Simulate.Rock;

/// <summary>Counts the planes of each joint set along many short lines through the rock that shows.</summary>
internal static class TrueSpacing
{
    private const int Lines = 1500;
    private const double HalfM = 1.5;

    /// <summary>Mean distance of neighbouring planes of each set of the host along its mean pole [m].</summary>
    public static double[] OfHost(Massif massif, Vec3[] poles, Sight[] sights, ulong seed)
    {
        var spacing = new double[poles.Length];
        for (int k = 0; k < poles.Length; k++)
        {
            double length = 0;
            int met = 0;
            for (int i = 0; i < Lines && sights.Length > 0; i++)
            {
                var dice = new Dice(seed, Purpose.Scanlines, (ulong)((k * Lines) + i));
                Sight s = sights[(int)(dice.Unit() * sights.Length)];
                Vec3 middle = s.Place - new Vec3(0, 0, 0.3), half = poles[k] * HalfM;
                if (s.Rock != 0 || Crosses(massif, middle, half)) continue;
                length += 2 * HalfM;
                met += massif.Trees[0].CountCrossings(middle - half, middle + half, k);
            }

            spacing[k] = met > 0 ? length / met : double.NaN;
        }

        return spacing;
    }

    // In a dike the host's joints were never drawn to the same density.
    private static bool Crosses(Massif massif, Vec3 middle, Vec3 half)
    {
        for (double f = -1; f <= 1; f += 0.25)
        {
            if (massif.RockAt(middle + (half * f)) != 0) return true;
        }

        return false;
    }
}
