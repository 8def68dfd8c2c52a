using CloudStruct.Formats.Las;
using CloudStruct.Records.Points;
using CloudStruct.Simulate;

namespace CloudStruct.Whole.Kit;

/// <summary>A folder of its own for one test, gone afterwards.</summary>
internal sealed class TempSurvey : IDisposable
{
    /// <summary>The folder.</summary>
    public string Root { get; } = Directory.CreateTempSubdirectory("survey-").FullName;

    /// <summary>Path inside.</summary>
    public string this[string relative] => Path.Combine(Root, relative);

    /// <summary>Writes a text file, with its folders.</summary>
    public void Text(string relative, string text)
    {
        Directory.CreateDirectory(Path.GetDirectoryName(this[relative])!);
        File.WriteAllText(this[relative], text);
    }

    /// <summary>All files below a folder with their bytes' hash, times in run.json taken out.</summary>
    public SortedDictionary<string, string> Hashes(string relative)
    {
        var hashes = new SortedDictionary<string, string>(StringComparer.Ordinal);
        foreach (string file in Directory.GetFiles(this[relative], "*", SearchOption.AllDirectories))
        {
            byte[] bytes = File.ReadAllBytes(file);
            if (Path.GetFileName(file) == "run.json")
            {
                System.Text.Json.Nodes.JsonObject json = System.Text.Json.Nodes.JsonNode.Parse(bytes)!.AsObject();
                Assert.True(json.Remove("timing"));
                bytes = System.Text.Encoding.UTF8.GetBytes(json.ToJsonString());
            }

            hashes[Path.GetRelativePath(this[relative], file)] = Convert.ToHexString(System.Security.Cryptography.SHA256.HashData(bytes));
        }

        return hashes;
    }

    /// <inheritdoc/>
    public void Dispose() => Directory.Delete(Root, recursive: true);
}
