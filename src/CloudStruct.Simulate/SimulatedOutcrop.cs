using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Simulate;

/// <summary>A made outcrop with its truth.</summary>
public sealed record SimulatedOutcrop
{
    /// <summary>Name of the invented place.</summary>
    public string Name { get; init; } = "";

    /// <summary>The plan it is a member of.</summary>
    public OutcropPlan Plan { get; init; } = new();

    /// <summary>The seed that picks the member.</summary>
    public ulong Seed { get; init; }

    /// <summary>East, map coordinates [m]; in a model that is tilted or turned as a whole X, Y and Z are the model's and all truth is the ground's.</summary>
    public double[] X { get; init; } = [];

    /// <summary>North, map coordinates [m].</summary>
    public double[] Y { get; init; } = [];

    /// <summary>Up [m].</summary>
    public double[] Z { get; init; } = [];

    /// <summary>0-255; empty without colour.</summary>
    public byte[] Red { get; init; } = [];

    /// <summary>0-255.</summary>
    public byte[] Green { get; init; } = [];

    /// <summary>0-255.</summary>
    public byte[] Blue { get; init; } = [];

    /// <summary>Number of the true face of each point; 0 on no plane (weathered or rounded rock, planed surface, cover, stray).</summary>
    public int[] TrueFace { get; init; } = [];

    /// <summary>True class of each point (values of <see cref="Records.Classes.RockClass"/>); Unknown for stray points.</summary>
    public byte[] TrueClass { get; init; } = [];

    /// <summary>The dike each point belongs to, clasts in it among them; 0 for none.</summary>
    public byte[] TrueDike { get; init; } = [];

    /// <summary>True faces; Faces[i].Id is i + 1.</summary>
    public SimulatedFace[] Faces { get; init; } = [];

    /// <summary>True dikes in order of their numbers.</summary>
    public SimulatedDike[] Dikes { get; init; } = [];

    /// <summary>Coordinate system.</summary>
    public CrsInfo Crs { get; init; } = CrsInfo.None;

    /// <summary>Map coordinates of the local origin.</summary>
    public Vec3 Origin { get; init; }

    /// <summary>Grid azimuth of uphill [deg].</summary>
    public double UphillDeg { get; init; }

    /// <summary>True mean poles of the joint sets of the host, upward, grid frame.</summary>
    public Vec3[] HostSetPoles { get; init; } = [];

    /// <summary>True mean poles of the joint sets of each dike, upward, grid frame.</summary>
    public Vec3[][] DikeSetPoles { get; init; } = [];

    /// <summary>True mean distance of neighbouring planes of each joint set of the host, along its mean pole, near the surface [m];
    /// NaN where no such line could be laid.</summary>
    public double[] HostSetSpacingM { get; init; } = [];

    /// <summary>Standard deviation of the shared noise of this member [m].</summary>
    public double NoiseM { get; init; }

    /// <summary>Correlation length of that noise (to 1/e) [m].</summary>
    public double NoiseLengthM { get; init; }

    /// <summary>Standard deviation of the white noise in each direction [m].</summary>
    public double WhiteNoiseM { get; init; }

    /// <summary>Mean distance between neighbouring points, from count and seen area [m].</summary>
    public double SpacingM { get; init; }

    /// <summary>Number of points.</summary>
    public int Count => X.Length;

    /// <summary>Place of point i, map coordinates.</summary>
    public Vec3 Place(int i) => new(X[i], Y[i], Z[i]);

    /// <summary>The points as a cloud that can be read like a file.</summary>
    /// <param name="name">File name to show.</param>
    public IPointSource AsSource(string name = "outcrop.las") => new OutcropSource(this, name, null, 0);
}
