namespace CloudStruct.Records.Complaints;

/// <summary>The one exception for what is wrong with the user's input: exit code 3, one paragraph, no trace.</summary>
/// <remarks>The constructor asks for what, where, the fact found and the mend, so that none is forgotten. Anything else
/// that escapes is our fault and becomes exit code 1.</remarks>
public sealed class InputException : Exception
{
    /// <summary>Names a fault in a file or folder of the user.</summary>
    /// <param name="where">File (relative name) or setting, with line or byte when known.</param>
    /// <param name="what">What is wrong, in one clause.</param>
    /// <param name="found">The fact that was found.</param>
    /// <param name="mend">What the user can do.</param>
    /// <param name="inner">The cause, shown with --verbose only.</param>
    public InputException(string where, string what, string found, string mend, Exception? inner = null)
        : base($"{where}: {what}. Found: {found}. {mend}{(mend.EndsWith('.') ? "" : ".")}", inner)
    {
        Where = where;
        What = what;
        Found = found;
        Mend = mend;
    }

    /// <summary>File or setting, with line or byte when known.</summary>
    public string Where { get; }

    /// <summary>What is wrong.</summary>
    public string What { get; }

    /// <summary>The fact found.</summary>
    public string Found { get; }

    /// <summary>What to do about it.</summary>
    public string Mend { get; }
}
