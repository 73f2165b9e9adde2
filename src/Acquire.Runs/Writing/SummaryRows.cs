using Acquire.Bench.Readings;
using Acquire.Runs.Records;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>Minimum and maximum of every 256 readings of a channel, so that a plot of a long night reads little. Rebuildable, outside the chain.</summary>
internal sealed class SummaryRows : IDisposable
{
    private const int ReadingsPerRow = 256;
    private readonly Dictionary<int, Span> _open = [];
    private readonly SqliteCommand _insert;

    public SummaryRows(SqliteConnection connection)
    {
        _insert = SqliteFiles.Command(connection,
            "INSERT INTO summary(channel, level, first_id, t0_us, t1_us, min, max, bad) VALUES($channel, 0, $first, $t0, $t1, $min, $max, $bad);",
            ("$channel", 0), ("$first", 0L), ("$t0", 0L), ("$t1", 0L), ("$min", 0.0), ("$max", 0.0), ("$bad", 0));
    }

    /// <summary>Counts one reading in; writes a row when 256 have come.</summary>
    public void Add(long id, in Reading reading)
    {
        if (!_open.TryGetValue(reading.Channel, out var span))
        {
            _open[reading.Channel] = span = new Span { FirstId = id, FirstUs = reading.TimeUs };
        }

        span.LastUs = reading.TimeUs;
        span.Count++;
        if (reading.Quality == Quality.Good)
        {
            span.Least = Math.Min(span.Least, reading.Value);
            span.Most = Math.Max(span.Most, reading.Value);
        }
        else
        {
            span.Bad++;
        }

        if (span.Count == ReadingsPerRow)
        {
            Write(reading.Channel, span);
            _open.Remove(reading.Channel);
        }
    }

    /// <summary>Writes what is open, at the end.</summary>
    public void Flush()
    {
        foreach (var (channel, span) in _open)
        {
            Write(channel, span);
        }

        _open.Clear();
    }

    /// <summary>The state to come back to when a transaction is rolled back.</summary>
    public object Save() => _open.ToDictionary(entry => entry.Key, entry => entry.Value.Copy());

    /// <summary>Comes back to a saved state.</summary>
    public void Restore(object saved)
    {
        _open.Clear();
        foreach (var (channel, span) in (Dictionary<int, Span>)saved)
        {
            _open[channel] = span;
        }
    }

    /// <inheritdoc/>
    public void Dispose() => _insert.Dispose();

    private void Write(int channel, Span span)
    {
        object[] values = [channel, span.FirstId, span.FirstUs, span.LastUs,
            span.Bad == span.Count ? DBNull.Value : span.Least, span.Bad == span.Count ? DBNull.Value : span.Most, span.Bad];
        for (var i = 0; i < values.Length; i++)
        {
            _insert.Parameters[i].Value = values[i];
        }

        _insert.ExecuteNonQuery();
    }

    private sealed class Span
    {
        public long FirstId;
        public long FirstUs;
        public long LastUs;
        public int Count;
        public int Bad;
        public double Least = double.PositiveInfinity;
        public double Most = double.NegativeInfinity;

        public Span Copy() => (Span)MemberwiseClone();
    }
}
