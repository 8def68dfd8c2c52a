using System.Text.Json.Nodes;
using CloudStruct.Formats.Gltf;
using CloudStruct.Products.Plots;
using CloudStruct.Products.Tables;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using SkiaSharp;
using static System.FormattableString;

namespace CloudStruct.Products.Model;

/// <summary>Writes model/faces.glb: faces as their outlines, contacts as strips, the thinned cloud; attitudes in the extras of each node.</summary>
internal static class ModelWriter
{
    // Faces let a little of the cloud through, so that one sees whose rock they are.
    private const double Clear = 0.15;

    /// <summary>Writes the model; the stream stays open.</summary>
    public static void Write(Stream stream, Findings findings, DrawingsRecord drawings, RunFacts facts)
    {
        var parts = new List<GltfPart>();
        parts.AddRange(Faces(findings, drawings));
        parts.AddRange(drawings.Strips.Select((s, i) => Strip(findings, s, i)));
        if (drawings.Cloud.X.Length > 0)
        {
            parts.Add(new GltfPart
            {
                Name = "cloud",
                Group = "rock",
                Places = Interleaved(drawings.Cloud),
                Rgb = drawings.Cloud.Rgb,
                Facts = new JsonObject { ["points"] = drawings.Cloud.X.Length, ["spacing_m"] = Math.Round(drawings.Cloud.SpacingM, 4) },
            });
        }

        SurveyFrame frame = findings.Intake.Frame;
        GltfModelWriter.Write(stream, parts, "CloudStruct " + facts.ToolVersion, new JsonObject
        {
            ["survey"] = findings.SurveyName,
            ["run_id"] = facts.RunId,
            ["frame"] = "metres; x east, y up, z south of the origin",
            ["origin_x_m"] = frame.Origin.X,
            ["origin_y_m"] = frame.Origin.Y,
            ["origin_z_m"] = frame.Origin.Z,
            ["crs"] = FrameWords.Crs(frame.Crs),
            ["north"] = FrameWords.NorthSentence(frame, facts),
        });
    }

    private static IEnumerable<GltfPart> Faces(Findings findings, DrawingsRecord drawings)
    {
        FaceRow[] rows = [.. FaceRow.Of(findings)];
        Dictionary<string, int> setNumber = SetNumbers(findings);
        FaceShapes shapes = drawings.Faces;
        for (int f = 0; f < Math.Min(rows.Length, shapes.VertexFrom.Length - 1); f++)
        {
            int from = shapes.VertexFrom[f], count = shapes.VertexFrom[f + 1] - from;
            int triangles = shapes.TriangleFrom[f + 1] - shapes.TriangleFrom[f];
            if (count < 3 || triangles == 0) continue;
            FaceRow row = rows[f];
            SKColor colour = setNumber.TryGetValue(row.Set, out int n) ? Palette.Group(n).Colour : Palette.NoSet;
            float[] places = new float[3 * count];
            for (int v = 0; v < count; v++)
                (places[3 * v], places[(3 * v) + 1], places[(3 * v) + 2]) = (shapes.X[from + v], shapes.Y[from + v], shapes.Z[from + v]);
            yield return new GltfPart
            {
                Name = Invariant($"face {row.Face.FaceId}"),
                Group = "faces",
                Places = places,
                Triangles = shapes.Triangles.AsSpan(shapes.TriangleFrom[f], triangles).ToArray(),
                Colour = (colour.Red, colour.Green, colour.Blue),
                Clear = Clear,
                Facts = new JsonObject
                {
                    ["face_id"] = row.Face.FaceId,
                    ["domain"] = row.Domain.ToString().ToLowerInvariant(),
                    ["set"] = row.Set,
                    ["strike_deg"] = Math.Round(row.Face.Attitude.StrikeDeg, 2),
                    ["dip_deg"] = Math.Round(row.Face.Attitude.DipDeg, 2),
                    ["dip_direction_deg"] = Math.Round(row.Face.Attitude.DipDirectionDeg, 2),
                    ["cone95_total_deg"] = Round(row.Face.Region.Cone95TotalDeg),
                    ["area_m2"] = Math.Round(row.Face.AreaM2, 4),
                    ["grade"] = row.Face.Region.Grade.ToString().ToLowerInvariant(),
                },
            };
        }
    }

    private static GltfPart Strip(Findings findings, ContactStrip strip, int number)
    {
        Contact contact = findings.Contacts.Contacts[strip.Contact];
        int n = strip.Upper.Length;
        float[] places = new float[6 * n];
        for (int i = 0; i < n; i++)
        {
            Put(6 * i, strip.Upper[i]);
            Put((6 * i) + 3, strip.Lower[i]);
        }

        int[] triangles = [.. Enumerable.Range(0, n - 1).SelectMany(i => new[] { 2 * i, (2 * i) + 1, (2 * i) + 2, (2 * i) + 2, (2 * i) + 1, (2 * i) + 3 })];
        SKColor colour = Palette.Group(strip.Constraint == Constraint.Plane ? 1 : 3).Colour;
        return new GltfPart
        {
            Name = Invariant($"dike {strip.Dike} margin {strip.Margin} segment {contact.Segment}, strip {number + 1}"),
            Group = "contacts",
            Places = places,
            Triangles = triangles,
            Colour = (colour.Red, colour.Green, colour.Blue),
            Facts = new JsonObject
            {
                ["dike"] = contact.Dike,
                ["margin"] = contact.Margin.ToString(),
                ["segment"] = contact.Segment,
                ["constraint"] = contact.Constraint.ToString().ToLowerInvariant(),
                ["strike_deg"] = Round(contact.Attitude?.StrikeDeg),
                ["dip_deg"] = Round(contact.Attitude?.DipDeg),
                ["cone95_total_deg"] = Round(contact.Region?.Cone95TotalDeg),
                ["line_trend_deg"] = Round(contact.LineTrendDeg),
                ["line_plunge_deg"] = Round(contact.LinePlungeDeg),
            },
        };

        void Put(int at, Vec3 p) => (places[at], places[at + 1], places[at + 2]) = ((float)p.X, (float)p.Y, (float)p.Z);
    }

    // The hue of a set is its number within its domain, as on the nets.
    private static Dictionary<string, int> SetNumbers(Findings findings) => findings.Sets.Sets
        .Where(s => s.Zone == "").GroupBy(s => s.Domain)
        .SelectMany(g => g.Select((s, i) => (s.Set, i)))
        .ToDictionary(s => s.Set, s => s.i, StringComparer.Ordinal);

    private static float[] Interleaved(ThinnedCloud cloud)
    {
        float[] places = new float[3 * cloud.X.Length];
        for (int i = 0; i < cloud.X.Length; i++) (places[3 * i], places[(3 * i) + 1], places[(3 * i) + 2]) = (cloud.X[i], cloud.Y[i], cloud.Z[i]);
        return places;
    }

    private static double? Round(double? value) => value is { } v && double.IsFinite(v) ? Math.Round(v, 2) : null;
}
