using System.Text;

namespace CloudStruct.Recipes;

/// <summary>Names as they are written in recipes and tables: TrueWidthLow95M becomes true_width_low95_m.</summary>
internal static class Words
{
    /// <summary>Snake case of a property or enum name.</summary>
    public static string Snake(string name)
    {
        var text = new StringBuilder(name.Length + 8);
        for (int i = 0; i < name.Length; i++)
        {
            char c = name[i];
            bool starts = char.IsUpper(c) && i > 0 && (!char.IsUpper(name[i - 1]) || (i + 1 < name.Length && char.IsLower(name[i + 1])));
            if (starts) text.Append('_');
            text.Append(char.ToLowerInvariant(c));
        }

        return text.ToString();
    }

    /// <summary>The known word nearest to one that is not known; null when none is near enough to be meant.</summary>
    public static string? Nearest(string word, IEnumerable<string> known)
    {
        string? best = null;
        int least = Math.Max(2, word.Length / 3) + 1;
        foreach (string k in known)
        {
            int d = Distance(word, k);
            if (d < least) (best, least) = (k, d);
        }

        return best;
    }

    // Edit distance with insertion, removal and replacement at cost 1 (Levenshtein 1966; from memory).
    private static int Distance(string a, string b)
    {
        int[] row = [.. Enumerable.Range(0, b.Length + 1)];
        for (int i = 1; i <= a.Length; i++)
        {
            int diagonal = row[0];
            row[0] = i;
            for (int j = 1; j <= b.Length; j++)
            {
                int replace = diagonal + (a[i - 1] == b[j - 1] ? 0 : 1);
                diagonal = row[j];
                row[j] = Math.Min(replace, Math.Min(row[j], row[j - 1]) + 1);
            }
        }

        return row[b.Length];
    }
}
