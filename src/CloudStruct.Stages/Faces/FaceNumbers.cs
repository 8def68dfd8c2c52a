using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>Numbers of faces from where they lie and how they are turned, so that a changed setting does not renumber what did
/// not change, as numbers in order of size would.</summary>
/// <remarks>A number is drawn from the cube of the map that the middle lies in and the nearest of thirteen axes to the normal. Faces that
/// share both (the risers of a flight of steps) are told apart by cubes of half the edge, and so on; the larger keeps the number of the
/// wider cube, so that small faces that come and go nearby change nothing. A middle that moves by d changes its number
/// with a chance of about 3 d over the edge of its cube.</remarks>
internal static class FaceNumbers
{
    // Wide, so that a middle seldom crosses a side; not so wide that most faces of a set share one.
    private const double WidestM = 1;
    private const int Halvings = 8;

    /// <summary>Largest number: eight digits can still be read out to somebody.</summary>
    private const int Most = 99_999_999;

    // Of a cube: through its sides, its edges and its corners.
    private static readonly Vec3[] Axes =
    [
        .. new Vec3[]
        {
            new(1, 0, 0), new(0, 1, 0), new(0, 0, 1),
            new(1, 1, 0), new(1, -1, 0), new(1, 0, 1), new(1, 0, -1), new(0, 1, 1), new(0, 1, -1),
            new(1, 1, 1), new(1, 1, -1), new(1, -1, 1), new(1, -1, -1),
        }.Select(a => a.Unit()),
    ];

    /// <summary>A number above 0 for each face, no two alike.</summary>
    /// <param name="faces">By falling area.</param>
    /// <param name="origin">Map coordinates of the local origin.</param>
    public static int[] Of(IReadOnlyList<Face> faces, Vec3 origin)
    {
        var taken = new HashSet<int>();
        var numbers = new int[faces.Count];
        for (int f = 0; f < faces.Count; f++)
        {
            int axis = Nearest(faces[f].Normal);
            Vec3 place = faces[f].Middle + origin;
            double edge = WidestM;
            for (int step = 0; ; step++)
            {
                numbers[f] = Draw(place, edge, axis, Math.Max(0, step - Halvings));
                if (taken.Add(numbers[f])) break;
                if (step < Halvings) edge /= 2;
            }
        }

        return numbers;
    }

    private static int Nearest(Vec3 normal)
    {
        int best = 0;
        for (int a = 1; a < Axes.Length; a++)
        {
            if (Math.Abs(Axes[a].Dot(normal)) > Math.Abs(Axes[best].Dot(normal))) best = a;
        }

        return best;
    }

    // A multiply-and-shift mix of the cell, the axis and the try; even over the numbers to within their count over 2^64.
    private static int Draw(Vec3 place, double edgeM, int axis, int again)
    {
        ReadOnlySpan<long> parts =
        [
            (long)Math.Floor(place.X / edgeM), (long)Math.Floor(place.Y / edgeM), (long)Math.Floor(place.Z / edgeM),
            BitConverter.DoubleToInt64Bits(edgeM), axis, again,
        ];
        unchecked
        {
            ulong mixed = 0x9E3779B97F4A7C15UL;
            foreach (long part in parts)
            {
                mixed = (mixed ^ (ulong)part) * 0xD6E8FEB86659FD93UL;
                mixed ^= mixed >> 32;
            }

            mixed *= 0xD6E8FEB86659FD93UL;
            mixed ^= mixed >> 29;
            return 1 + (int)(mixed % Most);
        }
    }
}
