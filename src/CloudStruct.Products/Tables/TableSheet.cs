using System.Text.Json;
using CloudStruct.Formats.Tables;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;

namespace CloudStruct.Products.Tables;

/// <summary>A table put together column by column: name, meaning and cell stand side by side, so that they cannot drift apart.</summary>
/// <typeparam name="TRow">What one row is made from.</typeparam>
internal sealed class TableSheet<TRow> : ITableSheet
{
    private readonly List<CsvColumn> columns = [];
    private readonly List<Func<TRow, object?>> cells = [];
    private readonly Dictionary<string, string[]> words = [];

    public required string File { get; init; }

    public required string Title { get; init; }

    public required string Meaning { get; init; }

    public required Func<Findings, IEnumerable<TRow>> From { get; init; }

    /// <summary>Whether the table is written; by default always, with a header alone when there is nothing to list.</summary>
    public Func<Findings, bool> When { get; init; } = _ => true;

    public IReadOnlyList<CsvColumn> Columns => columns;

    public IReadOnlyDictionary<string, string[]> Words => words;

    public bool Applies(Findings findings) => When(findings);

    public CsvSheet Fill(Findings findings)
    {
        var sheet = new CsvSheet(File, Title, [.. columns]);
        foreach (TRow row in From(findings)) sheet.Add([.. cells.Select(cell => cell(row))]);
        return sheet;
    }

    public IEnumerable<object?[]> Values(Findings findings) => From(findings).Select(row => cells.Select(cell => cell(row)).ToArray());

    public TableSheet<TRow> Text(string name, string meaning, Func<TRow, string> cell) => Add(name, CsvKind.Text, meaning, cell);

    /// <summary>A column of words: those of an enumeration in snake case, except those that mean "not determined".</summary>
    public TableSheet<TRow> Word<T>(string name, string meaning, Func<TRow, T> cell, params T[] notDetermined)
        where T : struct, Enum
    {
        words[name] = [.. Enum.GetValues<T>().Except(notDetermined).Select(WordOf)];
        return Add(name, CsvKind.Text, meaning, r => notDetermined.Contains(cell(r)) ? null : WordOf(cell(r)));
    }

    /// <summary>A column of words that the record holds as text already.</summary>
    public TableSheet<TRow> Word(string name, string meaning, string[] list, Func<TRow, string> cell)
    {
        words[name] = list;
        return Add(name, CsvKind.Text, meaning, cell);
    }

    public TableSheet<TRow> Count(string name, string meaning, Func<TRow, long?> cell) =>
        Add(name, CsvKind.Integer, meaning, r => cell(r));

    public TableSheet<TRow> Number(string name, string meaning, Func<TRow, double?> cell) =>
        Add(name, CsvKind.Number, meaning, r => cell(r));

    public TableSheet<TRow> Metres(string name, string meaning, Func<TRow, double?> cell) =>
        Add(name, CsvKind.Metres, meaning, r => cell(r));

    public TableSheet<TRow> Angle(string name, string meaning, Func<TRow, double?> cell) =>
        Add(name, CsvKind.AngleDeg, meaning, r => cell(r));

    public TableSheet<TRow> Azimuth(string name, string meaning, Func<TRow, double?> cell) =>
        Add(name, CsvKind.AzimuthDeg, meaning, r => cell(r));

    public TableSheet<TRow> Axis(string name, string meaning, Func<TRow, double?> cell) =>
        Add(name, CsvKind.AxisDeg, meaning, r => cell(r));

    /// <summary>Three columns of metres: the value and its 95 % limits, named stem_m, stem_low95_m, stem_high95_m.</summary>
    public TableSheet<TRow> MetresWithLimits(string stem, string meaning, Func<TRow, Estimate?> cell, string? valueName = null) =>
        Metres(valueName ?? stem + "_m", meaning, r => cell(r)?.Value)
        .Metres(stem + "_low95_m", "Lower 95 % limit of the same.", r => cell(r)?.Low95)
        .Metres(stem + "_high95_m", "Upper 95 % limit of the same.", r => cell(r)?.High95);

    private TableSheet<TRow> Add(string name, CsvKind kind, string meaning, Func<TRow, object?> cell)
    {
        columns.Add(new(name, kind, UnitOf(name, kind), meaning));
        cells.Add(cell);
        return this;
    }

    private static string WordOf<T>(T value)
        where T : struct, Enum =>
        // A and B name the margins everywhere in capitals; all other words are lower case.
        value is Records.Contacts.Margin ? value.ToString() : JsonNamingPolicy.SnakeCaseLower.ConvertName(value.ToString());

    // The ending of a name is its unit: typed once, in the name.
    private static string UnitOf(string name, CsvKind kind) =>
        kind is CsvKind.Text or CsvKind.Integer ? ""
        : name.EndsWith("_per_m", StringComparison.Ordinal) ? "per metre"
        : name.EndsWith("_m2", StringComparison.Ordinal) ? "square metre"
        : name.EndsWith("_m", StringComparison.Ordinal) ? "metre"
        : name.EndsWith("_deg", StringComparison.Ordinal) ? "degree"
        : "";
}
