using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>Why writing failed, in words an operator can use.</summary>
internal static class WriteFailure
{
    /// <summary>SQLITE_FULL.</summary>
    public const int DiskFull = 13;

    /// <summary>File, reason and remedy.</summary>
    public static string Sentence(string path, Exception problem) => problem is SqliteException { SqliteErrorCode: DiskFull }
        ? $"{path}: the disk is full; the run is made safe. Free space before the next run."
        : $"{path}: the run file cannot be written ({problem.Message}); the run is made safe. Check the disk and its permissions.";
}
