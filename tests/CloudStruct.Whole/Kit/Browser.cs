using Microsoft.Playwright;

namespace CloudStruct.Whole.Kit;

/// <summary>The system's Chromium, cut off from the network, with its own software for WebGL.</summary>
internal sealed class Browser : IAsyncDisposable
{
    private static readonly string[] Names = ["chromium", "chromium-browser", "google-chrome", "chrome"];
    private readonly IPlaywright playwright;
    private readonly IBrowser browser;

    private Browser(IPlaywright playwright, IBrowser browser, IPage page)
    {
        this.playwright = playwright;
        this.browser = browser;
        Page = page;
        page.Console += (_, m) =>
        {
            if (m.Type is "error" or "warning" && !m.Text.Contains("GPU stall", StringComparison.Ordinal)) Complaints.Add($"{m.Type}: {m.Text}");
        };
        page.PageError += (_, text) => Complaints.Add("exception: " + text);
        page.Request += (_, r) =>
        {
            // What lies inside the page, and the page itself, are no requests to anywhere.
            if (!r.Url.StartsWith("file:", StringComparison.Ordinal) && !r.Url.StartsWith("data:", StringComparison.Ordinal) && !r.Url.StartsWith("blob:", StringComparison.Ordinal)) Requests.Add(r.Url);
            else if (r.Url.StartsWith("file:", StringComparison.Ordinal)) Files.Add(r.Url);
        };
    }

    /// <summary>Where Chromium is; null when there is none.</summary>
    public static string? Executable { get; } = (Environment.GetEnvironmentVariable("PATH") ?? "").Split(Path.PathSeparator)
        .SelectMany(folder => Names.Select(n => Path.Combine(folder, n))).FirstOrDefault(File.Exists);

    /// <summary>The one page.</summary>
    public IPage Page { get; }

    /// <summary>Errors and warnings of the page's console, and exceptions.</summary>
    public List<string> Complaints { get; } = [];

    /// <summary>Addresses that the page asked for outside itself.</summary>
    public List<string> Requests { get; } = [];

    /// <summary>Files that the page asked for.</summary>
    public List<string> Files { get; } = [];

    /// <summary>Starts it.</summary>
    public static async Task<Browser> Open(int width = 1400, int height = 1000)
    {
        IPlaywright playwright = await Playwright.CreateAsync();
        IBrowser browser = await playwright.Chromium.LaunchAsync(new()
        {
            ExecutablePath = Executable,
            Headless = true,
            Args =
            [
                "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync",
                "--use-gl=angle", "--use-angle=swiftshader", "--enable-unsafe-swiftshader",
            ],
        });
        IBrowserContext context = await browser.NewContextAsync(new() { Offline = true, AcceptDownloads = true, ViewportSize = new() { Width = width, Height = height } });
        IPage page = await context.NewPageAsync();
        page.SetDefaultTimeout(120_000);   // a software renderer on a busy machine
        return new Browser(playwright, browser, page);
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        await browser.CloseAsync();
        playwright.Dispose();
    }
}
