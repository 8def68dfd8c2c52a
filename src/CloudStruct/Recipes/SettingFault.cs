namespace CloudStruct.Recipes;

/// <summary>One thing wrong with a recipe or a survey.yaml.</summary>
/// <param name="File">File name as the user knows it.</param>
/// <param name="Line">Line, counting from 1; 0 when it is not in a line.</param>
/// <param name="Key">Full key.</param>
/// <param name="Problem">What is wrong and what would be right.</param>
internal sealed record SettingFault(string File, long Line, string Key, string Problem)
{
    /// <inheritdoc/>
    public override string ToString() =>
        Line > 0 ? FormattableString.Invariant($"{File}, line {Line}: {Key}: {Problem}") : $"{File}: {Key}: {Problem}";
}
