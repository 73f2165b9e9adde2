namespace Acquire.Runs;

/// <summary>A run file cannot be made or written; the message names the file, the reason and the remedy.</summary>
public sealed class RunFileException(string message, Exception? inner = null) : IOException(message, inner);
