namespace CloudStruct.Commands;

/// <summary>What the program ends with.</summary>
internal static class ExitCode
{
    /// <summary>Done.</summary>
    public const int Done = 0;

    /// <summary>Our fault, or the machine's: memory, disk.</summary>
    public const int Failed = 1;

    /// <summary>Wrong usage.</summary>
    public const int Usage = 2;

    /// <summary>Bad input; no results written.</summary>
    public const int BadInput = 3;

    /// <summary>Done in part; the summary says which part.</summary>
    public const int InPart = 4;

    /// <summary>Interrupted.</summary>
    public const int Interrupted = 130;
}
