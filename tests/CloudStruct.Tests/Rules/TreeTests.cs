using System.Text.RegularExpressions;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Rules;

/// <summary>What must not be in the tree.</summary>
public class TreeTests
{
    // Written in pieces, or this file would find itself.
    private static readonly Regex Left = new("TO" + "DO|FIX" + "ME|HA" + "CK|Not" + "ImplementedException");

    [Fact]
    public void Nothing_is_left_to_do() => Assert.Empty(
        from file in DirectionTests.Sources("src").Concat(DirectionTests.Sources("tests"))
        where Left.IsMatch(File.ReadAllText(file))
        select file);

    [Fact]
    public void One_type_a_file_named_like_it() => Assert.Empty(
        from file in DirectionTests.Sources("src")
        let name = Path.GetFileNameWithoutExtension(file).Split('.')[0]
        where name != "Program" && name != "AssemblyInfo"
        let text = File.ReadAllText(file)
        let types = Regex.Matches(text, @"^(?:public |internal |file )?(?:static |sealed |abstract |readonly |partial |ref )*(?:class|record struct|record|struct|interface|enum) (\w+)", RegexOptions.Multiline)
        where types.Count != 1 || types[0].Groups[1].Value != name
        select $"{Path.GetFileName(file)}: {string.Join(", ", types.Select(t => t.Groups[1].Value))}");

    [Fact]
    public void No_file_is_longer_than_five_hundred_lines() => Assert.Empty(
        from file in DirectionTests.Sources("src")
        let lines = File.ReadLines(file).Count()
        where lines > 500
        select $"{Path.GetFileName(file)}: {lines}");
}
