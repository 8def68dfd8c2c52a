using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;
using CloudStruct.Formats.Tables;
using CloudStruct.Products.Tables;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;

namespace CloudStruct.Products.Report;

/// <summary>What the linked page shows, as JSON: the very cells of the tables, and the lines and places of the records.</summary>
internal sealed class PageData : IDisposable
{
    private static readonly (string Name, string File)[] Tables =
    [
        ("faces", "faces.csv"), ("stations", "width.csv"), ("contacts", "contacts.csv"), ("sets", "sets.csv"), ("decisions", "decisions.csv"),
    ];

    private readonly MemoryStream bytes = new();
    private readonly Utf8JsonWriter json;

    private PageData() => json = new Utf8JsonWriter(bytes, new JsonWriterOptions { Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping });

    /// <summary>The data of a run, compressed, as text.</summary>
    public static string Text(Findings findings, DrawingsRecord drawings, RunFacts facts, PackedCloud? cloud)
    {
        using var data = new PageData();
        data.Write(findings, drawings, facts, cloud);
        data.json.Flush();
        return PackedCloud.Squeeze(data.bytes.ToArray());
    }

    public void Dispose()
    {
        json.Dispose();
        bytes.Dispose();
    }

    private void Write(Findings f, DrawingsRecord drawings, RunFacts facts, PackedCloud? cloud)
    {
        SurveyFrame frame = f.Intake.Frame;
        json.WriteStartObject();
        json.WriteString("survey", f.SurveyName);
        json.WriteString("run", facts.RunId);
        json.WriteString("version", facts.ToolVersion);
        json.WriteString("north", frame.North.ToString().ToLowerInvariant());
        json.WriteNumber("turn", frame.TurnDeg);
        Place("origin", frame.Origin);
        json.WriteBoolean("colour", f.Described.Cloud.HasColour);
        json.WriteNumber("spacing", Rounded(drawings.Cloud.SpacingM));
        json.WriteNumber("working", f.Described.Cloud.Count);
        json.WriteNumber("smallestFace", f.Faces.SmallestFaceM2);
        List("tables", Tables, t =>
        {
            ITableSheet sheet = Sheets.All.Single(s => s.File == t.File);
            Table(t.Name, sheet.Applies(f) ? sheet.Fill(f) : null, sheet);
        });
        List("dikes", f.Contacts.Dikes, d => Dike(f, d));
        List("traces", f.Contacts.Traces, t => Trace(t));
        List("stations", f.Width.Stations, s => Station(s));
        List("contacts", f.Contacts.Contacts, c => Contact(c));
        List("nets", drawings.Nets, n => Net(n));
        List("decisions", f.Decisions.Outcomes, o => Decision(o));
        if (cloud != null) Cloud(cloud);
        json.WriteEndObject();
    }

    private void Table(string name, CsvSheet? filled, ITableSheet sheet)
    {
        json.WriteStartObject();
        json.WriteString("name", name);
        json.WriteString("file", sheet.File);
        json.WriteString("title", sheet.Title);
        List("columns", sheet.Columns, c =>
        {
            json.WriteStartObject();
            json.WriteString("name", c.Name);
            json.WriteString("meaning", c.Description);
            json.WriteBoolean("text", c.Kind == CsvKind.Text);
            json.WriteEndObject();
        });
        List("rows", filled?.Rows ?? [], row =>
        {
            json.WriteStartArray();
            foreach (string cell in row) json.WriteStringValue(cell);
            json.WriteEndArray();
        });
        json.WriteEndObject();
    }

    private void Dike(Findings f, DikeFrame d)
    {
        json.WriteStartObject();
        json.WriteNumber("dike", d.Dike);
        json.WriteBoolean("aIsLower", d.AIsLower);
        json.WriteString("toward", FrameWords.Toward(f, d.Dike));
        json.WriteStartArray("line");
        for (int i = 0; i < d.CentreLine.Length; i++) Numbers(d.CentreLine[i].X, d.CentreLine[i].Y, d.CentreLine[i].Z, d.ChainageM[i]);
        json.WriteEndArray();
        List("normals", d.Normal, n => Numbers(n.X, n.Y, n.Z));
        json.WriteEndObject();
    }

    private void Trace(MarginTrace t)
    {
        json.WriteStartObject();
        json.WriteNumber("dike", t.Dike);
        json.WriteString("margin", t.Margin.ToString());
        json.WriteStartArray("line");
        for (int i = 0; i < t.Points.Length; i++) Numbers(t.Points[i].X, t.Points[i].Y, t.Points[i].Z, t.ChainageM[i]);
        json.WriteEndArray();
        json.WriteEndObject();
    }

