using CloudStruct.Formats.Crs;
using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.GeoTiff;

/// <summary>A coordinate system as GeoTIFF keys (OGC 19-008r4, annex B): its EPSG code, or method and parameters.</summary>
internal static class GeoKeys
{
    private const ushort UserDefined = 32767, Metre = 9001, Degree = 9102, Greenwich = 8901, DoubleTag = 34736, TextTag = 34737;

    /// <summary>The tags 34735 to 34737; for a system that is not projected in metres only that pixels are areas.</summary>
    public static IEnumerable<TiffTag> Of(CrsInfo crs)
    {
        var keys = new List<(ushort Key, ushort At, ushort Count, ushort Value)> { (1025, 0, 1, 1) };
        var doubles = new List<double>();
        string text = "";
        if (crs is { Kind: CrsKind.Projected, HorizontalUnitM: 1 })
        {
            keys.Add((1024, 0, 1, 1));
            if (crs.Name.Length > 0)
            {
                text = crs.Name + "|";
                keys.Add((1026, TextTag, (ushort)text.Length, 0));
            }

            if (crs.Epsg is > 0 and < UserDefined) keys.Add((3072, 0, 1, (ushort)crs.Epsg));
            else Own(crs, keys, doubles);
            keys.Add((3076, 0, 1, Metre));
        }

        keys.Sort((a, b) => a.Key.CompareTo(b.Key));
        yield return TiffTag.Shorts(34735, [1, 1, 1, (ushort)keys.Count, .. keys.SelectMany(k => new[] { k.Key, k.At, k.Count, k.Value })]);
        if (doubles.Count > 0) yield return TiffTag.Doubles(DoubleTag, [.. doubles]);
        if (text.Length > 0) yield return TiffTag.Text(TextTag, text);
    }

    private static void Own(CrsInfo crs, List<(ushort Key, ushort At, ushort Count, ushort Value)> keys, List<double> doubles)
    {
        bool two = crs.Parameters.Any(p => p.Name == "standard_parallel_2_deg");
        ushort method = crs.Method switch
        {
            Methods.TransverseMercator => 1,
            Methods.Mercator => 7,
            Methods.LambertConic => (ushort)(two ? 8 : 9),
            Methods.Albers => 11,
            Methods.PolarStereographic => 15,
            _ => 0,
        };
        if (method == 0 || !(crs.SemiMajorM > 0)) return;
        keys.Add((3072, 0, 1, UserDefined));
        keys.Add((3074, 0, 1, UserDefined));
        keys.Add((3075, 0, 1, method));
        keys.Add((2048, 0, 1, UserDefined));
        keys.Add((2050, 0, 1, UserDefined));
        keys.Add((2051, 0, 1, Greenwich));
        keys.Add((2054, 0, 1, Degree));
        keys.Add((2056, 0, 1, UserDefined));
        Number(2057, crs.SemiMajorM);
        Number(2059, crs.InverseFlattening);
        foreach (CrsParameter p in crs.Parameters)
        {
            // The conic methods of two parallels place their origin by the keys of a false origin, the polar by the pole's meridian.
            bool conic = method is 8;
            ushort key = p.Name switch
            {
                "standard_parallel_1_deg" when method == 15 => 3081,
                "standard_parallel_1_deg" => 3078,
                "standard_parallel_2_deg" => 3079,
                "central_meridian_deg" => (ushort)(method == 15 ? 3095 : conic ? 3084 : 3080),
                "latitude_of_origin_deg" => (ushort)(conic ? 3085 : 3081),
                "false_easting_m" => (ushort)(conic ? 3086 : 3082),
                "false_northing_m" => (ushort)(conic ? 3087 : 3083),
                "scale_factor" => 3092,
                _ => 0,
            };
            if (key != 0 && !keys.Exists(k => k.Key == key)) Number(key, p.Value);
        }

        void Number(ushort key, double value)
        {
            keys.Add((key, DoubleTag, 1, (ushort)doubles.Count));
            doubles.Add(value);
        }
    }
}
