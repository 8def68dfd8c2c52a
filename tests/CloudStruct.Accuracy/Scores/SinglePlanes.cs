using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Accuracy.Scores;

/// <summary>A cloud of single rectangular faces that stand apart: all attitudes, aspects 1 to 6, 0.05 to 5 m², noise along the normal
/// that neighbours share over 5 to 20 cm plus a white part, worn edges. What the region of a face is worth, apart from how
/// well faces are told from each other.</summary>
/// <remarks>The shared noise is a sum of waves whose wave numbers are drawn from the spectrum of the law, so that its covariance is
/// exactly that law: exponential, Matérn 3/2 or Gaussian in turn by seed (spectra in the plane from memory).</remarks>
public sealed class SinglePlanes : IPieces
{
    private const double PitchM = 8, SpacingM = 0.025;
    private const int Waves = 120, Columns = 20;

    private readonly List<Vec3> places = [];
    private Draws scene;

    /// <summary>Draws a scene of so many faces, a third in each size class.</summary>
    public SinglePlanes(ulong seed, int count)
    {
        scene = new Draws(seed, 41, 0);
        Shape = (CorrelationShape)(int)(seed % 3);
        LengthM = Range(0.05, 0.20);
        SharedM = SpacingM * Range(0.15, 0.35);
        WhiteM = SpacingM * Range(0.05, 0.12);
        EdgeRadiusM = Range(0, 0.03);
        Faces = [.. Enumerable.Range(0, count).Select(i => One(seed, i))];
    }

    /// <summary>True faces: middle, upward normal, area [m²], aspect.</summary>
    public (Vec3 Middle, Vec3 Normal, double AreaM2, double Aspect)[] Faces { get; }

    /// <summary>Law of the shared noise.</summary>
    public CorrelationShape Shape { get; }

    /// <summary>Its length [m].</summary>
    public double LengthM { get; }

    /// <summary>Its standard deviation [m].</summary>
    public double SharedM { get; }

    /// <summary>Standard deviation of the white part in each direction [m].</summary>
    public double WhiteM { get; }

    /// <summary>Radius of the worn edges [m].</summary>
    public double EdgeRadiusM { get; }

    /// <inheritdoc/>
    public IntakeRecord Record => new()
    {
        Points = places.Count,
        InputSpacingM = SpacingM,
        BoxMin = new Vec3(-500, -500, -500),
        BoxMax = new Vec3(500, 500, 500),
    };

    /// <summary>The face whose middle is nearest.</summary>
    public int Nearest(Vec3 place)
    {
        int column = (int)Math.Round((place.X / PitchM) + (Columns / 2)), row = (int)Math.Round((place.Y / PitchM) + (Columns / 2));
        return Math.Clamp((row * Columns) + column, 0, Faces.Length - 1);
    }

    /// <inheritdoc/>
    public IEnumerable<PointBlock> Read(CancellationToken stop)
    {
        for (int from = 0; from < places.Count; from += PointBlock.Capacity)
        {
            var block = new PointBlock { Count = Math.Min(PointBlock.Capacity, places.Count - from) };
            for (int i = 0; i < block.Count; i++)
            {
                Vec3 p = places[from + i];
                (block.X[i], block.Y[i], block.Z[i], block.Index[i]) = ((float)p.X, (float)p.Y, (float)p.Z, from + i);
                block.Red[i] = block.Green[i] = block.Blue[i] = block.Class[i] = 0;
            }

            yield return block;
        }
    }

    private (Vec3 Middle, Vec3 Normal, double AreaM2, double Aspect) One(ulong seed, int index)
    {
        var d = new Draws(seed, 42, (ulong)index);
        (double low, double high) = (index % 3) switch { 0 => (0.05, 0.25), 1 => (0.25, 1.0), _ => (1.0, 5.0) };
        double area = low * Math.Pow(high / low, d.NextUnit()), aspect = Math.Pow(6, d.NextUnit());
        double length = Math.Sqrt(area * aspect), height = length / aspect, turn = Math.PI * d.NextUnit();
        var middle = new Vec3(PitchM * ((index % Columns) - (Columns / 2)), PitchM * ((index / Columns) - (Columns / 2)), 0);
        Vec3 n = new Attitude(360 * d.NextUnit(), Math.Acos(d.NextUnit()) * 180 / Math.PI).UpwardNormal();
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(n);
        Vec3 e1 = (along * Math.Cos(turn)) + (down * Math.Sin(turn)), e2 = n.Cross(e1);
        (double K, double L, double Phase)[] waves = [.. Enumerable.Range(0, Waves).Select(_ =>
        {
            double k = WaveNumber(ref d), at = 2 * Math.PI * d.NextUnit();
            return (k * Math.Cos(at), k * Math.Sin(at), 2 * Math.PI * d.NextUnit());
        })];
        int points = (int)Math.Round(area / (SpacingM * SpacingM) * 1.6);   // thinning takes the surplus away
        for (int i = 0; i < points; i++)
        {
            double u = length * (d.NextUnit() - 0.5), v = height * (d.NextUnit() - 0.5), z = 0;
            foreach ((double k, double l, double phase) in waves) z += Math.Cos((k * u) + (l * v) + phase);
            double edge = Math.Min((length / 2) - Math.Abs(u), (height / 2) - Math.Abs(v)), x = EdgeRadiusM - edge;
            double worn = x > 0 ? EdgeRadiusM - Math.Sqrt(Math.Max(0, (EdgeRadiusM * EdgeRadiusM) - (x * x))) : 0;
            z = (SharedM * Math.Sqrt(2.0 / Waves) * z) - worn;
            places.Add(middle + (e1 * u) + (e2 * v) + (n * z) + (new Vec3(d.NextNormal(), d.NextNormal(), d.NextNormal()) * WhiteM));
        }

        return (middle, n, area, aspect);
    }

    // Inverse of the share of the spectrum below a wave number, in the plane: exponential 1 - (1 + k²L²)^(-1/2); Matérn 3/2
    // 1 - (1 + k²L²/3)^(-3/2); Gaussian 1 - exp(-k²L²/4).
    private double WaveNumber(ref Draws d)
    {
        double q = 1 - d.NextUnit();
        return Shape switch
        {
            CorrelationShape.Exponential => Math.Sqrt((1 / (q * q)) - 1) / LengthM,
            CorrelationShape.Matern32 => Math.Sqrt(3 * (Math.Pow(q, -2.0 / 3) - 1)) / LengthM,
            _ => 2 * Math.Sqrt(-Math.Log(q)) / LengthM,
        };
    }

    private double Range(double low, double high) => low + ((high - low) * scene.NextUnit());
}
