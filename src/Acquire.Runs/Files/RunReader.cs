using Acquire.Bench.Readings;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Files;

/// <summary>A run file opened for reading, or why it was not.</summary>
/// <param name="Reader">The reader; null when there is a problem.</param>
/// <param name="Problem">File, what is wrong, what to do; null when there is a reader.</param>
public sealed record RunOpening(RunReader? Reader, string? Problem);

/// <summary>Reads a run, live or finished, without disturbing its writer: every question is one short read.</summary>
public sealed class RunReader : IDisposable
{
    private readonly SqliteConnection _connection;

    private RunReader(string path, SqliteConnection connection)
    {
        Path = path;
        _connection = connection;
        Header = RunHeaderRows.Read(connection);
        Channels = ReadChannels();
        State = ReadState();
    }

    /// <summary>The file.</summary>
    public string Path { get; }

    /// <summary>What the run is and what it was made from.</summary>
    public RunHeader Header { get; }

    /// <summary>Its channels.</summary>
    public IReadOnlyList<Channel> Channels { get; }

    /// <summary><c>running</c>, <c>cut</c> (its writer died), <c>imported</c>, or <c>ended: completed|stopped|tripped|failed</c>.</summary>
    public string State { get; private set; }

    /// <summary>True for the first bytes of any SQLite file.</summary>
    public static bool LooksLikeOne(string path)
    {
        Span<byte> start = stackalloc byte[16];
        using var file = File.OpenRead(path);
        return file.ReadAtLeast(start, start.Length, throwOnEndOfStream: false) == start.Length && start.SequenceEqual("SQLite format 3\0"u8);
    }

    /// <summary>Opens a run file. Anything that is not a sound run of a known version gives a problem, never an exception.</summary>
    public static RunOpening Open(string path)
    {
        SqliteConnection? connection = null;
        try
        {
            if (!File.Exists(path))
            {
                return Refused($"{path}: there is no such run file; the current folder is {Directory.GetCurrentDirectory()}.");
            }

            if (!LooksLikeOne(path))
            {
                return Refused($"{path}: this is not a run file (it does not begin as one). Name a .run file, or import a table with 'acquire import'.");
            }

            connection = SqliteFiles.Open(path, SqliteOpenMode.ReadOnly);
            if (SqliteFiles.Scalar(connection, "PRAGMA application_id;") is not (long)RunSchema.ApplicationId)
            {
                connection.Dispose();
                return Refused($"{path}: this SQLite file is not a run file. Name a .run file.");
            }

            var version = (long)SqliteFiles.Scalar(connection, "PRAGMA user_version;")!; // the pragma always answers
            if (version > RunSchema.Version)
            {
                connection.Dispose();
                return Refused($"{path}: the run was written by a newer version (file version {version}, this program reads up to {RunSchema.Version}). Use the newer program.");
            }

            return new(new RunReader(path, connection), null);
        }
        catch (Exception problem) when (problem is SqliteException or IOException or UnauthorizedAccessException or InvalidOperationException or InvalidCastException or FormatException)
        {
            connection?.Dispose();
            return Refused($"{path}: the run file is damaged or cannot be read ({problem.Message}). Keep the file, and try 'acquire verify' on a copy that is whole.");
        }
    }

    /// <summary>Readings from an identifier on, in order, at most so many.</summary>
    public IReadOnlyList<(long Id, Reading Reading)> Readings(long afterId = 0, int most = int.MaxValue, int? channel = null)
    {
        var rows = new List<(long, Reading)>();
        var filter = channel is null ? "" : " AND channel = $channel";
        RunHeaderRows.Each(_connection, $"SELECT id, t_us, channel, value, quality, raw FROM reading WHERE id > $after{filter} ORDER BY id LIMIT $most;",
            row => rows.Add((row.GetInt64(0), new(row.GetInt32(2), row.GetInt64(1), row.IsDBNull(3) ? double.NaN : row.GetDouble(3), (Quality)row.GetInt32(4), row.IsDBNull(5) ? null : row.GetString(5)))),
            ("$after", afterId), ("$most", most), ("$channel", channel ?? 0));
        return rows;
    }

    /// <summary>Points in order, from an index on.</summary>
    public IReadOnlyList<PointRecord> Points(int afterIndex = 0)
    {
        var rows = new List<PointRecord>();
        RunHeaderRows.Each(_connection, $"SELECT {PointRows.Columns} FROM point WHERE id > $after ORDER BY id;", row => rows.Add(PointRows.Read(row)), ("$after", afterIndex));
        return rows;
    }

