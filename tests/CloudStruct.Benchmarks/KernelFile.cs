using System.Text;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Benchmarks;

/// <summary>A cloud with its truth in one binary PLY: place, colour, normal of the true plane (0 where there is none), number of the true face.</summary>
internal sealed class KernelFile
{
    private static readonly string[] Properties =
    [
        "float x", "float y", "float z", "uchar red", "uchar green", "uchar blue", "float nx", "float ny", "float nz", "int face",
    ];

    private const int RecordBytes = 31;

    private KernelFile(int points)
    {
        Places = new Vec3[points];
        Normals = new Vec3[points];
        Faces = new int[points];
    }

    /// <summary>Places as stored.</summary>
    public Vec3[] Places { get; }

    /// <summary>Unit normals of the true planes, in the order of the file.</summary>
    public Vec3[] Normals { get; }

    /// <summary>Numbers of the true faces; 0 where there is none.</summary>
    public int[] Faces { get; }

    /// <summary>Writes an outcrop like the demonstration, at its density.</summary>
    public static void Write(string path, int points)
    {
        OutcropPlan plan = OutcropPlan.ByName("demo");
        double scale = Math.Sqrt((double)points / plan.Points);
        SimulatedOutcrop rock = Outcrop.Make(plan with { Points = points, LengthM = plan.LengthM * scale, BreadthM = plan.BreadthM * scale }, 77);
        Dictionary<int, Vec3> normals = rock.Faces.ToDictionary(f => f.Id, f => f.Normal);
        using var to = new BinaryWriter(File.Create(path));
        string lines = string.Concat(Properties.Select(p => $"property {p}\n"));
        to.Write(Encoding.ASCII.GetBytes($"ply\nformat binary_little_endian 1.0\nelement vertex {rock.Count}\n{lines}end_header\n"));
        for (int i = 0; i < rock.Count; i++)
        {
            Vec3 p = rock.Place(i) - rock.Origin, n = normals.GetValueOrDefault(rock.TrueFace[i]);
            foreach (double v in new[] { p.X, p.Y, p.Z }) to.Write((float)v);
            to.Write([rock.Red[i], rock.Green[i], rock.Blue[i]]);
            foreach (double v in new[] { n.X, n.Y, n.Z }) to.Write((float)v);
            to.Write(rock.TrueFace[i]);
        }
    }

    /// <summary>The truth in a file that <see cref="Write"/> made; null for any other file.</summary>
    public static KernelFile? Read(string path)
    {
        using var from = new BinaryReader(File.OpenRead(path));
        var head = new StringBuilder();
        while (head.Length < 2000 && !head.ToString().EndsWith("end_header\n", StringComparison.Ordinal)) head.Append((char)from.ReadByte());
        string[] lines = head.ToString().Split('\n');
        if (!lines.Where(l => l.StartsWith("property", StringComparison.Ordinal)).SequenceEqual(Properties.Select(p => "property " + p))) return null;
        int count = (int)((from.BaseStream.Length - from.BaseStream.Position) / RecordBytes);
        var truth = new KernelFile(count);
        for (int i = 0; i < count; i++)
        {
            truth.Places[i] = new Vec3(from.ReadSingle(), from.ReadSingle(), from.ReadSingle());
            from.ReadBytes(3);
            truth.Normals[i] = new Vec3(from.ReadSingle(), from.ReadSingle(), from.ReadSingle());
            truth.Faces[i] = from.ReadInt32();
        }

        return truth;
    }
}
