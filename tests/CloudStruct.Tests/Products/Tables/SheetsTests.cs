using System.Globalization;
using CloudStruct.Formats.Tables;
using CloudStruct.Products.Tables;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Drawings;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Products.Tables;

public class SheetsTests
{
    [Fact]
    public void Columns_are_those_of_the_contract_in_its_order()
    {
        // testdata/tables/columns.txt: the contract's lists.
        string[] expected = [.. File.ReadLines(Repo.Path("testdata/tables/columns.txt")).Where(l => !l.StartsWith('#'))];
        string[] found = [.. Sheets.All.Select(t => $"{t.File}: {string.Join(", ", t.Columns.Select(c => c.Name))}")];
        Assert.Equal(expected, found);
    }

    [Theory]   // word lists of the contract, section 7
    [InlineData("faces.csv", "domain", "host dike margin")]
    [InlineData("faces.csv", "grade", "firm fair weak")]
    [InlineData("faces.csv", "in_place", "yes no unknown")]
    [InlineData("contacts.csv", "margin", "A B")]
    [InlineData("contacts.csv", "constraint", "plane line")]
    [InlineData("contacts.csv", "evidence", "surface trace both_margins prior")]
    [InlineData("width.csv", "status", "measured a_hidden b_hidden both_hidden unconstrained")]
    [InlineData("classes.csv", "class", "unknown host dike cover inclusion loose")]
    [InlineData("checkpoints.csv", "role", "control check")]
    public void Words_are_those_of_the_contract(string file, string column, string words) =>
        Assert.Equal(words.Split(' '), Sheets.All.Single(t => t.File == file).Words[column]);

    [Fact]
    public void Every_column_of_words_holds_listed_words_only()
    {
        foreach (ITableSheet table in Sheets.All)
        {
            CsvSheet sheet = table.Fill(Samples.Dike());
            foreach (var (name, words) in table.Words)
            {
                int at = sheet.Columns.Select(c => c.Name).ToList().IndexOf(name);
                Assert.All(sheet.Rows, row => Assert.Contains(row[at], words.Append("")));
            }
        }
    }

    [Fact]
    public void A_name_ends_in_its_unit_and_the_digits_follow_it()
    {
        foreach (CsvColumn c in Sheets.All.SelectMany(t => t.Columns))
        {
            string unit = c.Name.EndsWith("_per_m", StringComparison.Ordinal) ? "per metre"
                : c.Name.EndsWith("_m2", StringComparison.Ordinal) ? "square metre"
                : c.Name.EndsWith("_m", StringComparison.Ordinal) ? "metre"
                : c.Name.EndsWith("_deg", StringComparison.Ordinal) ? "degree" : "";
            Assert.Equal(unit, c.Unit);
            Assert.True(unit switch
            {
                "metre" => c.Kind == CsvKind.Metres,
                "degree" => c.Kind is CsvKind.AngleDeg or CsvKind.AzimuthDeg or CsvKind.AxisDeg,
                "per metre" or "square metre" => c.Kind == CsvKind.Number,
                _ => c.Kind is CsvKind.Text or CsvKind.Integer or CsvKind.Number,
            }, c.Name);
            Assert.EndsWith(".", c.Description);
        }
    }

    [Theory]
    [InlineData("dike")]
    [InlineData("nothing")]
    public void Tables_read_as_approved(string sample) =>
        Approved.Check(TextOf(sample == "dike" ? Samples.Dike() : Samples.Nothing()), $"Products/Tables/{sample}.approved.txt");

    [Fact]
    public void A_decimal_comma_on_the_machine_changes_nothing()
    {
        string plain = TextOf(Samples.Dike());
        CultureInfo before = CultureInfo.CurrentCulture;
        var comma = (CultureInfo)CultureInfo.InvariantCulture.Clone();
        comma.NumberFormat.NumberDecimalSeparator = ",";
        comma.NumberFormat.NegativeSign = "~";
        CultureInfo.CurrentCulture = comma;
        try
        {
            Assert.Equal("1,5", 1.5.ToString(CultureInfo.CurrentCulture));   // the trap is set
            Assert.Equal(plain, TextOf(Samples.Dike()));
        }
        finally
        {
            CultureInfo.CurrentCulture = before;
        }
    }

    [Fact]
    public void What_is_not_determined_is_an_empty_cell_never_a_word()
    {
        string text = TextOf(Samples.Dike());   // holds NaN and infinities
        Assert.DoesNotContain("NaN", text, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("Infinity", text, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("∞", text, StringComparison.Ordinal);
        Assert.DoesNotContain("-0.000", text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_line_has_no_strike_dip_or_cone_even_when_the_record_holds_one()
    {
        Findings f = Samples.Dike();
        f = f with
        {
            Contacts = f.Contacts with { Contacts = [.. f.Contacts.Contacts.Select(c => c with { Constraint = Records.Contacts.Constraint.Line })] },
        };
        CsvSheet sheet = Sheets.All.Single(t => t.File == "contacts.csv").Fill(f);
        string[] empty = ["strike_deg", "dip_deg", "dip_direction_deg", "cone95_deg", "cone95_total_deg", "ellipse95_major_deg", "ellipse95_minor_deg", "ellipse95_rake_deg"];
        foreach (int at in empty.Select(n => sheet.Columns.Select(c => c.Name).ToList().IndexOf(n)))
            Assert.All(sheet.Rows, row => Assert.Equal("", row[at]));
    }

    [Fact]
    public void Checkpoints_and_decisions_are_written_only_where_there_are_any()
    {
        ITableSheet control = Sheets.All.Single(t => t.File == "checkpoints.csv"), decisions = Sheets.All.Single(t => t.File == "decisions.csv");
        Assert.True(control.Applies(Samples.Dike()));
        Assert.False(control.Applies(Samples.Nothing()));
        Assert.False(decisions.Applies(Samples.Dike()));
        Assert.True(decisions.Applies(Samples.Dike() with { Decisions = new DecisionsRecord { Outcomes = [new DecisionOutcome(new Decision(), true, 0, "noted")] } }));
        Assert.All(Sheets.All.Where(t => t != control && t != decisions), t => Assert.True(t.Applies(Samples.Nothing())));
    }

    private static string TextOf(Findings findings) => string.Join("\n", Sheets.All.Where(t => t.Applies(findings))
        .Select(t => $"== {t.File}\n{t.Fill(findings).ToString().ReplaceLineEndings("\n")}"));
}
