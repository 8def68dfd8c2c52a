using System.Text;
using CloudStruct.Formats.Tables;
using CloudStruct.Products.Tables;

namespace CloudStruct.Tests.Products.Tables;

/// <summary>docs/tables.md as the column definitions give it.</summary>
internal static class TablesDocument
{
    public static string Text()
    {
        var text = new StringBuilder("""
            # Tables

            Every table is plain CSV (RFC 4180): UTF-8, a header row, commas, a point as decimal mark. It stands in `tables/`
            with `tables-metadata.json`, which says the same as this page in the form of W3C CSV on the Web, together with the
            frame, the north, the coordinate system, the run, the licence and the citation.

            - An empty cell means *not determined*. Nothing is ever guessed to fill it.
            - Read columns by name. New columns are added at the end, and none is renamed; lists of words may grow.
            - A name ends in its unit: `_m` metres (3 decimals), `_deg` degrees (2 decimals), `_m2` square metres, `_per_m` per
              metre. Everything that is not an angle, a length or a count has 4 significant digits.
            - x is east, y north, z up, in map coordinates in metres. Azimuths run clockwise from the north that the metadata
              names. Strike follows the right-hand rule: dip direction = strike + 90. A pole is the lower-hemisphere normal.
            - `low95` and `high95` are the limits of a 95 % range. `cone95_deg` is the half-angle of the cone about the pole
              that contains the true pole with 95 % probability. Columns with `total` add the common errors of the whole model
              (tilt, azimuth, scale); the others hold internal errors only.

            This page is checked against the program by a test; it cannot drift.

            """);
        foreach (ITableSheet table in Sheets.All)
        {
            text.Append($"\n## {table.File}: {table.Title.ToLowerInvariant()}\n\n{table.Meaning}\n\n| column | unit | meaning |\n|---|---|---|\n");
            foreach (CsvColumn c in table.Columns)
            {
                string words = table.Words.TryGetValue(c.Name, out string[]? list) ? $" Words: {string.Join(", ", list.Select(w => $"`{w}`"))}." : "";
                text.Append($"| `{c.Name}` | {c.Unit} | {c.Description}{words} |\n");
            }
        }
        return text.ToString().ReplaceLineEndings("\n");
    }
}
