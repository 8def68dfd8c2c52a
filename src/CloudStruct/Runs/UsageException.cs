namespace CloudStruct.Runs;

/// <summary>The command line asks for something that must not be done: exit code 2.</summary>
internal sealed class UsageException(string message) : Exception(message);
