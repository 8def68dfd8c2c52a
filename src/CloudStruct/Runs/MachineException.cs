namespace CloudStruct.Runs;

/// <summary>The machine cannot do it (disk full, memory budget too small, folder not writable): exit code 1, no trace.</summary>
internal sealed class MachineException(string message, Exception? inner = null) : Exception(message, inner);
