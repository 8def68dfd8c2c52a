using System.IO.Compression;
using System.Text;
using System.Text.Json;
using System.Xml.Linq;
using CloudStruct.Formats.Tables;
using CloudStruct.Products.Report;
using CloudStruct.Products.Tables;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Drawings;

namespace CloudStruct.Tests.Products.Report;

/// <summary>What the linked page is given, and the page without it.</summary>
public class LinkedPageTests
{
    private static readonly PageAssets Assets = new("console.log(1 < 2 && a[b[0]]>c)", ".a > .b { color: red }");

    [Fact]
    public void Built_without_Node_the_page_carries_pictures_and_says_so()
    {
        string text = Page(Samples.Dike(), null);
        Assert.Contains("carries pictures only", text, StringComparison.Ordinal);
        Assert.DoesNotContain("<script", text, StringComparison.Ordinal);
        Assert.DoesNotContain("script-src", text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_script_stands_in_the_page_as_it_was_built()
    {
        string text = Page(Samples.Dike(), Assets);
        Assert.Contains("1 < 2 && a[b[0]] >c", text, StringComparison.Ordinal);   // "]]>" alone would end the mark for readers of XML
        Assert.Contains(".a > .b { color: red }", text, StringComparison.Ordinal);
        Assert.NotNull(XElement.Parse(text["<!DOCTYPE html>".Length..]));
        Assert.Throws<ArgumentException>(() => Page(Samples.Dike(), Assets with { Script = "'</script>'" }));
    }

    [Fact]
    public void The_page_holds_the_very_cells_of_the_tables()
    {
        Findings findings = Samples.Dike();
        using JsonDocument data = JsonDocument.Parse(Unpacked(Page(findings, Assets), "page-data"));
        foreach ((string name, string file) in ((string, string)[])[("faces", "faces.csv"), ("stations", "width.csv"), ("contacts", "contacts.csv"), ("sets", "sets.csv")])
        {
            CsvSheet sheet = Sheets.All.Single(s => s.File == file).Fill(findings);
            JsonElement table = data.RootElement.GetProperty("tables").EnumerateArray().Single(t => t.GetProperty("name").GetString() == name);
            Assert.Equal(sheet.Columns.Select(c => c.Name), table.GetProperty("columns").EnumerateArray().Select(c => c.GetProperty("name").GetString()));
            Assert.Equal(sheet.Rows, table.GetProperty("rows").EnumerateArray().Select(r => r.EnumerateArray().Select(c => c.GetString()!).ToArray()));
        }
    }

    [Fact]
    public void Points_come_back_within_half_a_step()
    {
        var random = new Random(5);
        float[] Axis(double size) => [.. Enumerable.Range(0, 5000).Select(_ => (float)(size * (random.NextDouble() - 0.5)))];
        var cloud = new ThinnedCloud { X = Axis(120), Y = Axis(40), Z = Axis(15), Rgb = new byte[15000], Class = [.. Enumerable.Range(0, 5000).Select(i => (byte)(64 + (i % 5)))], Face = [.. Enumerable.Range(0, 5000).Select(i => i * 31)] };
        PackedCloud packed = PackedCloud.Of(cloud, new FaceShapes())!;
        byte[] planes = Unzip(packed.Text());
        Assert.Equal(121.0 / 65535, packed.StepM, 0.00002);   // the longest side with half a metre on either hand
        int at = 0;
        foreach ((float[] axis, double from) in ((float[], double)[])[(cloud.X, packed.MinM.X), (cloud.Y, packed.MinM.Y), (cloud.Z, packed.MinM.Z)])
        {
            int now = 0;
            for (int i = 0; i < axis.Length; i++)
            {
                now = (now + planes[at + i] + (planes[at + axis.Length + i] << 8)) & 0xFFFF;
                Assert.Equal(axis[i], (now * packed.StepM) + from, (packed.StepM / 2) + 1e-5);
            }

            at += 2 * axis.Length;
        }

        at += 15000;
        Assert.Equal(cloud.Class, planes[at..(at + 5000)]);
        at += 5000;
        Assert.Equal(cloud.Face, Enumerable.Range(0, 5000).Select(i => planes[at + i] | (planes[at + 5000 + i] << 8) | (planes[at + 10000 + i] << 16)));
    }

    [Fact]
    public void What_was_decided_by_hand_stands_on_the_page()
    {
        var outcomes = new DecisionsRecord { Outcomes = [new(new Decision { Line = 2, Action = DecisionAction.Drop, FaceId = 7 }, true, 7, "dropped"), new(new Decision { Line = 3, FaceId = 8 }, false, 0, "no face of this place and attitude was found")] };
        string text = Page(Samples.Dike() with { Decisions = outcomes }, Assets);
        Assert.Contains("read 2 decisions from decisions.csv and applied 1", text, StringComparison.Ordinal);
        using JsonDocument data = JsonDocument.Parse(Unpacked(text, "page-data"));
        Assert.Equal([true, false], data.RootElement.GetProperty("decisions").EnumerateArray().Select(d => d.GetProperty("applied").GetBoolean()));
        Assert.DoesNotContain("Decided by hand", Page(Samples.Dike(), Assets), StringComparison.Ordinal);
    }

    private static string Page(Findings findings, PageAssets? assets) =>
        Encoding.UTF8.GetString(new ReportPage(findings, SampleDrawings.All(), Samples.Facts(), [], assets).Bytes());

    private static string Unpacked(string page, string id)
    {
        string mark = $"id=\"{id}\">";
        int from = page.IndexOf(mark, StringComparison.Ordinal) + mark.Length;
        return Encoding.UTF8.GetString(Unzip(page[from..page.IndexOf('<', from)]));
    }

    private static byte[] Unzip(string text)
    {
        using var gzip = new GZipStream(new MemoryStream(Convert.FromBase64String(text)), CompressionMode.Decompress);
        using var all = new MemoryStream();
        gzip.CopyTo(all);
        return all.ToArray();
    }
}
