using System.Text.Json;

namespace CloudStruct.Tests.Kit;

/// <summary>The Khronos validator of glTF, from npm ("gltf-validator"), kept in the temporary folder of the machine.</summary>
internal static class GltfValidator
{
    private static readonly string Folder = Path.Combine(Path.GetTempPath(), "cloudstruct-gltf-validator");

    private const string Script = """
        const v = require('gltf-validator'), fs = require('fs');
        v.validateBytes(new Uint8Array(fs.readFileSync(process.argv[2]))).then(r => console.log(JSON.stringify(r)));
        """;

    /// <summary>Why it cannot be asked; empty when it can.</summary>
    public static string Missing { get; } = Prepare();

    /// <summary>The report on a file.</summary>
    public static JsonElement Check(string file)
    {
        (int exit, string said, string error) = Tool.Run(Folder, "node", "check.js", file);
        Assert.True(exit == 0, error);
        return JsonDocument.Parse(said).RootElement;
    }

    private static string Prepare()
    {
        if (!Tool.Has("node")) return "node is not installed here: the glTF validator is not asked";
        Directory.CreateDirectory(Folder);
        if (!Directory.Exists(Path.Combine(Folder, "node_modules", "gltf-validator")))
        {
            if (!Tool.Has("npm")) return "npm is not installed here: the glTF validator cannot be fetched";
            (int exit, string _, string _) = Tool.Run(Folder, "npm", "install", "--prefix", Folder, "--no-audit", "--no-fund", "gltf-validator@2.0.0-dev.3.10");
            if (exit != 0) return "npm could not fetch gltf-validator";
        }

        File.WriteAllText(Path.Combine(Folder, "check.js"), Script);
        return "";
    }
}
