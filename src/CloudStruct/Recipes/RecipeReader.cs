using System.Globalization;
using System.Reflection;
using CloudStruct.Records.Stages;
using YamlDotNet.RepresentationModel;

namespace CloudStruct.Recipes;

/// <summary>Lays a YAML mapping over a recipe; every fault is noted with its line and the nearest known key, none stops the reading.</summary>
internal sealed class RecipeReader(string file, List<SettingFault> faults)
{
    /// <summary>The recipe with the settings of the mapping put over it.</summary>
    public Recipe Lay(Recipe under, YamlMappingNode map) => (Recipe)Lay(under, map, "");

    private object Lay(object under, YamlMappingNode map, string prefix)
    {
        object copy = Copy(under);
        Dictionary<string, PropertyInfo> known = Known(under.GetType());
        foreach ((YamlNode keyNode, YamlNode value) in map.Children)
        {
            string key = (keyNode as YamlScalarNode)?.Value ?? "";
            if (!known.TryGetValue(key, out PropertyInfo? property))
            {
                string? near = Words.Nearest(key, known.Keys);
                Fault(keyNode, prefix + key, near is null
                    ? $"this key is not known; known here are {string.Join(", ", known.Keys.Order(StringComparer.Ordinal))}"
                    : $"this key is not known; did you mean {prefix}{near}?");
                continue;
            }

            if (typeof(IStageSettings).IsAssignableFrom(property.PropertyType))
            {
                if (value is YamlMappingNode section) property.SetValue(copy, Lay(property.GetValue(copy)!, section, key + "."));
                else if (value is not YamlScalarNode { Value: null or "" }) Fault(value, prefix + key, "settings of a stage are expected, indented beneath it");
            }
            else if (value is YamlScalarNode scalar)
            {
                if (Convert(scalar.Value ?? "", property.PropertyType, out object? result)) property.SetValue(copy, result);
                else Fault(value, prefix + key, $"'{scalar.Value}' is not {Kind(property.PropertyType)}");
            }
            else
            {
                Fault(value, prefix + key, $"{Kind(property.PropertyType)} is expected, not a list or section");
            }
        }

        return copy;
    }

    /// <summary>Recipe keys of a settings type and their properties.</summary>
    public static Dictionary<string, PropertyInfo> Known(Type type) =>
        type.GetProperties(BindingFlags.Public | BindingFlags.Instance)
            .Where(p => p.SetMethod is not null)
            .ToDictionary(p => Words.Snake(p.Name), StringComparer.Ordinal);

    private static bool Convert(string text, Type type, out object? value)
    {
        Type? inner = Nullable.GetUnderlyingType(type);
        if (inner is not null && text is "auto" or "~" or "null" or "")
        {
            value = null;
            return true;
        }

        type = inner ?? type;
        value = null;
        if (type == typeof(string)) value = text;
        else if (type == typeof(double) && double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out double d) && double.IsFinite(d)) value = d;
        else if (type == typeof(int) && int.TryParse(text, NumberStyles.Integer, CultureInfo.InvariantCulture, out int i)) value = i;
        else if (type == typeof(ulong) && ulong.TryParse(text, NumberStyles.Integer, CultureInfo.InvariantCulture, out ulong u)) value = u;
        else if (type == typeof(bool) && text is "true" or "false") value = text == "true";
        else if (type.IsEnum) value = Enum.GetValues(type).Cast<object>().FirstOrDefault(e => Words.Snake(e.ToString()!) == text);
        return value is not null;
    }

    private static string Kind(Type type)
    {
        Type inner = Nullable.GetUnderlyingType(type) ?? type;
        string kind =
            inner == typeof(double) ? "a number (with a decimal point)" :
            inner == typeof(int) || inner == typeof(ulong) ? "a whole number" :
            inner == typeof(bool) ? "true or false" :
            inner.IsEnum ? "one of " + string.Join(", ", Enum.GetNames(inner).Select(Words.Snake)) : "text";
        return inner == type ? kind : kind + " or auto";
    }

    private void Fault(YamlNode at, string key, string problem) => faults.Add(new SettingFault(file, at.Start.Line, key, problem));

    // Records copy themselves through the method that the compiler makes for 'with'.
    private static object Copy(object record) => record.GetType().GetMethod("<Clone>$")!.Invoke(record, null)!;
}
