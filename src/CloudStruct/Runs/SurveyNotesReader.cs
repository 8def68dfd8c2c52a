using System.Globalization;
using CloudStruct.Recipes;
using CloudStruct.Records.Frame;
using YamlDotNet.RepresentationModel;

namespace CloudStruct.Runs;

/// <summary>Reads survey.yaml; all faults are noted with their lines.</summary>
internal sealed class SurveyNotesReader(List<SettingFault> faults)
{
    private const string FileName = "survey.yaml";

    private static readonly string[] Keys =
    [
        "name", "crs", "reference", "declination", "notation", "operator", "flight_date", "licence", "citation",
        "recipe", "settings", "offset_m", "axes", "unit",
    ];

    private static readonly string[] ReferenceKeys = ["kind", "tilt_sigma_deg", "azimuth_sigma_deg", "scale_sigma"];

    // Sigmas assumed when only the kind is given: common practice for small drone blocks, deliberately on the wide side.
    private static readonly Dictionary<string, ModelReference> Kinds = new(StringComparer.Ordinal)
    {
        ["control"] = new() { Kind = ReferenceKind.Control, TiltSigmaDeg = 0.1, AzimuthSigmaDeg = 0.1, ScaleSigma = 0.001, Source = "assumed for control" },
        ["rtk"] = new() { Kind = ReferenceKind.Rtk, TiltSigmaDeg = 0.2, AzimuthSigmaDeg = 0.2, ScaleSigma = 0.002, Source = "assumed for rtk" },
        ["camera_positions"] = new() { Kind = ReferenceKind.CameraPositions, TiltSigmaDeg = 2, AzimuthSigmaDeg = 2, ScaleSigma = 0.02, Source = "assumed for camera_positions" },
        ["scaled_only"] = new() { Kind = ReferenceKind.ScaledOnly, TiltSigmaDeg = 5, AzimuthSigmaDeg = 180, ScaleSigma = 0.02, Source = "assumed for scaled_only" },
        ["none"] = new() { Kind = ReferenceKind.None, Source = "survey.yaml" },
    };

    /// <summary>Reads the mapping.</summary>
    public SurveyNotes Read(YamlMappingNode map)
    {
        var notes = new SurveyNotes();
        foreach ((YamlNode keyNode, YamlNode value) in map.Children)
        {
            string key = (keyNode as YamlScalarNode)?.Value ?? "";
            string text = (value as YamlScalarNode)?.Value ?? "";
            if (!Keys.Contains(key, StringComparer.Ordinal))
            {
                string? near = Words.Nearest(key, Keys);
                Fault(keyNode, key, "this key is not known; " + (near is null ? $"known are {string.Join(", ", Keys)}" : $"did you mean {near}?"));
                continue;
            }

            notes = key switch
            {
                "name" => notes with { Name = text },
                "crs" => notes with { Crs = text },
                "declination" => notes with { Declination = Declination(value, text) },
                "notation" => notes with { Notation = Notation(value, text) },
                "operator" => notes with { Operator = text },
                "flight_date" => notes with { FlightDate = Date(value, text) },
                "licence" => notes with { Licence = text },
                "citation" => notes with { Citation = text },
                "recipe" => notes with { Recipe = text },
                "axes" => notes with { Axes = Axes(value, text) },
                "unit" => notes with { UnitM = Unit(value, text) },
                "offset_m" => notes with { OffsetM = Offset(value) },
                "reference" => notes with { Reference = Reference(value) },
                "settings" => notes with { Settings = Section(value, key) },
                _ => notes,
            };
        }

        return notes;
    }

