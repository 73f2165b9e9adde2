using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>Opening and asking SQLite files the same way everywhere: no pool, short waits.</summary>
internal static class SqliteFiles
{
    /// <summary>Opens a file; a pooled handle would keep it and its journal open after disposal.</summary>
    public static SqliteConnection Open(string path, SqliteOpenMode mode)
    {
        var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = path, Mode = mode, Pooling = false, DefaultTimeout = 2 }.ToString());
        try
        {
            connection.Open();
            return connection;
        }
        catch
        {
            connection.Dispose();
            throw;
        }
    }

    /// <summary>Runs statements.</summary>
    public static void Execute(SqliteConnection connection, string sql, params (string Name, object Value)[] values)
    {
        using var command = Command(connection, sql, values);
        command.ExecuteNonQuery();
    }

    /// <summary>Asks for one value.</summary>
    public static object? Scalar(SqliteConnection connection, string sql, params (string Name, object Value)[] values)
    {
        using var command = Command(connection, sql, values);
        return command.ExecuteScalar();
    }

    /// <summary>A command with its values.</summary>
    public static SqliteCommand Command(SqliteConnection connection, string sql, params (string Name, object Value)[] values)
    {
        var command = connection.CreateCommand();
        command.CommandText = sql;
        foreach (var (name, value) in values)
        {
            command.Parameters.AddWithValue(name, value);
        }

        return command;
    }

    /// <summary>A double for a column: NULL when it is no number.</summary>
    public static object OrNull(double value) => double.IsNaN(value) ? DBNull.Value : value;
}
