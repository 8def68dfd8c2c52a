using CloudStruct.Products;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Whole.Kit;
using Microsoft.Playwright;
using static System.FormattableString;

namespace CloudStruct.Whole;

/// <summary>Reports at both ends: of nearly nothing, and of more than a page should hold.</summary>
public class ReportSizeTests
{
    [BrowserFact]
    public async Task One_face_without_dike_colour_or_coordinate_system()
    {
        using var survey = new TempSurvey();
        var text = new System.Text.StringBuilder();
        for (int i = 0; i < 40_000; i++)
            text.Append(Invariant($"{0.01 * (i % 200):F3} {0.01 * (i / 200):F3} {(0.004 * (i % 200)) + (0.001 * ((i * 7919) % 5)):F4}\n"));
        survey.Text("s/clouds/plane.xyz", text.ToString());
        Built.Ended run = Built.Run(survey.Root, "measure", "s");
        Assert.True(run.Code == 0, run.Error);
        await using Browser browser = await Browser.Open();
        await Opens(browser, survey["s/results/report.html"]);
        string said = await browser.Page.Locator("body").InnerTextAsync();
        Assert.Contains("No dike was found", said);
        Assert.Contains("no cross-section", said);
        Assert.Equal(0, await browser.Page.Locator("#station").CountAsync());
        Assert.Equal(1, await browser.Page.Locator("#table-panel tr[data-face]").CountAsync());
        await browser.Page.Locator("#table-panel tr[data-face]").ClickAsync();
        Assert.Contains("strike", await browser.Page.Locator("#card").InnerTextAsync());
        Assert.Empty(browser.Complaints);
    }

    [BrowserFact]
    public async Task Twenty_thousand_faces_and_half_a_million_points()
    {
        using var survey = new TempSurvey();
        string report = Write(survey.Root, 20_000, 500_000);
        Assert.True(new FileInfo(report).Length < 15 << 20, Invariant($"{new FileInfo(report).Length} bytes"));
        await using Browser browser = await Browser.Open();
        await Opens(browser, report);
        ILocator rows = browser.Page.Locator("#table-panel tr[data-face]");
        await rows.Nth(9).ClickAsync();
        string id = await rows.Nth(9).GetAttributeAsync("data-face") ?? "";
        foreach (string view in (string[])["#net", "#scene", "#map"]) await Assertions.Expect(browser.Page.Locator(view)).ToHaveAttributeAsync("data-face", id);
        await browser.Page.Locator(".filters [data-value=weak]").UncheckAsync();
        await Assertions.Expect(browser.Page.Locator(".filters .total")).ToHaveTextAsync("10,000 of 20,000 faces shown");
        Assert.Empty(browser.Complaints);
    }

    private static async Task Opens(Browser browser, string report)
    {
        await browser.Page.GotoAsync(new Uri(report).AbsoluteUri);
        await browser.Page.Locator("#bench[data-ready]").WaitForAsync();
        Assert.Empty(browser.Complaints);
        Assert.Empty(browser.Requests);
    }

    /// <summary>The report of a made-up survey: square faces in rows on a slope, half of them weak, points between.</summary>
    private static string Write(string folder, int faces, int points)
    {
        const int across = 100;
        var list = new Face[faces];
        var at = new List<float>[] { [], [], [] };
        for (int i = 0; i < faces; i++)
        {
            double x = i % across, y = i / across;
            var attitude = new Attitude((i * 37) % 360, (i * 11) % 90);
            list[i] = new Face
            {
                FaceId = i + 1, Middle = new Vec3(x, y, 0.3 * y), Normal = attitude.UpwardNormal(), Attitude = attitude, AreaM2 = 5.0 / (i + 1), LengthM = 0.5, HeightM = 0.5, Points = 40,
                Region = new PoleRegion { Cone95Deg = i % 2 == 0 ? 1 : 8, Cone95TotalDeg = i % 2 == 0 ? 1 : 8, Ellipse95MajorDeg = 1, Ellipse95MinorDeg = 1 },
            };
            for (int k = 0; k < 4; k++)
            {
                at[0].Add((float)(x + (k is 1 or 2 ? 0.4 : -0.4)));
                at[1].Add((float)(y + (k is 2 or 3 ? 0.4 : -0.4)));
                at[2].Add((float)(0.3 * y));
            }
        }

        float[] Along(Func<int, double> value) => [.. Enumerable.Range(0, points).Select(i => (float)value(i))];
        var drawings = new DrawingsRecord
        {
            Cloud = new ThinnedCloud
            {
                X = Along(i => across * ((i * 0.618034) % 1)), Y = Along(i => faces / (double)across * i / points), Z = Along(i => (0.3 * faces / across * i / points) + (0.02 * (i % 3))),
                Rgb = [.. Enumerable.Range(0, 3 * points).Select(i => (byte)(90 + ((i * 31) % 97)))], Class = [.. Enumerable.Repeat((byte)64, points)], SpacingM = 0.2,
            },
            Faces = new FaceShapes
            {
                VertexFrom = [.. Enumerable.Range(0, faces + 1).Select(i => 4 * i)], X = [.. at[0]], Y = [.. at[1]], Z = [.. at[2]],
                TriangleFrom = [.. Enumerable.Range(0, faces + 1).Select(i => 6 * i)], Triangles = [.. Enumerable.Range(0, faces).SelectMany(_ => new[] { 0, 1, 2, 0, 2, 3 })],
            },
        };
        var findings = new Findings
        {
            SurveyName = "Many", Faces = new FaceSet { Faces = list, SmallestFaceM2 = 0.0001 },
            Contacts = new ContactsRecord { DomainOfFace = [.. list.Select(_ => FaceDomain.Host)] },
            Described = new DescribedCloud { Cloud = new WorkingCloud { X = drawings.Cloud.X, Y = drawings.Cloud.Y, Z = drawings.Cloud.Z, SpacingM = 0.2 } },
        };
        new ProductsWriter().Write(folder, findings, drawings, null!, new RunFacts { RunId = "many" }, new ProductSettings { Clouds = "none" }, StageContext.Plain());
        return Path.Combine(folder, "report.html");
    }
}
