using System.Diagnostics;

namespace CloudStruct.Tests.Kit;

/// <summary>Programs of the machine that tests ask for a second opinion.</summary>
internal static class Tool
{
    /// <summary>Whether a program is found where the shell looks.</summary>
    public static bool Has(string name) =>
        (Environment.GetEnvironmentVariable("PATH") ?? "").Split(Path.PathSeparator).Any(folder => folder.Length > 0 && File.Exists(Path.Combine(folder, name)));

    /// <summary>Runs a program to its end.</summary>
    public static (int Exit, string Out, string Error) Run(string folder, string name, params string[] arguments)
    {
        var start = new ProcessStartInfo(name, arguments) { WorkingDirectory = folder, RedirectStandardOutput = true, RedirectStandardError = true };
        using Process process = Process.Start(start)!;
        Task<string> error = process.StandardError.ReadToEndAsync();
        string said = process.StandardOutput.ReadToEnd();
        process.WaitForExit();
        return (process.ExitCode, said, error.Result);
    }
}
