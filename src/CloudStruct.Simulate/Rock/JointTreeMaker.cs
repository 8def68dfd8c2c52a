using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Rock;

/// <summary>Cuts a rock mass into blocks: the widest piece, measured in spacings, is cut first.</summary>
/// <remarks>
/// Pieces are known by random places strewn in the rock; their extent along a set's normal decides what is cut. With the law
/// "random" a piece lives for an exponential time whose rate is its extent in spacings, and is then cut at a uniform place: the
/// tessellation stable under iteration (Nagel and Weiss 2005, from memory), whose planes a line meets at negative-exponential distances.
/// </remarks>
internal sealed class JointTreeMaker
{
    /// <summary>Fewest places in a piece: with fewer its extent means nothing.</summary>
    private const int FewestPlaces = 8;

    private readonly Set[] sets;
    private readonly Vec3[] places;
    private readonly ulong seed;
    private readonly Purpose purpose;
    private readonly List<JointTree.Node> nodes = [];
    private readonly List<JointTree.Block> blocks = [];
    private readonly Func<Vec3, bool> present;

    private JointTreeMaker(Set[] sets, Vec3[] places, ulong seed, Purpose purpose, Func<Vec3, bool> present)
    {
        this.sets = sets;
        this.places = places;
        this.seed = seed;
        this.purpose = purpose;
        this.present = present;
    }

    /// <summary>Makes a tree.</summary>
    /// <param name="sets">Joint sets.</param>
    /// <param name="places">Random places in the rock, dense where blocks matter; reordered.</param>
    /// <param name="seed">Seed of the outcrop.</param>
    /// <param name="purpose">Stream of random numbers.</param>
    /// <param name="present">Whether a block whose middle is here is still there.</param>
    public static JointTree Make(Set[] sets, Vec3[] places, ulong seed, Purpose purpose, Func<Vec3, bool> present)
    {
        var maker = new JointTreeMaker(sets, places, seed, purpose, present);
        maker.Cut(0, places.Length, 1, 1);
        return new JointTree([.. maker.nodes], [.. maker.blocks]);
    }

    /// <summary>Cuts the piece of places [from, to) and gives its node, or ~block when it stays whole.</summary>
    private int Cut(int from, int to, ulong path, double time)
    {
        var dice = new Dice(seed, purpose, path);
        bool random = sets.Length > 0 && sets[0].Law == SpacingLaw.Random;
        int best = to - from < 2 * FewestPlaces ? -1 : random ? Random(from, to, ref dice, ref time) : Widest(from, to, ref dice);
        if (best < 0) return Whole(from, to, ref dice);
        for (int attempt = 0; attempt < 4; attempt++)
        {
            Vec3 n = dice.Fisher(sets[best].Pole, sets[best].Kappa);
            (double min, double max) = Extent(from, to, n);
            double margin = random ? 0 : 0.25, offset = min + ((max - min) * dice.Between(margin, 1 - margin));
            int middle = Partition(from, to, n, offset);
            if (middle - from < FewestPlaces || to - middle < FewestPlaces) continue;
            int node = nodes.Count;
            nodes.Add(default);
            int below = Cut(from, middle, Dice.Scramble(path * 2), time), above = Cut(middle, to, Dice.Scramble((path * 2) + 1), time);
            nodes[node] = new(n.X, n.Y, n.Z, offset, below, above, best);
            return node;
        }

        return Whole(from, to, ref dice);
    }

    /// <summary>The set in whose spacings the piece is widest, -1 when it is narrow enough.</summary>
    private int Widest(int from, int to, ref Dice dice)
    {
        int best = -1;
        double bestRatio = 1;
        for (int k = 0; k < sets.Length; k++)
        {
            (double min, double max) = Extent(from, to, sets[k].Pole);
            // The wish varies from piece to piece: spacings scatter as those of real joints do.
            double wish = sets[k].Law == SpacingLaw.Lognormal ? 1.45 * Math.Exp(0.6 * dice.Normal()) : dice.Between(1.0, 2.1);
            double ratio = (max - min) / (sets[k].SpacingM * wish);
            if (ratio > bestRatio) (best, bestRatio) = (k, ratio);
        }

        return best;
    }

    /// <summary>The set that cuts the piece when its time comes before the end, else -1.</summary>
    private int Random(int from, int to, ref Dice dice, ref double time)
    {
        Span<double> rate = stackalloc double[sets.Length];
        double all = 0;
        for (int k = 0; k < sets.Length; k++)
        {
            (double min, double max) = Extent(from, to, sets[k].Pole);
            all += rate[k] = (max - min) / sets[k].SpacingM;
        }

        time += Math.Log(1 - dice.Unit()) / all;
        if (time <= 0) return -1;
        double lot = dice.Unit() * all;
        for (int k = 0; k < sets.Length - 1; k++)
        {
            lot -= rate[k];
            if (lot < 0) return k;
        }

        return sets.Length - 1;
    }

    private int Whole(int from, int to, ref Dice dice)
    {
        Vec3 sum = default;
        for (int i = from; i < to; i++) sum += places[i];
        Vec3 middle = sum / (to - from);
        blocks.Add(new(middle, present(middle + new Vec3(0, 0, 0.12 * dice.Normal())), dice.Bits()));
        return ~(blocks.Count - 1);
    }

    private (double Min, double Max) Extent(int from, int to, Vec3 n)
    {
        double min = double.PositiveInfinity, max = double.NegativeInfinity;
        for (int i = from; i < to; i++)
        {
            double d = n.Dot(places[i]);
            if (d < min) min = d;
            if (d > max) max = d;
        }

        return (min, max);
    }

    /// <summary>Brings places below a plane to the front.</summary>
    private int Partition(int from, int to, Vec3 n, double offset)
    {
        int i = from, j = to - 1;
        while (i <= j)
        {
            if (n.Dot(places[i]) <= offset)
            {
                i++;
            }
            else
            {
                (places[i], places[j]) = (places[j], places[i]);
                j--;
            }
        }

        return i;
    }

    /// <summary>A joint set as drawn.</summary>
    /// <param name="Pole">Mean unit normal.</param>
    /// <param name="Kappa">Fisher concentration.</param>
    /// <param name="SpacingM">Mean distance [m].</param>
    /// <param name="Law">How distances scatter; one law for all sets of a rock.</param>
    internal readonly record struct Set(Vec3 Pole, double Kappa, double SpacingM, SpacingLaw Law = SpacingLaw.Even);
}
