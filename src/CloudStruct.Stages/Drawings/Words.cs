using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Turns of phrase that the sentences beneath drawings share.</summary>
internal static class Words
{
    /// <summary>"1 face", "2 faces".</summary>
    public static string Count(long n, string one, string many) => Invariant($"{n} {(n == 1 ? one : many)}");

    /// <summary>"2, 4 and 6".</summary>
    public static string List(IReadOnlyList<string> items) => items.Count switch
    {
        0 => "",
        1 => items[0],
        _ => string.Join(", ", items.Take(items.Count - 1)) + " and " + items[^1],
    };

    /// <summary>Which north, as a sentence with its convergence.</summary>
    public static string North(SurveyFrame frame) => frame.North switch
    {
        Records.Frame.North.True => Invariant($"Azimuths are from true north, {Math.Abs(frame.TurnDeg):0.00} deg {(frame.TurnDeg < 0 ? "less" : "more")} than from grid north."),
        Records.Frame.North.Model => "Azimuths are in the frame of the model, which nothing ties to north.",
        _ => "Azimuths are from grid north.",
    };

    /// <summary>"047 deg".</summary>
    public static string Azimuth(double deg) => Invariant($"{(int)Math.Round(Records.Attitudes.Azimuth.Wrap360(deg)) % 360:000} deg");

    /// <summary>Three significant digits: "0.0312", "2.31", "25.4", "412".</summary>
    public static string Short(double value)
    {
        if (value == 0 || !double.IsFinite(value)) return Invariant($"{value:0}");
        int digits = Math.Clamp(2 - (int)Math.Floor(Math.Log10(Math.Abs(value))), 0, 6);
        return Math.Round(value, digits).ToString(digits == 0 ? "0" : "0." + new string('0', digits), System.Globalization.CultureInfo.InvariantCulture);
    }
}
