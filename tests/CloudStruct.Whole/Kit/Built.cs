using System.Diagnostics;

namespace CloudStruct.Whole.Kit;

/// <summary>The built program as a process of its own.</summary>
internal static class Built
{
    /// <summary>What a run ended with.</summary>
    public sealed record Ended(int Code, string Out, string Error);

    /// <summary>Runs to the end.</summary>
    public static Ended Run(string folder, params string[] args)
    {
        using Process p = Start(folder, args);
        return End(p);
    }

    /// <summary>Starts, for tests that interrupt.</summary>
    public static Process Start(string folder, params string[] args)
    {
        var info = new ProcessStartInfo("dotnet") { WorkingDirectory = folder, RedirectStandardOutput = true, RedirectStandardError = true };
        info.ArgumentList.Add(Path.Combine(AppContext.BaseDirectory, "cloudstruct.dll"));
        foreach (string a in args) info.ArgumentList.Add(a);
        return Process.Start(info)!;
    }

    /// <summary>Waits for the end; ten minutes are a hang.</summary>
    public static Ended End(Process p)
    {
        Task<string> output = p.StandardOutput.ReadToEndAsync(), error = p.StandardError.ReadToEndAsync();
        if (!p.WaitForExit(TimeSpan.FromMinutes(10)))
        {
            p.Kill(entireProcessTree: true);
            Assert.Fail("the program hangs");
        }

        return new Ended(p.ExitCode, output.Result, error.Result);
    }
}