    private ModelReference Reference(YamlNode node)
    {
        if (Section(node, "reference") is not { } map) return new();
        var given = map.Children.ToDictionary(c => (c.Key as YamlScalarNode)?.Value ?? "", c => c.Value);
        foreach ((string key, YamlNode at) in given.Where(g => !ReferenceKeys.Contains(g.Key, StringComparer.Ordinal)))
        {
            Fault(at, $"reference.{key}", $"this key is not known; known are {string.Join(", ", ReferenceKeys)}");
        }

        string kind = given.TryGetValue("kind", out YamlNode? k) ? (k as YamlScalarNode)?.Value ?? "" : "";
        if (!Kinds.TryGetValue(kind, out ModelReference? reference))
        {
            Fault(k ?? node, "reference.kind", $"'{kind}' is not one of {string.Join(", ", Kinds.Keys)}");
            return new();
        }

        double? tilt = Number("tilt_sigma_deg"), azimuth = Number("azimuth_sigma_deg"), scale = Number("scale_sigma");
        if (tilt is null && azimuth is null && scale is null) return reference;
        return reference with
        {
            TiltSigmaDeg = tilt ?? reference.TiltSigmaDeg,
            AzimuthSigmaDeg = azimuth ?? reference.AzimuthSigmaDeg,
            ScaleSigma = scale ?? reference.ScaleSigma,
            Source = "survey.yaml",
        };

        double? Number(string key)
        {
            if (!given.TryGetValue(key, out YamlNode? value)) return null;
            if (TryNumber(value, out double d) && d >= 0) return d;
            Fault(value, $"reference.{key}", "must be a number of at least 0, with a decimal point");
            return null;
        }
    }

    private string? Declination(YamlNode at, string text)
    {
        if (text == "wmm" || TryNumber(at, out _)) return text;
        Fault(at, "declination", $"'{text}' is neither a number of degrees (east positive) nor wmm");
        return null;
    }

    private string? Notation(YamlNode at, string text)
    {
        if (text is "strike/dip" or "dip direction/dip") return text;
        Fault(at, "notation", $"'{text}' is neither strike/dip nor dip direction/dip");
        return null;
    }

    private string? Date(YamlNode at, string text)
    {
        if (DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out _)) return text;
        Fault(at, "flight_date", $"'{text}' is not a day written as 2026-05-31");
        return null;
    }

    private string Axes(YamlNode at, string text)
    {
        string[] parts = text.Split(' ', StringSplitOptions.RemoveEmptyEntries);
        if (parts.Length == 3 && parts.Select(p => p.TrimStart('-')).Order(StringComparer.Ordinal).SequenceEqual(["x", "y", "z"])) return string.Join(' ', parts);
        Fault(at, "axes", $"'{text}' does not name each of x, y, z once, such as 'x y z' or 'x -z y' for a model with y up");
        return "x y z";
    }

    private double? Unit(YamlNode at, string text)
    {
        switch (text)
        {
            case "m": return 1;
            case "cm": return 0.01;
            case "mm": return 0.001;
            case "ft": return 0.3048;
            case "us-ft": return 1200.0 / 3937;
        }

        if (TryNumber(at, out double d) && d > 0) return d;
        Fault(at, "unit", $"'{text}' is not m, cm, mm, ft, us-ft or a number of metres");
        return null;
    }

    private Vec3 Offset(YamlNode node)
    {
        if (node is YamlSequenceNode { Children.Count: 3 } list &&
            TryNumber(list[0], out double x) && TryNumber(list[1], out double y) && TryNumber(list[2], out double z)) return new Vec3(x, y, z);
        Fault(node, "offset_m", "three numbers are expected, such as [600000, 6650000, 0]");
        return default;
    }

    private YamlMappingNode? Section(YamlNode node, string key)
    {
        if (node is YamlMappingNode map) return map;
        Fault(node, key, "keys are expected, indented beneath it");
        return null;
    }

    private static bool TryNumber(YamlNode node, out double value)
    {
        value = 0;
        return node is YamlScalarNode s && double.TryParse(s.Value, NumberStyles.Float, CultureInfo.InvariantCulture, out value) && double.IsFinite(value);
    }

    private void Fault(YamlNode at, string key, string problem) => faults.Add(new SettingFault(FileName, at.Start.Line, key, problem));
}
