using CloudStruct.Records.Drawings;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Drawings;

/// <summary>Takes one working point per cube, so many as a view in three dimensions can carry.</summary>
internal static class Thinning
{
    private const byte NoColour = 170;

    // A rough surface meets about this many times the cubes of a level one: with it the first count is mostly the last.
    private const double CubesOfRoughRock = 1.5;

    /// <summary>The thinned cloud.</summary>
    /// <param name="input">Cloud, classes and faces.</param>
    /// <param name="most">Points at most.</param>
    public static ThinnedCloud Of(Findings input, int most)
    {
        WorkingCloud cloud = input.Described.Cloud;
        if (cloud.Count == 0 || most <= 0) return new ThinnedCloud();
        double edge = cloud.Count <= most ? 0 : cloud.SpacingM * Math.Sqrt(CubesOfRoughRock * cloud.Count / most);
        int[] kept = edge > 0 ? Kept(cloud, edge) : [.. Enumerable.Range(0, cloud.Count)];

        // How many cubes a rough surface meets is known only after the count.
        while (kept.Length > most)
        {
            edge *= 1.02 * Math.Sqrt((double)kept.Length / most);
            kept = Kept(cloud, edge);
        }

        int[] face = input.Faces.FaceOfPoint;
        byte[] classes = input.Classes.Class, rgb = new byte[3 * kept.Length];
        for (int k = 0; k < kept.Length; k++)
        {
            int i = kept[k];
            (rgb[3 * k], rgb[(3 * k) + 1], rgb[(3 * k) + 2]) = cloud.HasColour ? (cloud.Red[i], cloud.Green[i], cloud.Blue[i]) : (NoColour, NoColour, NoColour);
        }

        return new ThinnedCloud
        {
            X = Of(cloud.X),
            Y = Of(cloud.Y),
            Z = Of(cloud.Z),
            Rgb = rgb,
            Class = classes.Length == cloud.Count ? Of(classes) : [],
            Face = face.Length == cloud.Count ? Of(face) : [],
            SpacingM = Math.Max(edge, cloud.SpacingM),
        };

        T[] Of<T>(T[] column) => Array.ConvertAll(kept, i => column[i]);
    }

    // The first point in each cube, in the order of the grid.
    private static int[] Kept(WorkingCloud cloud, double edge)
    {
        var taken = new HashSet<long>(cloud.Count / 2);
        var kept = new List<int>();
        float minX = cloud.Grid.MinX, minY = cloud.Grid.MinY, minZ = cloud.Grid.MinZ;
        for (int i = 0; i < cloud.Count; i++)
        {
            long x = (long)Math.Floor((cloud.X[i] - minX) / edge), y = (long)Math.Floor((cloud.Y[i] - minY) / edge), z = (long)Math.Floor((cloud.Z[i] - minZ) / edge);
            if (taken.Add((((z & 0xFFFFF) << 20) | (y & 0xFFFFF)) << 20 | (x & 0xFFFFF))) kept.Add(i);
        }

        return [.. kept];
    }
}
