using System.Text.RegularExpressions;
using System.Xml.Linq;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Rules;

/// <summary>The direction of the house: who may use whom. The compiler guards projects; these guard folders and packages.</summary>
public class DirectionTests
{
    private static readonly Dictionary<string, string[]> MayUse = new(StringComparer.Ordinal)
    {
        ["CloudStruct.Records"] = [],
        ["CloudStruct.Maths"] = ["CloudStruct.Records"],
        ["CloudStruct.Formats"] = ["CloudStruct.Records"],
        ["CloudStruct.Simulate"] = ["CloudStruct.Records"],
        ["CloudStruct.Stages"] = ["CloudStruct.Records", "CloudStruct.Maths"],
        ["CloudStruct.Products"] = ["CloudStruct.Records", "CloudStruct.Formats"],
        ["CloudStruct"] = ["CloudStruct.Records", "CloudStruct.Formats", "CloudStruct.Stages", "CloudStruct.Products", "CloudStruct.Simulate"],
    };

    private static readonly Dictionary<string, string[]> Packages = new(StringComparer.Ordinal)
    {
        ["CloudStruct.Records"] = [],
        ["CloudStruct.Maths"] = ["MathNet.Numerics", "NetTopologySuite"],
        ["CloudStruct.Simulate"] = [],
        ["CloudStruct.Stages"] = [],
    };

    public static TheoryData<string> Projects => [.. MayUse.Keys];

    [Theory, MemberData(nameof(Projects))]
    public void A_project_references_only_what_it_may(string project)
    {
        XDocument file = XDocument.Load(Repo.Path($"src/{project}/{project}.csproj"));
        string[] used = [.. file.Descendants("ProjectReference").Select(r => Path.GetFileNameWithoutExtension((string)r.Attribute("Include")!))];
        Assert.Empty(used.Except(MayUse[project]));
        if (Packages.TryGetValue(project, out string[]? packages))
        {
            Assert.Empty(file.Descendants("PackageReference").Select(r => (string)r.Attribute("Include")!).Except(packages));
        }
    }

    [Theory, InlineData("Stages"), InlineData("Formats")]
    public void No_folder_names_a_sibling(string project)
    {
        // Las may use Laz, all may use Bytes and Meshes, and label tables read LAS classes through the door of the project.
        string[] shared = project == "Formats" ? ["Bytes", "Crs", "Meshes"] : [];
        Assert.Empty(
            from folder in Directory.GetDirectories(Repo.Path($"src/CloudStruct.{project}"))
            let own = Path.GetFileName(folder)
            where own is not ("bin" or "obj")
            from file in Directory.GetFiles(folder, "*.cs", SearchOption.AllDirectories)
            from Match m in Regex.Matches(File.ReadAllText(file), $@"CloudStruct\.{project}\.(\w+)")
            let other = m.Groups[1].Value
            where other != own && !shared.Contains(other) && (own, other) != ("Las", "Laz")
            select $"{own}/{Path.GetFileName(file)} names {other}");
    }

    [Fact]
    public void Maths_knows_no_rock_words() => Assert.Empty(
        from file in Sources("src/CloudStruct.Maths")
        from Match m in Regex.Matches(File.ReadAllText(file), @"\b(dike|host rock|margin of|lichen|outcrop)\w*", RegexOptions.IgnoreCase)
        select $"{Path.GetFileName(file)}: {m.Value}");

    [Fact]
    public void Stages_run_in_parallel_only_through_blocks() => Assert.Empty(
        from file in Sources("src/CloudStruct.Stages")
        where Regex.IsMatch(File.ReadAllText(file), @"\bParallel\.|\bTask\.Run|\.AsParallel\(|\bnew Random\(|Random\.Shared|DateTime\.(Utc)?Now|Console\.|File\.")
        select Path.GetFileName(file));

    internal static IEnumerable<string> Sources(string folder) =>
        Directory.GetFiles(Repo.Path(folder), "*.cs", SearchOption.AllDirectories)
            .Where(f => !f.Contains($"{Path.DirectorySeparatorChar}obj{Path.DirectorySeparatorChar}", StringComparison.Ordinal));
}
