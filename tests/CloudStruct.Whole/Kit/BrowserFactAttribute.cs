namespace CloudStruct.Whole.Kit;

/// <summary>A test that opens a report: skipped, with this word, where no Chromium is installed.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class BrowserFactAttribute : FactAttribute
{
    /// <summary>Looks for the browser.</summary>
    public BrowserFactAttribute()
    {
        if (Browser.Executable is null) Skip = "No Chromium is installed on this machine, so no report can be opened.";
    }
}
