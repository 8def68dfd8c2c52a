using CloudStruct.Records.Contacts;

namespace CloudStruct.Stages.Contacts;

/// <summary>The margins over a stretch of strike: q = a + b ds + c ds² + l (t - t0), with a and b per margin, c and l common.</summary>
/// <remarks>Parameters in order: aA, bA, aB, bB, c, l; for one margin alone a, b, c, l. A common l is what "both margins with one
/// common normal and separate centroids" means here; b stays free, so that a taper is no error.</remarks>
internal static class WindowModel
{
    /// <summary>Number of parameters.</summary>
    public static int Parameters(bool both) => both ? 6 : 4;

    /// <summary>Index of the dip parameter l.</summary>
    public static int Tilt(bool both) => both ? 5 : 3;

    /// <summary>Index of the curvature c.</summary>
    public static int Bend(bool both) => both ? 4 : 2;

    /// <summary>Row of the design.</summary>
    public static void Row(Span<double> row, Margin margin, double ds, double dt, bool both)
    {
        row.Clear();
        int at = both && margin == Margin.B ? 2 : 0;
        row[at] = 1;
        row[at + 1] = ds;
        row[Bend(both)] = ds * ds;
        row[Tilt(both)] = dt;
    }
}
