using static System.FormattableString;

namespace CloudStruct.Runs;

/// <summary>Free space, looked at before work starts.</summary>
internal static class DiskSpace
{
    /// <summary>Refuses when there is not enough.</summary>
    /// <exception cref="MachineException">Too little space; the figures are named.</exception>
    public static void Check(string folder, long bytes, string what)
    {
        if (Has(folder, bytes)) return;
        throw new MachineException(Invariant(
            $"disk: {what} need about {bytes / 1e9:0.0} GB, and {Free(folder) / 1e9:0.0} GB are free where they would go. Free some space, name another --out, or set 'clouds: none' in the recipe."));
    }

    /// <summary>Whether there is enough.</summary>
    public static bool Has(string folder, long bytes) => Free(folder) >= bytes;

    private static long Free(string folder)
    {
        string at = folder;
        while (!Directory.Exists(at) && Path.GetDirectoryName(at) is { Length: > 0 } up) at = up;
        try
        {
            return new DriveInfo(at).AvailableFreeSpace;
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException or ArgumentException)
        {
            return long.MaxValue;   // a share that does not say; the write itself will
        }
    }
}
