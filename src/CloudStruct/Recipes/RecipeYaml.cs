using System.Text;
using System.Text.Json.Nodes;

namespace CloudStruct.Recipes;

/// <summary>A recipe in full as YAML text: what the report shows, and what can be saved and used again.</summary>
internal static class RecipeYaml
{
    /// <summary>Every setting with its value; automatic ones say auto.</summary>
    public static string Of(Recipe recipe)
    {
        var text = new StringBuilder();
        foreach ((string key, JsonNode? value) in RecipeJson.Of(recipe))
        {
            if (value is JsonObject section)
            {
                text.Append(key).Append(":\n");
                foreach ((string inner, JsonNode? v) in section) text.Append("  ").Append(inner).Append(": ").Append(Value(v)).Append('\n');
            }
            else
            {
                text.Append(key).Append(": ").Append(Value(value)).Append('\n');
            }
        }

        return text.ToString();
    }

    private static string Value(JsonNode? value) => value?.ToJsonString() ?? "auto";
}
