using System.Globalization;
using System.Text;
using static System.FormattableString;

namespace CloudStruct.Accuracy.Deep;

/// <summary>The figures of a family as a table of Markdown.</summary>
public static class AccuracyTable
{
    /// <summary>Writes it.</summary>
    public static string Of(FamilyScore score, StudyOptions options)
    {
        var text = new StringBuilder();
        string points = options.Points is { } p ? Invariant($", about {p} points each") : "";
        text.Append(CultureInfo.InvariantCulture, $"### {score.Family.Plan}\n\n{score.Scenes} outcrops, seeds {options.Seeds[0]} to {options.Seeds[^1]}{points}.\n\n");
        text.Append("| figure | reached | 95 % interval | wanted | floor | judged |\n|---|---|---|---|---|---|\n");
        foreach (Figure f in score.Figures)
        {
            string n = "F" + f.Decimals.ToString(CultureInfo.InvariantCulture);
            string Number(double v) => double.IsNaN(v) ? "" : v.ToString(n, CultureInfo.InvariantCulture);
            (double low, double high) = f.Interval();
            string interval = double.IsNaN(low) ? "" : Number(low) + " to " + Number(high);
            text.Append(CultureInfo.InvariantCulture, $"| {f.Name} | {Mark(f)}{Number(f.Value)}{Mark(f)} | {interval} | {Wanted(f, Number)} | {(f.Floor is { } floor ? Number(floor.Value) : "")} | {f.Judged:0} {f.Unit} |\n");
        }

        return text.ToString();
    }

    // Bold where the figure falls short.
    private static string Mark(Figure f) => f.Value < f.Wanted.Least - 1e-9 || f.Value > f.Wanted.Most + 1e-9 ? "**" : "";

    private static string Wanted(Figure f, Func<double, string> number) => f.Wanted switch
    {
        ({ } least, { } most) => number(least) + " to " + number(most),
        ({ } least, null) => "at least " + number(least),
        (null, { } most) => "at most " + number(most),
        _ => "",
    };
}
