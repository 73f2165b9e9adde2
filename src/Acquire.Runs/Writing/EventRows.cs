using Acquire.Runs.Records;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>Events in their table, both ways.</summary>
internal static class EventRows
{
    public static long Insert(SqliteConnection connection, RunEvent record) =>
        (long)SqliteFiles.Scalar(connection,
            "INSERT INTO event(t_us, kind, severity, source, text, data) VALUES($t, $kind, $severity, $source, $text, $data) RETURNING id;",
            ("$t", record.TimeUs), ("$kind", record.Kind), ("$severity", (int)record.Severity), ("$source", record.Source), ("$text", record.Text),
            ("$data", (object?)record.DataJson ?? DBNull.Value))!; // RETURNING gives a row for a row inserted

    public static RunEvent Read(SqliteDataReader row) =>
        new(row.GetInt64(1), row.GetString(2), (Severity)row.GetInt32(3), row.GetString(4), row.GetString(5), row.IsDBNull(6) ? null : row.GetString(6));

    public const string Columns = "id, t_us, kind, severity, source, text, data";
}
