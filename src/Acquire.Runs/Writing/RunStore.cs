using System.Globalization;
using Acquire.Runs.Chain;
using Acquire.Runs.Records;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>How a run file is written.</summary>
/// <param name="Durable">True: every commit is flushed to the disk. False (rehearsals): one flush at the end.</param>
/// <param name="Clock">Clock of the run; its timestamp gives the anchors of the table <c>clock</c>.</param>
/// <param name="OriginTimestamp">The clock's timestamp at t_us = 0.</param>
public sealed record WriterOptions(bool Durable, TimeProvider Clock, long OriginTimestamp);

/// <summary>The open run file: rows in, transactions, chain and summary. Used by one thread at a time.</summary>
internal sealed class RunStore : IDisposable
{
    private const long AnchorEveryUs = 60_000_000;
    private readonly SqliteConnection _connection;
    private readonly RunLock _lock;
    private readonly WriterOptions _options;
    private readonly ReadingStatement _readings;
    private readonly SummaryRows _summary;
    private readonly ChainHead _chain = new();
    private bool _inTransaction;
    private ((string, byte[]) Chain, object Summary, long LastReading, long FirstInBlock, long LastAnchorUs) _before;
    private long _lastReading;
    private long _firstInBlock = 1;
    private long _lastAnchorUs = -AnchorEveryUs;

    private RunStore(string path, SqliteConnection connection, RunLock held, WriterOptions options)
    {
        Path = path;
        _connection = connection;
        _lock = held;
        _options = options;
        _readings = new ReadingStatement(connection);
        _summary = new SummaryRows(connection);
    }

    /// <summary>The file.</summary>
    public string Path { get; }

    /// <summary>Head of the last closed block, hex.</summary>
    public string ChainHead => _chain.Hex;

    /// <summary>Creates the file with its header. Throws <see cref="RunFileException"/> when that is not possible.</summary>
    public static RunStore Create(string path, RunHeader header, IReadOnlyList<Channel> channels, WriterOptions options)
    {
        if (File.Exists(path))
        {
            throw new RunFileException($"{path}: a file of this name exists already and is never overwritten; choose another name with --out.");
        }

        Directory.CreateDirectory(System.IO.Path.GetDirectoryName(System.IO.Path.GetFullPath(path))!); // a full path of a file has a folder
        var held = RunLock.TryTake(path) ?? throw new RunFileException($"{path}: another process is writing this run.");
        SqliteConnection? connection = null;
        try
        {
            connection = SqliteFiles.Open(path, SqliteOpenMode.ReadWriteCreate);
            SqliteFiles.Execute(connection, string.Create(CultureInfo.InvariantCulture,
                $"PRAGMA application_id={RunSchema.ApplicationId}; PRAGMA user_version={RunSchema.Version}; PRAGMA journal_mode=WAL; PRAGMA synchronous={(options.Durable ? "FULL" : "OFF")}; PRAGMA journal_size_limit=16777216; PRAGMA wal_autocheckpoint=1000;"));
            SqliteFiles.Execute(connection, "BEGIN IMMEDIATE;" + RunSchema.Tables + "COMMIT;");
            RunHeaderRows.Insert(connection, header, channels);
            return new(path, connection, held, options);
        }
        catch (SqliteException problem)
        {
            connection?.Dispose();
            held.Dispose();
            throw new RunFileException($"{path}: the run file cannot be made: {problem.Message}", problem);
        }
    }

    /// <summary>Starts a transaction when none is open.</summary>
    public void Begin()
    {
        // Plain statements instead of a transaction object, which every command of the connection would have to carry.
        if (!_inTransaction)
        {
            SqliteFiles.Execute(_connection, "BEGIN IMMEDIATE;");
            _inTransaction = true;
            _before = (_chain.Save(), _summary.Save(), _lastReading, _firstInBlock, _lastAnchorUs);
        }
    }

