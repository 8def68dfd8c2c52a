using System.Reflection;
using System.Text.Json.Nodes;
using CloudStruct.Records.Stages;

namespace CloudStruct.Recipes;

/// <summary>A recipe in full, every setting with its value, as it stands in run.json.</summary>
internal static class RecipeJson
{
    /// <summary>Settings by recipe key; automatic ones are null.</summary>
    public static JsonObject Of(object settings)
    {
        var json = new JsonObject();
        foreach ((string key, PropertyInfo property) in RecipeReader.Known(settings.GetType()))
        {
            object? value = property.GetValue(settings);
            json[key] = value switch
            {
                null => null,
                IStageSettings s => Of(s),
                bool b => b,
                int i => i,
                double d => d,
                Enum e => Words.Snake(e.ToString()),
                _ => FormattableString.Invariant($"{value}"),
            };
        }

        return json;
    }
}