    private void Station(Station s)
    {
        json.WriteStartObject();
        json.WriteNumber("dike", s.Dike);
        json.WriteNumber("station", s.Number);
        json.WriteNumber("chainage", Rounded(s.ChainageM));
        Place("place", s.Place);
        if (s.AtA is { } a) Place("a", a);
        if (s.AtB is { } b) Place("b", b);
        if (s.LeanToBDeg is { } lean && double.IsFinite(lean)) json.WriteNumber("lean", Rounded(lean));
        if (s.TrueWidthM is { } w && double.IsFinite(w)) json.WriteNumber("width", Rounded(w));
        json.WriteEndObject();
    }

    private void Contact(Contact c)
    {
        json.WriteStartObject();
        json.WriteNumber("dike", c.Dike);
        json.WriteString("margin", c.Margin.ToString());
        json.WriteNumber("segment", c.Segment);
        json.WriteNumber("from", Rounded(c.ChainageFromM));
        json.WriteNumber("to", Rounded(c.ChainageToM));
        Place("middle", c.Middle);
        if (c.Normal is { } n) Place("normal", n);
        json.WriteEndObject();
    }

    private void Net(NetDrawing n)
    {
        json.WriteStartObject();
        json.WriteString("name", n.Name);
        json.WriteString("sentence", n.Sentence);
        List("groups", n.Groups, g => json.WriteStringValue(g));
        List("curves", n.Curves, c =>
        {
            json.WriteStartObject();
            json.WriteString("kind", c.Kind);
            json.WriteString("group", c.Group);
            json.WriteNumber("level", c.Level);
            List("points", c.Points, p => Numbers(p.X, p.Y));
            json.WriteEndObject();
        });
        json.WriteEndObject();
    }

    // The row as it would be written again: the page hands on what was decided before, so that its file replaces the old one.
    private void Decision(DecisionOutcome o)
    {
        Decision d = o.Decision;
        json.WriteStartObject();
        json.WriteString("action", JsonNamingPolicy.SnakeCaseLower.ConvertName(d.Action.ToString()));
        json.WriteBoolean("applied", o.Applied);
        json.WriteString("found", o.Found);
        json.WriteNumber("faceId", d.FaceId);
        if (d.Place is { } p) Place("place", p);
        if (d.Attitude is { } a) Plane("attitude", a);
        if (d.Other is { } b) Plane("other", b);
        json.WriteString("north", d.North?.ToString().ToLowerInvariant() ?? "");
        json.WriteString("domain", d.Domain == FaceDomain.Unknown ? "" : d.Domain.ToString().ToLowerInvariant());
        json.WriteString("set", d.Set);
        json.WriteString("otherSet", d.OtherSet);
        json.WriteNumber("dike", d.Dike);
        json.WriteString("margin", d.Margin?.ToString() ?? "");
        json.WriteString("note", d.Note);
        json.WriteString("by", d.By);
        json.WriteString("on", d.On);
        json.WriteEndObject();
    }

    private void Cloud(PackedCloud cloud)
    {
        json.WriteStartObject("cloud");
        json.WriteNumber("count", cloud.Count);
        json.WriteNumber("step", cloud.StepM);
        Place("min", cloud.MinM);
        List("outlines", cloud.Outlines, n => json.WriteNumberValue(n));
        List("triangles", cloud.Triangles, n => json.WriteNumberValue(n));
        json.WriteEndObject();
    }

    private void Plane(string name, Attitude a)
    {
        json.WritePropertyName(name);
        Numbers(a.StrikeDeg, a.DipDeg);
    }

    private void Place(string name, Vec3 v)
    {
        json.WritePropertyName(name);
        Numbers(v.X, v.Y, v.Z);
    }

    private void Numbers(params ReadOnlySpan<double> values)
    {
        json.WriteStartArray();
        foreach (double v in values) json.WriteNumberValue(Rounded(v));
        json.WriteEndArray();
    }

    private void List<T>(string name, IEnumerable<T> items, Action<T> write)
    {
        json.WriteStartArray(name);
        foreach (T item in items) write(item);
        json.WriteEndArray();
    }

    private static double Rounded(double v) => double.IsFinite(v) ? Math.Round(v, 4) : 0;
}
