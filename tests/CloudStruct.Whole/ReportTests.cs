using System.Text.Json.Nodes;
using CloudStruct.Whole.Kit;
using Microsoft.Playwright;

namespace CloudStruct.Whole;

/// <summary>The report of the demonstration in a browser without a network, and what is decided in it in the next run.</summary>
public class ReportTests
{
    [BrowserFact]
    public async Task A_geologist_reads_the_report_decides_and_measures_again()
    {
        using var survey = new TempSurvey();
        Built.Ended first = Built.Run(survey.Root, "demo", "s");
        Assert.True(first.Code == 0, first.Error);

        await using Browser browser = await Browser.Open();
        IPage page = browser.Page;
        await page.GotoAsync(new Uri(survey["s/results/report.html"]).AbsoluteUri);
        await page.Locator("#bench[data-ready]").WaitForAsync();

        // A pole that stands alone enough to be hit: that of the third largest face.
        string id = await page.Locator("#table-panel tr[data-face]").Nth(2).GetAttributeAsync("data-face") ?? "";
        string place = await page.Locator("#net").EvaluateAsync<string>(
            "(net, id) => { const ask = { id: Number(id) }; net.dispatchEvent(new CustomEvent('where', { detail: ask })); return ask.x + ' ' + ask.y; }", id);
        float[] at = [.. place.Split(' ').Select(v => float.Parse(v, System.Globalization.CultureInfo.InvariantCulture))];
        await page.Locator("#net").ClickAsync(new() { Position = new() { X = at[0], Y = at[1] } });
        foreach (string view in (string[])["#net", "#scene", "#map", "#card > div[data-face]"])
        {
            await Assertions.Expect(page.Locator(view)).ToHaveAttributeAsync("data-face", id);
        }

        await Assertions.Expect(page.Locator("#table-panel tr.chosen")).ToHaveAttributeAsync("data-face", id);
        Assert.Contains($"Face {id}", await page.Locator("#card").InnerTextAsync());
        Assert.True(await Yellow(page, "#map") > 20, "the chosen face is not marked on the map");
        Assert.True(await Yellow(page, "#net") > 20, "the chosen pole is not marked on the net");

        // The slider takes strip, section and map to another station.
        string before = await page.Locator("#section-words").InnerTextAsync();
        await page.Locator("#station").FocusAsync();
        await page.Locator("#station").PressAsync("Home");
        for (int i = 0; i < 4; i++) await page.Locator("#station").PressAsync("ArrowRight");
        string station = await page.Locator("#section").GetAttributeAsync("data-station") ?? "";
        Assert.Equal("5", station);
        Assert.NotEqual(before, await page.Locator("#section-words").InnerTextAsync());
        await Assertions.Expect(page.Locator(".strip svg[data-dike]")).ToHaveAttributeAsync("data-station", station);
        await Assertions.Expect(page.Locator("#map")).ToHaveAttributeAsync("data-station", station);
        await Assertions.Expect(page.Locator("#scene")).ToHaveAttributeAsync("data-station", station);

        // Drop the face, take the file down, put it into the survey.
        await page.Locator("#drop-face").ClickAsync();
        Assert.Equal(0, await page.Locator($"#table-panel tr[data-face='{id}']").CountAsync());
        IDownload download = await page.RunAndWaitForDownloadAsync(() => page.Locator("#download-decisions").ClickAsync());
        Assert.Equal("decisions.csv", download.SuggestedFilename);
        await download.SaveAsAsync(survey["s/decisions.csv"]);
        Assert.Empty(browser.Complaints);
        Assert.Empty(browser.Requests);
        Assert.Single(browser.Files.Distinct());

        Built.Ended second = Built.Run(survey.Root, "measure", "s");
        Assert.True(second.Code == 0, second.Error);
        JsonNode run = JsonNode.Parse(File.ReadAllBytes(survey["s/results/run.json"]))!;
        Assert.Equal(1, run["decisions"]!["applied"]!.GetValue<int>());
        Assert.DoesNotContain(File.ReadLines(survey["s/results/tables/faces.csv"]), l => l.StartsWith(id + ",", StringComparison.Ordinal));
        await page.GotoAsync(new Uri(survey["s/results/report.html"]).AbsoluteUri);
        await page.Locator("#bench[data-ready]").WaitForAsync();
        await Assertions.Expect(page.Locator(".decisions summary")).ToHaveTextAsync("1 decision of the file that this run has read");
    }

    // Points of the colour in which the chosen thing is marked.
    private static Task<int> Yellow(IPage page, string canvas) => page.Locator(canvas).EvaluateAsync<int>(
        "c => { const d = c.getContext('2d').getImageData(0, 0, c.width, c.height).data; let n = 0; for (let i = 0; i < d.length; i += 4) if (d[i] === 240 && d[i + 1] === 228 && d[i + 2] === 66) n++; return n; }");
}
