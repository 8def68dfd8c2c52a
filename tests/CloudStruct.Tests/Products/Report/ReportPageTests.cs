using System.Globalization;
using System.Text;
using System.Text.RegularExpressions;
using System.Xml.Linq;
using CloudStruct.Products;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;

namespace CloudStruct.Tests.Products.Report;

public partial class ReportPageTests
{
    [Theory]
    [InlineData("dike")]
    [InlineData("nothing")]
    public void The_page_is_well_formed_and_fetches_nothing(string sample)
    {
        (XElement html, string text, IReadOnlyList<string> files) = sample == "dike" ? Dike.Value : Page(Samples.Nothing(), new());
        Assert.StartsWith("<!DOCTYPE html>", text, StringComparison.Ordinal);
        string[] ids = [.. html.Descendants().Attributes("id").Select(a => a.Value)];
        Assert.Equal(ids.Length, ids.Distinct().Count());
        foreach (XAttribute a in html.Descendants().Attributes().Where(a => a.Name.LocalName is "src" or "href" or "action" or "data" or "srcset"))
        {
            if (a.Value.StartsWith("data:image/", StringComparison.Ordinal)) continue;
            Assert.DoesNotContain(":", a.Value, StringComparison.Ordinal);   // no scheme: nothing but places beside or on the page
            if (a.Value.StartsWith('#')) Assert.Contains(a.Value[1..], ids);
            else Assert.Contains(a.Value, files.Append("run.json"));   // run.json is the program's
        }
        Assert.All(html.Descendants("style"), s => Assert.DoesNotContain("@import", s.Value, StringComparison.Ordinal));
        Assert.All(html.Descendants("style"), s => Assert.DoesNotMatch(UrlInStyle(), s.Value));
        Assert.Empty(html.Descendants("link"));

        // Its own script alone may run, by its hash (Content Security Policy level 3, 2.3.1), and may fetch nothing.
        string policy = html.Descendants("meta").Single(m => (string?)m.Attribute("http-equiv") == "Content-Security-Policy").Attribute("content")!.Value;
        Assert.StartsWith("default-src 'none'", policy, StringComparison.Ordinal);
        Assert.DoesNotContain("http", policy, StringComparison.Ordinal);
        Assert.All(html.Descendants("script"), s => Assert.Null(s.Attribute("src")));
        int from = text.LastIndexOf("<script>", StringComparison.Ordinal);
        if (from < 0) return;   // built without Node.js
        from += "<script>".Length;
        string script = text[from..text.LastIndexOf("</script>", StringComparison.Ordinal)];
        string hash = Convert.ToBase64String(System.Security.Cryptography.SHA256.HashData(Encoding.UTF8.GetBytes(script)));
        Assert.Contains($"script-src 'sha256-{hash}'", policy, StringComparison.Ordinal);
    }

    [Fact]
    public void Readers_with_a_screen_reader_or_a_keyboard_get_all_of_it()
    {
        // WCAG 2.1: 1.1.1 text alternatives, 1.3.1 headings and table headers, 2.1.1 keyboard, 3.1.1 language.
        XElement html = Dike.Value.Html;
        Assert.Equal("en", html.Attribute("lang")!.Value);
        Assert.Single(html.Descendants("h1"));
        Assert.All(html.Descendants("img"), i => Assert.True(i.Attribute("alt")!.Value.Length > 20));
        Assert.All(html.Descendants("table"), t => Assert.NotEmpty(t.Element("caption")!.Value));
        Assert.All(html.Descendants("th"), th => Assert.NotNull(th.Attribute("scope")));
        Assert.All(html.Descendants().Where(e => (string?)e.Attribute("class") == "scroll" && e.Attribute("role") != null), e => Assert.Equal("0", e.Attribute("tabindex")!.Value));
        string[] ids = [.. html.Descendants().Attributes("id").Select(a => a.Value)];
        Assert.All(html.Descendants().Attributes("aria-labelledby"), a => Assert.Contains(a.Value, ids));
    }

