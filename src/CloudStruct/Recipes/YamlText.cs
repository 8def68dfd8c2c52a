using CloudStruct.Records.Complaints;
using YamlDotNet.Core;
using YamlDotNet.RepresentationModel;

namespace CloudStruct.Recipes;

/// <summary>YAML text to a tree that knows its lines.</summary>
internal static class YamlText
{
    /// <summary>The mapping at the top of a document; an empty mapping for an empty document.</summary>
    /// <exception cref="InputException">The text is not YAML, or not a mapping.</exception>
    public static YamlMappingNode Parse(string text, string file)
    {
        var stream = new YamlStream();
        try
        {
            stream.Load(new StringReader(text));
        }
        catch (YamlException e)
        {
            throw new InputException(
                FormattableString.Invariant($"{file}, line {e.Start.Line}"),
                "this is not valid YAML",
                e.InnerException?.Message ?? e.Message,
                "Check indentation and colons near this line; values with a colon or # need quotes",
                e);
        }

        if (stream.Documents.Count == 0) return [];
        return stream.Documents[0].RootNode switch
        {
            YamlMappingNode map => map,
            YamlScalarNode { Value: null or "" } => [],
            YamlNode other => throw new InputException(
                FormattableString.Invariant($"{file}, line {other.Start.Line}"),
                "settings are expected as 'key: value' lines",
                "a " + (other is YamlSequenceNode ? "list" : "single value"),
                "Write one 'key: value' a line"),
        };
    }
}
