namespace Acquire.Wire;

/// <summary>The last messages of an exchange, for diagnostics; off unless switched on, bounded, oldest dropped.</summary>
public sealed class ExchangeTrace(int capacity = 256)
{
    private readonly TraceEntry[] _entries = new TraceEntry[capacity];
    private long _count;

    /// <summary>True to record. Switching off keeps what was recorded.</summary>
    public bool Enabled { get; set; }

    /// <summary>Messages seen since the start, including those no longer held.</summary>
    public long Count => _count;

    /// <summary>What is held, oldest first.</summary>
    public IReadOnlyList<TraceEntry> Snapshot()
    {
        var held = (int)Math.Min(_count, _entries.Length);
        var copy = new TraceEntry[held];
        for (var i = 0; i < held; i++) copy[i] = _entries[(_count - held + i) % _entries.Length];
        return copy;
    }

    internal void Add(long ticks, bool sent, string text)
    {
        if (!Enabled) return;
        _entries[_count++ % _entries.Length] = new TraceEntry(ticks, sent, text);
    }
}

/// <summary>One message seen on the wire.</summary>
/// <param name="Ticks">Timestamp of the exchange's clock.</param>
/// <param name="Sent">True towards the instrument.</param>
/// <param name="Text">The message without its terminator.</param>
public readonly record struct TraceEntry(long Ticks, bool Sent, string Text);