    [Fact]
    public void Colours_of_text_reach_contrast_AA()
    {
        // WCAG 2.1, 1.4.3: 4.5:1 for text; relative luminance by its definition there.
        string text = Dike.Value.Text;
        string Of(string name) => Regex.Match(text, $"--{name}: (#[0-9a-f]{{6}})", RegexOptions.None, TimeSpan.FromSeconds(5)).Groups[1].Value;
        foreach (string ink in new[] { "ink", "quiet", "blue", "warn" })
        {
            foreach (string ground in new[] { "paper", "tint" })
                Assert.True(Contrast(Of(ink), Of(ground)) >= 4.5, $"{ink} on {ground}: {Contrast(Of(ink), Of(ground)):F2}");
        }
        Assert.Equal(21, Contrast("#000000", "#ffffff"), 0.001);   // the definition's own extreme
    }

    [Fact]
    public void The_first_screen_says_the_numbers_with_their_limits()
    {
        string text = Plain(Dike.Value.Html.Descendants("section").First());
        Assert.Contains("2.50 m", text, StringComparison.Ordinal);
        Assert.Contains("95 %: 2.44 to 2.56 m", text, StringComparison.Ordinal);
        Assert.Contains("strike 045°, dip 85° SE", text, StringComparison.Ordinal);
        Assert.Contains("95 % cone 1.2°, with the model's own errors 1.4°", text, StringComparison.Ordinal);
        Assert.Contains("3.0 m", text, StringComparison.Ordinal);
        Assert.Contains("1 firm (cone up to 2°), 2 fair (up to 5°), 2 weak", text, StringComparison.Ordinal);
        Assert.Contains("spacing 0.71 m (95 %: 0.50 to 0.98 m)", text, StringComparison.Ordinal);
    }

