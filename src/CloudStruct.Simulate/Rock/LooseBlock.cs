using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Rock;

/// <summary>A fallen block: a skewed box with one corner off.</summary>
internal sealed class LooseBlock
{
    private readonly (Vec3 Normal, double Offset)[] sides;

    /// <summary>Draws a block lying about a place.</summary>
    /// <param name="ground">Where it lies, local.</param>
    /// <param name="sizeM">Largest edge [m].</param>
    /// <param name="dice">Its random numbers.</param>
    public LooseBlock(Vec3 ground, double sizeM, Dice dice)
    {
        double[] half = [sizeM / 2, sizeM * dice.Between(0.3, 0.5), sizeM * dice.Between(0.18, 0.4)];
        Vec3 up = dice.Fisher(Vec3.Up, 8);   // flat side roughly down
        (Vec3 e, Vec3 f) = Axes.Beside(up);
        double turn = dice.Between(0, 2 * Math.PI);
        Vec3 first = (e * Math.Cos(turn)) + (f * Math.Sin(turn)), second = up.Cross(first);
        Middle = ground + new Vec3(0, 0, 0.7 * half[2]);
        ReachM = 1.1 * Math.Sqrt((half[0] * half[0]) + (half[1] * half[1]) + (half[2] * half[2]));
        Vec3[] axes = [first, second, up];
        sides = new (Vec3, double)[7];
        for (int k = 0; k < 6; k++)
        {
            Vec3 n = dice.Fisher(axes[k / 2] * (k % 2 == 0 ? 1 : -1), 60);
            sides[k] = (n, n.Dot(Middle) + half[k / 2]);
        }

        Vec3 corner = ((first * half[0]) + (second * half[1]) + (up * half[2])).Unit();
        sides[6] = (corner, corner.Dot(Middle) + (0.72 * ReachM / 1.1));
    }

    /// <summary>Middle of the block, local.</summary>
    public Vec3 Middle { get; }

    /// <summary>No part of it is farther from its middle [m].</summary>
    public double ReachM { get; }

    /// <summary>Sides: outward unit normal and offset.</summary>
    public IReadOnlyList<(Vec3 Normal, double Offset)> Sides => sides;

    /// <summary>Where a ray enters, and through which side.</summary>
    public bool Cast(Vec3 from, Vec3 toward, double start, double end, out double t, out int side)
    {
        Vec3 d = Middle - from;
        double along = d.Dot(toward), off2 = d.Dot(d) - (along * along);
        (t, side) = (start, -1);
        if (off2 > ReachM * ReachM || along + ReachM < start || along - ReachM > end) return false;
        double leave = end;
        for (int k = 0; k < sides.Length; k++)
        {
            (Vec3 n, double offset) = sides[k];
            double speed = n.Dot(toward), gap = n.Dot(from) - offset;
            if (speed < 0)
            {
                double enter = -gap / speed;
                if (enter > t) (t, side) = (enter, k);
            }
            else if (speed > 0)
            {
                leave = Math.Min(leave, -gap / speed);
            }
            else if (gap > 0)
            {
                return false;
            }
        }

        return side >= 0 && t < leave;
    }

    /// <summary>Distance of a place on one side from the nearest edge [m].</summary>
    public double EdgeDistance(Vec3 p, int side)
    {
        double nearest = double.PositiveInfinity;
        for (int k = 0; k < sides.Length; k++)
        {
            if (k == side) continue;
            double cosine = sides[k].Normal.Dot(sides[side].Normal);
            nearest = Math.Min(nearest, (sides[k].Offset - sides[k].Normal.Dot(p)) / Math.Sqrt(Math.Max(1e-6, 1 - (cosine * cosine))));
        }

        return nearest;
    }
}
