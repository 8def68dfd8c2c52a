using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Products;

/// <summary>Compares a text with the approved one beside its test; what was received is left next to the test's binaries.</summary>
internal static class Approved
{
    public static void Check(string received, string file)
    {
        string approved = Repo.Path("tests/CloudStruct.Tests/" + file);
        string left = Path.Combine(AppContext.BaseDirectory, Path.GetFileName(file).Replace(".approved.", ".received.", StringComparison.Ordinal));
        string expected = File.Exists(approved) ? File.ReadAllText(approved).ReplaceLineEndings("\n") : "";
        if (expected != received) File.WriteAllText(left, received);
        Assert.Equal(expected, received);
    }
}