    [Fact]
    public void No_dike_is_said_with_what_could_have_been_missed()
    {
        string text = Plain(Page(Samples.Nothing(), new()).Html);
        Assert.Contains("none thicker than 0.25 m would have been missed", text, StringComparison.Ordinal);
        Assert.Contains("The cloud has no colour", text, StringComparison.Ordinal);
        Assert.Contains("Azimuths are from true north", text, StringComparison.Ordinal);
        Assert.Contains("Coordinate system: none stated", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Doubtful_remarks_stand_on_the_first_screen_and_the_others_behind_a_click()
    {
        XElement doubts = Dike.Value.Html.Descendants("section").Single(s => (string?)s.Attribute("id") == "doubts");
        Assert.Contains("Margin B is only a line", Plain(doubts.Element("ul")!), StringComparison.Ordinal);
        Assert.Contains("2 points were not numbers", Plain(doubts.Element("details")!), StringComparison.Ordinal);
    }

    [Fact]
    public void A_hostile_name_is_only_text()
    {
        (XElement html, _, _) = Page(Samples.Dike() with { SurveyName = "<script>alert(1)</script>\u0001\"'&" }, new());
        Assert.Equal("<script>alert(1)</script>\"'&", html.Descendants("h1").Single().Value);
        Assert.All(html.Descendants("script"), s => Assert.DoesNotContain("alert(1)", s.Value, StringComparison.Ordinal));
    }

    [Fact]
    public void The_strip_has_a_bar_of_evidence_for_every_contact_that_leads_to_its_row()
    {
        XElement html = Dike.Value.Html;
        XNamespace svg = "http://www.w3.org/2000/svg";
        string[] leads = [.. html.Descendants(svg + "a").Select(a => a.Attribute("href")!.Value)];
        Assert.Equal(["#contact-1-A-1", "#contact-1-B-1", "#contact-1-B-2"], leads.Order(StringComparer.Ordinal));
    }

    [Fact]
    public void Bars_of_overlapping_windows_do_not_hide_each_other()
    {
        Findings f = Samples.Dike();
        f = f with { Contacts = f.Contacts with { Contacts = [.. Enumerable.Range(0, 5).Select(i => f.Contacts.Contacts[0] with { Segment = i + 1, ChainageFromM = 2 * i, ChainageToM = (2 * i) + 3.5 })] } };
        XNamespace svg = "http://www.w3.org/2000/svg";
        double Of(XElement bar, string name) => double.Parse(bar.Attribute(name)!.Value, CultureInfo.InvariantCulture);
        XElement[] bars = [.. Page(f, new()).Html.Descendants(svg + "a").Select(a => a.Element(svg + "rect")!)];
        Assert.Equal(5, bars.Length);
        foreach (XElement a in bars)
        {
            foreach (XElement b in bars.Where(b => b != a && Of(b, "y") == Of(a, "y")))
                Assert.True(Of(a, "x") + Of(a, "width") <= Of(b, "x") || Of(b, "x") + Of(b, "width") <= Of(a, "x"));
        }
    }

    [Fact]
    public void A_dike_of_which_only_a_direction_is_known_has_no_strike_and_dip()
    {
        Findings f = Samples.Dike();
        DikeSummary d = f.Width.Dikes[0] with { Mean = null, Region = null, WidthMeanM = null, NEffective = null };
        string text = Plain(Page(f with { Width = f.Width with { Dikes = [d] } }, new()).Html.Descendants("section").First());
        Assert.Contains("trend 045°", text, StringComparison.Ordinal);
        Assert.Contains("too straight to give a dip", text, StringComparison.Ordinal);
        Assert.DoesNotContain("NaN", text, StringComparison.Ordinal);
    }

    [Fact]
    public void The_cautions_stand_on_every_page() =>
        Assert.All(new[] { Samples.Dike(), Samples.Nothing() }, f => Assert.Contains("Nothing here is a stability assessment or an engineering design", Plain(Page(f, new()).Html), StringComparison.Ordinal));

    [Fact]
    public void A_model_that_nothing_ties_to_the_ground_has_no_compass_points()
    {
        Findings f = Samples.Dike();
        f = f with { Intake = f.Intake with { Frame = f.Intake.Frame with { North = North.Model } } };
        Assert.Contains("Chainage increases toward 045° of the model", Plain(Page(f, new()).Html), StringComparison.Ordinal);
    }

    // Most tests look at the same page: it is made once.
    private static readonly Lazy<(XElement Html, string Text, IReadOnlyList<string> Files)> Dike = new(() => Page(Samples.Dike(), SampleDrawings.All()));

    private static (XElement Html, string Text, IReadOnlyList<string> Files) Page(Findings findings, DrawingsRecord drawings)
    {
        using var scratch = new Scratch();
        IReadOnlyList<string> files = new ProductsWriter().Write(scratch.Folder, findings, drawings, SamplePieces.AboutTheDike(), Samples.Facts(), new(), StageContext.Plain());
        string text = File.ReadAllText(scratch["report.html"], Encoding.UTF8);
        return (XElement.Parse(text["<!DOCTYPE html>".Length..]), text, files);
    }

    private static string Plain(XElement e) => string.Join(" ", e.DescendantNodesAndSelf().OfType<XText>().Select(t => t.Value)).Replace("  ", " ", StringComparison.Ordinal);

    private static double Contrast(string a, string b)
    {
        double x = Luminance(a), y = Luminance(b);
        return (Math.Max(x, y) + 0.05) / (Math.Min(x, y) + 0.05);
    }

    private static double Luminance(string hex)
    {
        double Linear(int at)
        {
            double c = int.Parse(hex.AsSpan(at, 2), NumberStyles.HexNumber, CultureInfo.InvariantCulture) / 255.0;
            return c <= 0.03928 ? c / 12.92 : Math.Pow((c + 0.055) / 1.055, 2.4);
        }
        return (0.2126 * Linear(1)) + (0.7152 * Linear(3)) + (0.0722 * Linear(5));
    }

    [GeneratedRegex(@"url\((?!#hidden-)")]
    private static partial Regex UrlInStyle();
}
