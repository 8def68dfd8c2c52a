using CloudStruct.Records.Classes;

namespace CloudStruct.Formats;

/// <summary>The words of hand labels: host, dike, cover, inclusion, loose; train, check, ignore.</summary>
internal static class LabelWords
{
    /// <summary>Class of a word; null when it is none.</summary>
    public static RockClass? Class(string word) => word.Trim().ToLowerInvariant() switch
    {
        "host" => RockClass.Host,
        "dike" => RockClass.Dike,
        "cover" => RockClass.Cover,
        "inclusion" => RockClass.Inclusion,
        "loose" => RockClass.Loose,
        _ => null,
    };

    /// <summary>Use of a word, train when nothing is said; null when it is none.</summary>
    public static LabelUse? Use(string word) => word.Trim().ToLowerInvariant() switch
    {
        "" or "train" => LabelUse.Train,
        "check" => LabelUse.Check,
        "ignore" => LabelUse.Ignore,
        _ => null,
    };

    /// <summary>Class and use together: what is to be ignored needs no class.</summary>
    /// <param name="classWord">Word of the class.</param>
    /// <param name="useWord">Word of the use.</param>
    /// <param name="fault">What is wrong; empty when nothing is.</param>
    public static (RockClass Class, LabelUse Use) Both(string classWord, string useWord, out string fault)
    {
        fault = "";
        LabelUse? use = Use(useWord);
        RockClass? rock = Class(classWord);
        if (use == null) fault = "the use is none of train, check, ignore";
        else if (rock == null && !(use == LabelUse.Ignore && string.IsNullOrWhiteSpace(classWord)))
            fault = "the class is none of host, dike, cover, inclusion, loose";
        return (rock ?? RockClass.Unknown, use ?? LabelUse.Ignore);
    }
}
