using System.Globalization;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Complaints;
using NetTopologySuite.Features;
using static System.FormattableString;

namespace CloudStruct.Formats.GeoJson;

/// <summary>Hand labels drawn as polygons in a GeoJSON file: properties class, use, z_min_m, z_max_m.</summary>
internal static class GeoJsonLabels
{
    /// <summary>Reads all features.</summary>
    public static HandLabels Read(string path)
    {
        var polygons = new List<LabelPolygon>();
        var points = new List<LabelPoint>();
        int n = 0;
        foreach (IFeature feature in GeoJsonFile.Read(path))
        {
            string where = Invariant($"{Path.GetFileName(path)}, feature {++n}");
            string Text(string name) => feature.Attributes?.GetOptionalValue(name) is object v ? Convert.ToString(v, CultureInfo.InvariantCulture) ?? "" : "";
            double? Number(string name)
            {
                string text = Text(name);
                if (text.Length == 0) return null;
                return double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out double v) && double.IsFinite(v) ? v
                    : throw new InputException(where, Invariant($"{name} is not a number"), text, "Correct the property");
            }
            LabelShapes.Add(where, feature.Geometry, Text, Number, polygons, points);
        }
        return new HandLabels { Polygons = [.. polygons], Points = [.. points] };
    }
}