    /// <summary>Events in order, from an identifier on.</summary>
    public IReadOnlyList<(long Id, RunEvent Event)> Events(long afterId = 0)
    {
        var rows = new List<(long, RunEvent)>();
        RunHeaderRows.Each(_connection, $"SELECT {EventRows.Columns} FROM event WHERE id > $after ORDER BY id;", row => rows.Add((row.GetInt64(0), EventRows.Read(row))), ("$after", afterId));
        return rows;
    }

    /// <summary>How many rows a table holds.</summary>
    public long Count(RunTable table) => (long)SqliteFiles.Scalar(_connection, table switch
    {
        RunTable.Readings => "SELECT count(*) FROM reading;",
        RunTable.Points => "SELECT count(*) FROM point;",
        _ => "SELECT count(*) FROM event;",
    })!; // count always answers

    /// <summary>Minimum and maximum rows of a channel, for plots of a whole night.</summary>
    public IReadOnlyList<(long FromUs, long ToUs, double Least, double Most)> Summary(int channel)
    {
        var rows = new List<(long, long, double, double)>();
        RunHeaderRows.Each(_connection, "SELECT t0_us, t1_us, min, max FROM summary WHERE channel = $channel AND level = 0 AND min IS NOT NULL ORDER BY t0_us;",
            row => rows.Add((row.GetInt64(0), row.GetInt64(1), row.GetDouble(2), row.GetDouble(3))), ("$channel", channel));
        return rows;
    }

    /// <summary>Blocks of the chain in order.</summary>
    internal IEnumerable<(long? First, long? Last, string ClosedBy, long? Row, string Head)> Blocks()
    {
        using var command = SqliteFiles.Command(_connection, "SELECT first_reading, last_reading, closed_by, row_id, head FROM block ORDER BY id;");
        using var rows = command.ExecuteReader();
        while (rows.Read())
        {
            yield return (rows.IsDBNull(0) ? null : rows.GetInt64(0), rows.IsDBNull(1) ? null : rows.GetInt64(1), rows.GetString(2), rows.IsDBNull(3) ? null : rows.GetInt64(3), rows.GetString(4));
        }
    }

    /// <summary>The result of the newest stored analysis of a kind, JSON; null when there is none.</summary>
    public string? LatestAnalysis(string kind) =>
        SqliteFiles.Scalar(_connection, "SELECT result FROM analysis WHERE kind = $kind ORDER BY id DESC LIMIT 1;", ("$kind", kind)) as string;

    /// <summary>Findings of SQLite's own check; empty when it finds nothing.</summary>
    internal IReadOnlyList<string> Integrity()
    {
        var rows = new List<string>();
        RunHeaderRows.Each(_connection, "PRAGMA quick_check(5);", row => rows.Add(row.GetString(0)));
        return rows is ["ok"] ? [] : rows;
    }

    /// <summary>Value of a key of the table <c>run</c>, or null.</summary>
    internal string? Value(string key) => SqliteFiles.Scalar(_connection, "SELECT value FROM run WHERE key = $key;", ("$key", key)) as string;

    /// <summary>The hash stored beside a text.</summary>
    internal string? TextHash(RunText text) =>
        SqliteFiles.Scalar(_connection, "SELECT sha256 FROM text WHERE role = $role AND name = $name;", ("$role", text.Role), ("$name", text.Name)) as string;

    /// <summary>Reads the state again.</summary>
    public string Refresh() => State = ReadState();

    /// <inheritdoc/>
    public void Dispose() => _connection.Dispose();

    private static RunOpening Refused(string problem) => new(null, problem);

    private string ReadState()
    {
        var written = Value("state") ?? "cut";
        return written == "running" && !RunLock.IsHeld(Path) ? "cut" : written;
    }

    private List<Channel> ReadChannels()
    {
        var rows = new List<Channel>();
        RunHeaderRows.Each(_connection, "SELECT id, name, unit, instrument FROM channel ORDER BY id;", row => rows.Add(new(row.GetInt32(0), row.GetString(1), row.GetString(2), row.GetString(3))));
        return rows;
    }
}

/// <summary>The tables that grow during a run.</summary>
public enum RunTable
{
    Readings,
    Points,
    Events,
}