    /// <summary>Adds a reading to the open transaction.</summary>
    public void Insert(in Reading reading)
    {
        Begin();
        _readings.Insert(++_lastReading, reading);
        _summary.Add(_lastReading, reading);
        ChainRecord.Add(_chain.Block, reading);
        if (_lastReading - _firstInBlock + 1 >= Chain.ChainHead.ReadingsPerBlock)
        {
            CloseBlock("readings", null);
        }
    }

    /// <summary>Adds an event to the open transaction and closes the block.</summary>
    public void Insert(RunEvent record)
    {
        Begin();
        var id = EventRows.Insert(_connection, record);
        ChainRecord.Add(_chain.Block, record);
        CloseBlock("event", id);
    }

    /// <summary>Adds a point to the open transaction and closes the block.</summary>
    public void Insert(PointRecord point)
    {
        Begin();
        PointRows.Insert(_connection, point);
        ChainRecord.Add(_chain.Block, point);
        CloseBlock("point", point.Index);
    }

    /// <summary>Puts the open transaction on disk; an anchor of monotonic time to UTC goes with it once a minute.</summary>
    public void Commit()
    {
        if (!_inTransaction)
        {
            return;
        }

        var nowUs = (long)_options.Clock.GetElapsedTime(_options.OriginTimestamp).TotalMicroseconds;
        if (nowUs - _lastAnchorUs >= AnchorEveryUs)
        {
            _lastAnchorUs = nowUs;
            var utcUs = (_options.Clock.GetUtcNow() - DateTimeOffset.UnixEpoch).Ticks / 10;
            SqliteFiles.Execute(_connection, string.Create(CultureInfo.InvariantCulture, $"INSERT INTO clock(t_us, utc_us) VALUES({nowUs}, {utcUs});"));
        }

        SqliteFiles.Execute(_connection, "COMMIT;");
        _inTransaction = false;
    }

    /// <summary>Forgets everything since <see cref="Begin"/>, in the file and in the chain, so that it can be written again.</summary>
    public void RollBack()
    {
        if (!_inTransaction)
        {
            return;
        }

        try
        {
            SqliteFiles.Execute(_connection, "ROLLBACK;");
        }
        catch (SqliteException)
        {
            // A full disk has rolled back by itself already.
        }

        _inTransaction = false;
        _chain.Restore(_before.Chain);
        _summary.Restore(_before.Summary);
        (_lastReading, _firstInBlock, _lastAnchorUs) = (_before.LastReading, _before.FirstInBlock, _before.LastAnchorUs);
    }

    /// <summary>Writes the end state; everything before is on disk when it returns.</summary>
    public void End(string endState)
    {
        Begin();
        _summary.Flush();
        SqliteFiles.Execute(_connection, "UPDATE run SET value='ended: ' || $state WHERE key='state';", ("$state", endState));
        SqliteFiles.Execute(_connection, "INSERT OR REPLACE INTO run(key, value) VALUES('chain_head', $head);", ("$head", _chain.Hex));
        Commit();
        if (!_options.Durable)
        {
            SqliteFiles.Execute(_connection, "PRAGMA synchronous=FULL;");
        }
    }

    /// <summary>Tries to make one plain file of it; false while a reader stays.</summary>
    public bool TrySeal()
    {
        try
        {
            SqliteFiles.Execute(_connection, "PRAGMA wal_checkpoint(TRUNCATE);");
            return SqliteFiles.Scalar(_connection, "PRAGMA journal_mode=DELETE;") is "delete";
        }
        catch (SqliteException)
        {
            return false;
        }
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        _readings.Dispose();
        _summary.Dispose();
        _connection.Dispose();
        _lock.Dispose();
    }

    private void CloseBlock(string closedBy, long? row)
    {
        var empty = _firstInBlock > _lastReading;
        SqliteFiles.Execute(_connection, "INSERT INTO block(first_reading, last_reading, closed_by, row_id, head) VALUES($first, $last, $by, $row, $head);",
            ("$first", empty ? DBNull.Value : _firstInBlock), ("$last", empty ? DBNull.Value : _lastReading), ("$by", closedBy), ("$row", (object?)row ?? DBNull.Value), ("$head", _chain.Close()));
        _firstInBlock = _lastReading + 1;
    }
}
