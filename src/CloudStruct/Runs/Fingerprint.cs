using System.Reflection;
using System.Security.Cryptography;
using System.Text;

namespace CloudStruct.Runs;

/// <summary>Content hashes: of files, of settings, and of the code that computes.</summary>
internal static class Fingerprint
{
    /// <summary>Version of the tool as written into every result.</summary>
    public static string Version { get; } =
        typeof(Fingerprint).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()!.InformationalVersion;

    /// <summary>Module ids of our assemblies: a stage that was rebuilt from other source has another one.</summary>
    public static string Code { get; } = OfText(
        typeof(Fingerprint).Assembly.GetReferencedAssemblies()
            .Concat(typeof(CloudStruct.Stages.Intake.IntakeStage).Assembly.GetReferencedAssemblies())
            .Where(n => n.Name!.StartsWith("CloudStruct", StringComparison.Ordinal))
            .Select(n => Assembly.Load(n).ManifestModule.ModuleVersionId.ToString())
            .Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal).ToArray());

    /// <summary>SHA-256 of a file, lower-case hex.</summary>
    public static string OfFile(string path)
    {
        using var stream = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.Read, 1 << 20, FileOptions.SequentialScan);
        return Convert.ToHexStringLower(SHA256.HashData(stream));
    }

    /// <summary>SHA-256 of texts, each with its length before it so that no two lists can look alike.</summary>
    public static string OfText(params string[] texts)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        foreach (string t in texts)
        {
            byte[] bytes = Encoding.UTF8.GetBytes(t);
            hash.AppendData(BitConverter.GetBytes(bytes.Length));
            hash.AppendData(bytes);
        }

        return Convert.ToHexStringLower(hash.GetHashAndReset());
    }
}
