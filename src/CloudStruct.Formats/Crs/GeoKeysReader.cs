using System.Buffers.Binary;
using System.Text;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Crs;

/// <summary>Coordinate system from GeoTIFF keys as LAS stores them.</summary>
/// <remarks>OGC GeoTIFF 1.1: directory of (key, where, count, value); key and code numbers are those of the standard.</remarks>
internal sealed class GeoKeysReader
{
    private const int UserDefined = 32767;

    private readonly Dictionary<int, int> codes = [];
    private readonly Dictionary<int, double> doubles = [];
    private readonly Dictionary<int, string> texts = [];
    private readonly List<string> problems = [];
    private readonly CrsDraft draft = new();

    private GeoKeysReader(byte[] directory, byte[] doubleValues, byte[] textValues)
    {
        int entries = directory.Length >= 8 ? U16(directory, 6) : 0;
        int room = Math.Max(0, (directory.Length / 8) - 1);
        if (entries > room) problems.Add(Invariant($"The GeoTIFF directory declares {entries} keys, {room} are there."));
        for (int i = 0; i < Math.Min(entries, room); i++)
        {
            int at = 8 + (8 * i), key = U16(directory, at), where = U16(directory, at + 2), count = U16(directory, at + 4), value = U16(directory, at + 6);
            if (where == 0)
            {
                codes[key] = value;
            }
            else if (where == 34736)
            {
                if ((8 * value) + 8 <= doubleValues.Length) doubles[key] = BinaryPrimitives.ReadDoubleLittleEndian(doubleValues.AsSpan(8 * value));
                else problems.Add(Invariant($"GeoTIFF key {key} names a number that is not there."));
            }
            else if (where == 34737)
            {
                if (value + count <= textValues.Length) texts[key] = Encoding.UTF8.GetString(textValues, value, count).Trim('\0', '|', ' ');
                else problems.Add(Invariant($"GeoTIFF key {key} names a text that is not there."));
            }
        }
    }

    /// <summary>Reads the three records; the last two may be empty.</summary>
    public static CrsFound Read(byte[] directory, byte[] doubleValues, byte[] textValues) =>
        new GeoKeysReader(directory, doubleValues, textValues).Read();

    private CrsFound Read()
    {
        int model = Code(1024), projected = Code(3072);
        if (codes.Count == 0 && texts.Count == 0) return new CrsFound(CrsInfo.None, [.. problems]);
        CrsDraft d = draft;
        if (projected is > 0 and < UserDefined && EpsgRules.Find(projected) is CrsDraft known) d = known;
        d.Source = "GeoTIFF keys";
        string citation = Text(3073, Text(1026, ""));
        if (model == 1 || projected > 0 || Code(3075) > 0) Projected(d, projected, citation);
        else if (model is 2 or 3 || Code(2048) > 0) Geographic(d, model);
        else d.Name = citation;
        Vertical(d);
        return new CrsFound(d.Done(), [.. problems]);
    }

    private void Projected(CrsDraft d, int projected, string citation)
    {
        d.Kind = CrsKind.Projected;
        bool coded = projected is > 0 and < UserDefined;
        if (coded) d.Epsg = projected;
        if (d.Name.Length == 0) d.Name = citation.Length > 0 ? citation : coded ? Invariant($"EPSG:{projected}") : "";
        d.HorizontalUnitM = HorizontalUnit(d, coded ? projected : 0, citation);
        if (d.Parameters.Count == 0) Parameters(d);
        if (d.Method == Methods.WebMercator)
            problems.Add("Web Mercator stretches lengths by 1/cos(latitude): widths and areas come out too large. Reproject the cloud to UTM or a national grid.");
    }

    private double HorizontalUnit(CrsDraft d, int code, string citation)
    {
        int unit = Code(3076);
        if (unit is > 0 and < UserDefined)
        {
            if (Units.MetresOf(unit) is double metres) return metres;
            problems.Add(Invariant($"The linear unit code {unit} is not known; metres are assumed."));
            return 1;
        }
        if (doubles.TryGetValue(3077, out double size) && size > 0) return Math.Abs(size - Units.UsFootM) < 1e-9 ? Units.UsFootM : size;
        if (code > 0 && EpsgRules.FeetOf(code) is double feet) return feet;
        if (Units.MetresOf(citation) is double cited) return cited;
        if (code > 0 && EpsgRules.Find(code) == null)
            problems.Add(Invariant($"EPSG:{code} is not known here and no unit is stated: metres are assumed. State crs or unit in survey.yaml if it is in feet."));
        return 1;
    }

