using System.Text;
using CloudStruct.Formats;
using CloudStruct.Records.Complaints;

namespace CloudStruct.Tests.Formats;

public class RefusalTests
{
    [Theory]
    [InlineData("a.las", "", "empty")]
    [InlineData("a.ply", "", "empty")]
    [InlineData("a.las", "LASF", "too short")]
    [InlineData("a.las", "hello world", "something else")]
    [InlineData("a.laz", "hello world", "something else")]
    [InlineData("a.ply", "solid cube", "something else")]
    [InlineData("a.xyz", "hello\n", "not points")]
    [InlineData("a.glb", "glTF\u0002\0\0\0", "glTF")]
    [InlineData("a.gltf", "{}", "glTF")]
    [InlineData("a.las", "PK\u0003\u0004", "archive")]
    [InlineData("a.las", "\0\0\0\0\0\0\0\0", "zeros")]
    [InlineData("a.e57", "ASTM-E57", "E57")]
    [InlineData("a.dat", "what", "not one that is read")]
    public void What_is_not_read_is_refused_in_words(string name, string content, string word)
    {
        using var file = new CloudFile(name, Encoding.Latin1.GetBytes(content));
        var e = Assert.Throws<InputException>(() => CloudFiles.Open(file.Path));
        Assert.Contains(word, e.Message, StringComparison.Ordinal);
        Assert.StartsWith(name, e.Message, StringComparison.Ordinal);
        Assert.DoesNotContain(Path.GetDirectoryName(file.Path)!, e.Message, StringComparison.Ordinal);
        Assert.Throws<InputException>(() => CloudFiles.Inspect(file.Path));
    }

    [Fact]
    public void Missing_files_and_folders_are_refused()
    {
        Assert.Contains("no such file", Assert.Throws<InputException>(() => CloudFiles.Open("/nowhere/at/all.las")).Message, StringComparison.Ordinal);
        Assert.Contains("a folder", Assert.Throws<InputException>(() => CloudFiles.Open(Path.GetTempPath())).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Cloud_names_go_by_extension_in_any_case()
    {
        Assert.True(CloudFiles.IsCloudName("A.LAS"));
        Assert.True(CloudFiles.IsCloudName("b.Ply"));
        Assert.False(CloudFiles.IsCloudName("notes.txt"));
    }
}
