using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>Analyses beside the record: appended under the run's lock, outside the chain, each with its own hash; never overwritten.</summary>
public static class AnalysisStore
{
    /// <summary>Appends one analysis; the result is a problem in words, or null.</summary>
    public static string? Append(string path, string kind, string settingsJson, string resultJson, (string Software, TimeProvider Clock) by)
    {
        using var held = RunLock.TryTake(path);
        if (held is null)
        {
            return $"{path}: the run is being written by another process; wait for its end and save then.";
        }

        try
        {
            using var connection = SqliteFiles.Open(path, SqliteOpenMode.ReadWrite);
            var utc = by.Clock.GetUtcNow().UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss.fff'Z'", CultureInfo.InvariantCulture);
            SqliteFiles.Execute(connection, "INSERT INTO analysis(utc, kind, settings_sha256, software, result, sha256) VALUES($utc, $kind, $settings, $software, $result, $sha);",
                ("$utc", utc), ("$kind", kind), ("$settings", Hash(settingsJson)), ("$software", by.Software), ("$result", resultJson),
                ("$sha", Hash(string.Join('\n', utc, kind, settingsJson, by.Software, resultJson))));
            return null;
        }
        catch (SqliteException problem)
        {
            return $"{path}: the analysis cannot be saved ({problem.Message}). Check the folder's permissions.";
        }
    }

    private static string Hash(string text) => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text)));
}
