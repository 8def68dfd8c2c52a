using System.Runtime.CompilerServices;

namespace CloudStruct.Tests.Kit;

/// <summary>Paths inside the checkout, so that tests read testdata and source files wherever they run from.</summary>
internal static class Repo
{
    /// <summary>Full path of a file or folder named relative to the root of the checkout.</summary>
    public static string Path(string relative) => System.IO.Path.GetFullPath(System.IO.Path.Combine(Root(), relative));

    private static string Root([CallerFilePath] string here = "") =>
        System.IO.Path.Combine(System.IO.Path.GetDirectoryName(here)!, "..", "..", "..");
}
