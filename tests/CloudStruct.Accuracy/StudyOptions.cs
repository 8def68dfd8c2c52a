using System.Globalization;

namespace CloudStruct.Accuracy;

/// <summary>What a study is told on the command line.</summary>
public sealed record StudyOptions
{
    /// <summary>Names of outcrop plans; empty: the study's own choice.</summary>
    public string[] Plans { get; init; } = [];

    /// <summary>Seeds, each a fresh outcrop.</summary>
    public ulong[] Seeds { get; init; } = [101, 102, 103];

    /// <summary>Whether the command line named seeds.</summary>
    public bool SeedsGiven { get; init; }

    /// <summary>About how many points to make; null: as the plan says.</summary>
    public int? Points { get; init; }

    /// <summary>Scenes made at once, each on one thread.</summary>
    public int Workers { get; init; } = Environment.ProcessorCount;

    /// <summary>File to write tables to; null for the terminal alone.</summary>
    public string? Out { get; init; }

    /// <summary>Reads --plan A,B --seeds 5-9 --points 300000.</summary>
    public static StudyOptions Parse(ReadOnlySpan<string> args)
    {
        var o = new StudyOptions();
        for (int i = 0; i + 1 < args.Length; i += 2)
        {
            string value = args[i + 1];
            o = args[i] switch
            {
                "--plan" => o with { Plans = value.Split(',') },
                "--seeds" => o with { Seeds = SeedsOf(value), SeedsGiven = true },
                "--workers" => o with { Workers = int.Parse(value, CultureInfo.InvariantCulture) },
                "--out" => o with { Out = value },
                "--points" => o with { Points = int.Parse(value, CultureInfo.InvariantCulture) },
                _ => throw new ArgumentException($"unknown option {args[i]}"),
            };
        }

        return o;
    }

    private static ulong[] SeedsOf(string text)
    {
        string[] ends = text.Split('-');
        ulong from = ulong.Parse(ends[0], CultureInfo.InvariantCulture), to = ulong.Parse(ends[^1], CultureInfo.InvariantCulture);
        return [.. Enumerable.Range(0, (int)(to - from + 1)).Select(i => from + (ulong)i)];
    }
}
