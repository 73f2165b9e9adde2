using Acquire.Runs.Records;
using Microsoft.Data.Sqlite;
using SQLitePCL;

namespace Acquire.Runs.Writing;

/// <summary>The one statement that runs half a million times: prepared once, bound without boxing.</summary>
internal sealed class ReadingStatement : IDisposable
{
    private readonly SqliteConnection _connection;
    private readonly sqlite3_stmt _statement;

    public ReadingStatement(SqliteConnection connection)
    {
        _connection = connection;
        Check(raw.sqlite3_prepare_v2(connection.Handle, "INSERT INTO reading(id, t_us, channel, value, quality, raw) VALUES(?,?,?,?,?,?);", out _statement));
    }

    /// <summary>Inserts one row.</summary>
    public void Insert(long id, in Reading reading)
    {
        raw.sqlite3_bind_int64(_statement, 1, id);
        raw.sqlite3_bind_int64(_statement, 2, reading.TimeUs);
        raw.sqlite3_bind_int(_statement, 3, reading.Channel);
        if (double.IsNaN(reading.Value))
        {
            raw.sqlite3_bind_null(_statement, 4);
        }
        else
        {
            raw.sqlite3_bind_double(_statement, 4, reading.Value);
        }

        raw.sqlite3_bind_int(_statement, 5, (int)reading.Quality);
        if (reading.Raw is null)
        {
            raw.sqlite3_bind_null(_statement, 6);
        }
        else
        {
            raw.sqlite3_bind_text(_statement, 6, reading.Raw);
        }

        var code = raw.sqlite3_step(_statement);
        raw.sqlite3_reset(_statement);
        if (code != raw.SQLITE_DONE)
        {
            Check(code);
        }
    }

    /// <inheritdoc/>
    public void Dispose() => _statement.Dispose();

    private void Check(int code)
    {
        if (code is not raw.SQLITE_OK)
        {
            throw new SqliteException(raw.sqlite3_errmsg(_connection.Handle).utf8_to_string(), code & 0xFF, code);
        }
    }
}
