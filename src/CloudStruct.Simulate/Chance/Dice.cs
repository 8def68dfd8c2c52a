using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate.Chance;

/// <summary>Random numbers from (seed, purpose, item): every item has a stream of its own, so that neither order nor
/// threads matter. Kept apart from Maths: the simulator shares no arithmetic with what it tests.</summary>
/// <remarks>A 64-bit counter through the finaliser of MurmurHash3 (public domain constants, from memory).</remarks>
internal struct Dice
{
    private readonly ulong key;
    private ulong count;

    /// <summary>The stream of one item.</summary>
    public Dice(ulong seed, Purpose purpose, ulong item = 0)
    {
        key = Scramble(Scramble(seed ^ 0x5851F42D4C957F2DUL) + (((ulong)purpose + 1) * 0x9E3779B97F4A7C15UL)) ^ Scramble(item + 0x2545F4914F6CDD1DUL);
        count = 0;
    }

    /// <summary>Next 64 random bits.</summary>
    public ulong Bits() => Scramble(key + (++count * 0x9E3779B97F4A7C15UL));

    /// <summary>Uniform, 0 ≤ u &lt; 1.</summary>
    public double Unit() => (Bits() >> 11) * (1.0 / (1UL << 53));

    /// <summary>Uniform between two values.</summary>
    public double Between(double low, double high) => low + ((high - low) * Unit());

    /// <summary>Uniform within a range.</summary>
    public double In(Span2 range) => Between(range.Low, range.High);

    /// <summary>Standard normal (Box and Muller 1958).</summary>
    public double Normal()
    {
        double radius = Math.Sqrt(-2 * Math.Log(1 - Unit()));
        return radius * Math.Sin(2 * Math.PI * Unit());
    }

    /// <summary>True with a probability.</summary>
    public bool Chance(double probability) => Unit() < probability;

    /// <summary>A direction scattered about a mean direction by Fisher's law.</summary>
    /// <param name="mean">Unit vector.</param>
    /// <param name="kappa">Concentration, above 0.</param>
    public Vec3 Fisher(Vec3 mean, double kappa)
    {
        double cosine = FisherLaw.CosTheta(kappa, Unit()), turn = 2 * Math.PI * Unit();
        double sine = Math.Sqrt(Math.Max(0, 1 - (cosine * cosine)));
        (Vec3 e, Vec3 f) = Axes.Beside(mean);
        return ((mean * cosine) + (e * (sine * Math.Cos(turn))) + (f * (sine * Math.Sin(turn)))).Unit();
    }

    /// <summary>Mixes 64 bits so that every bit of the result depends on every bit given.</summary>
    public static ulong Scramble(ulong z)
    {
        z = (z ^ (z >> 33)) * 0xFF51AFD7ED558CCDUL;
        z = (z ^ (z >> 33)) * 0xC4CEB9FE1A85EC53UL;
        return z ^ (z >> 33);
    }
}