    private void Parameters(CrsDraft d)
    {
        int method = Code(3075), utm = Code(3074);
        Ellipsoid(d);
        if (utm is >= 16001 and <= 16060 or >= 16101 and <= 16160)
        {
            bool south = utm > 16100;
            int zone = utm - (south ? 16100 : 16000);
            d.Method = Methods.TransverseMercator;
            Add(d, "latitude_of_origin_deg", 0);
            Add(d, "central_meridian_deg", (6 * zone) - 183);
            Add(d, "scale_factor", 0.9996);
            Add(d, "false_easting_m", 500000);
            Add(d, "false_northing_m", south ? 10000000 : 0);
            return;
        }
        d.Method = method switch
        {
            0 => d.Method,
            1 => Methods.TransverseMercator,
            7 => Methods.Mercator,
            8 or 9 => Methods.LambertConic,
            11 => Methods.Albers,
            15 => Methods.PolarStereographic,
            _ => Invariant($"projection method {method}"),
        };
        if (method == 0) return;
        double degrees = Units.DegreesOf(Code(2054)) ?? 1;
        First(d, "latitude_of_origin_deg", degrees, 3081, 3085, 3089);
        First(d, "central_meridian_deg", degrees, 3080, 3084, 3088, 3095);
        First(d, "standard_parallel_1_deg", degrees, 3078);
        First(d, "standard_parallel_2_deg", degrees, 3079);
        First(d, "scale_factor", 1, 3092, 3093);
        First(d, "false_easting_m", d.HorizontalUnitM, 3082, 3086, 3090);
        First(d, "false_northing_m", d.HorizontalUnitM, 3083, 3087, 3091);
    }

    private void Ellipsoid(CrsDraft d)
    {
        // Geographic and ellipsoid codes of the EPSG registry that files use.
        (d.EllipsoidName, d.SemiMajorM, d.InverseFlattening) = (Code(2048), Code(2056)) switch
        {
            (4326, _) or (_, 7030) => ("WGS 84", 6378137, 298.257223563),
            (4258 or 4269 or 4171 or 4619 or 4283 or 6318 or 4167 or 4659 or 4152, _) or (_, 7019) => ("GRS 1980", 6378137, 298.257222101),
            (4230, _) or (_, 7022) => ("International 1924", 6378388, 297),
            (4267, _) or (_, 7008) => ("Clarke 1866", 6378206.4, 294.978698213898),
            (4277, _) or (_, 7001) => ("Airy 1830", 6377563.396, 299.3249646),
            (4314 or 4312, _) or (_, 7004) => ("Bessel 1841", 6377397.155, 299.1528128),
            _ => ("unknown", 0.0, 0.0),
        };
        if (doubles.TryGetValue(2057, out double a) && a is > 6.3e6 and < 6.4e6)
        {
            d.SemiMajorM = a;
            if (doubles.TryGetValue(2059, out double f)) d.InverseFlattening = f;
            else if (doubles.TryGetValue(2058, out double b) && b < a) d.InverseFlattening = a / (a - b);
        }
        d.GeographicName = GeographicName();
        d.DatumName = d.GeographicName;
    }

    // Some writers put several facts into the citation: "GCS Name = NAD83(HARN)|Primem = Greenwich".
    private string GeographicName()
    {
        int code = Code(2048);
        string name = Text(2049, code is > 0 and < UserDefined ? Invariant($"EPSG:{code}") : "unknown").Split('|')[0];
        int equals = name.IndexOf('=', StringComparison.Ordinal);
        return equals < 0 ? name.Trim() : name[(equals + 1)..].Trim();
    }

    private void Geographic(CrsDraft d, int model)
    {
        d.Kind = CrsKind.Geographic;
        int code = Code(2048);
        if (code is > 0 and < UserDefined) d.Epsg = code;
        d.Name = Text(2049, Text(1026, code > 0 ? Invariant($"EPSG:{code}") : ""));
        Ellipsoid(d);
        if (model == 3) problems.Add("Coordinates are geocentric, not on a map grid.");
    }

    private void Vertical(CrsDraft d)
    {
        int code = Code(4096), unit = Code(4099);
        d.VerticalName = Text(4097, code is > 0 and < UserDefined ? Invariant($"EPSG:{code}") : "");
        if (unit is > 0 and < UserDefined && Units.MetresOf(unit) is double metres)
        {
            d.VerticalUnitM = metres;
            return;
        }
        // EPSG:6360 is the height system of 5703 in US survey feet, 8228 in international feet.
        if (code == 6360) d.VerticalUnitM = Units.UsFootM;
        else if (code == 8228) d.VerticalUnitM = Units.FootM;
        else if (code is 5703 or 5773 or 3855 or 5621 or 5730)
        {
            d.VerticalUnitM = 1;
            if (d.HorizontalUnitM != 1)
                problems.Add(Invariant($"Heights are taken as metres because EPSG:{code} says so, though x and y are in feet. State crs in survey.yaml if they are in feet too."));
        }
    }

    private void First(CrsDraft d, string name, double factor, params ReadOnlySpan<int> keys)
    {
        foreach (int key in keys)
        {
            if (!doubles.TryGetValue(key, out double v) || !double.IsFinite(v)) continue;
            Add(d, name, v * factor);
            return;
        }
    }

    private static void Add(CrsDraft d, string name, double value) => d.Parameters.Add(new CrsParameter(name, value));

    private int Code(int key) => codes.GetValueOrDefault(key);

    private string Text(int key, string otherwise) => texts.GetValueOrDefault(key) is { Length: > 0 } t ? t : otherwise;

    private static int U16(byte[] bytes, int at) => BinaryPrimitives.ReadUInt16LittleEndian(bytes.AsSpan(at));
}
