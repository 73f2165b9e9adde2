using System.Buffers;

namespace Acquire.Wire;

/// <summary>A link to a device that lives in this process; complete at once whenever the device needs no time.</summary>
/// <remarks>
/// Runs on the engine's loop and waits for the device's delays on <paramref name="clock"/>, so that a rehearsal under
/// virtual time costs no waiting. Bytes appear in the order they were produced, never before they are due.
/// </remarks>
public sealed class InProcessLink(IDevicePort port, string address, TimeProvider clock) : ILink
{
    private readonly ArrayBufferWriter<byte> _produced = new(256);
    private readonly Queue<Arrival> _arrivals = new();
    private byte[] _wire = new byte[256];
    private int _first;
    private int _end;
    private long _lastDueTicks = long.MinValue;
    private TaskCompletionSource? _more;

    /// <inheritdoc/>
    public string Address => address;

    /// <inheritdoc/>
    public bool IsOpen { get; private set; }

    /// <inheritdoc/>
    public bool ReopenSeparates => true;

    /// <inheritdoc/>
    public TimeProvider TimeOutClock => clock;

    /// <inheritdoc/>
    public ValueTask OpenAsync(CancellationToken cancellation)
    {
        Close();
        cancellation.ThrowIfCancellationRequested();
        IsOpen = true;
        port.Connected(true);
        return ValueTask.CompletedTask;
    }

    /// <inheritdoc/>
    public ValueTask WriteAsync(ReadOnlyMemory<byte> message, CancellationToken cancellation)
    {
        RequireOpen();
        cancellation.ThrowIfCancellationRequested();
        _produced.ResetWrittenCount();
        var delay = port.Receive(message.Span, _produced);
        if (_produced.WrittenCount > 0) Append(_produced.WrittenSpan, delay);
        return ValueTask.CompletedTask;
    }

    /// <inheritdoc/>
    public ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellation)
    {
        RequireOpen();
        cancellation.ThrowIfCancellationRequested();
        return _arrivals.TryPeek(out var next) && next.DueTicks <= clock.GetTimestamp()
            ? ValueTask.FromResult(Take(buffer))
            : WaitAndReadAsync(buffer, cancellation);
    }

    /// <inheritdoc/>
    public ValueTask DiscardInputAsync(CancellationToken cancellation)
    {
        RequireOpen();
        while (_arrivals.TryPeek(out var next) && next.DueTicks <= clock.GetTimestamp()) Drop(_arrivals.Dequeue().Length);
        return ValueTask.CompletedTask;
    }

    /// <inheritdoc/>
    public void Close()
    {
        if (!IsOpen) return;
        IsOpen = false;
        _arrivals.Clear();
        (_first, _end, _lastDueTicks) = (0, 0, long.MinValue);
        port.Connected(false);
        Interlocked.Exchange(ref _more, null)?.TrySetResult();
    }

    /// <inheritdoc/>
    public ValueTask DisposeAsync()
    {
        Close();
        return ValueTask.CompletedTask;
    }

    private async ValueTask<int> WaitAndReadAsync(Memory<byte> buffer, CancellationToken cancellation)
    {
        while (true)
        {
            if (_arrivals.TryPeek(out var next))
            {
                var missing = next.DueTicks - clock.GetTimestamp();
                if (missing <= 0) return Take(buffer);
                // Task.Delay drops fractions of a millisecond; rounding up keeps the reply from being early.
                var waitMs = Math.Ceiling(missing * 1000.0 / clock.TimestampFrequency);
                await Task.Delay(TimeSpan.FromMilliseconds(waitMs), clock, cancellation);
            }
            else
            {
                _more = new TaskCompletionSource();
                await _more.Task.WaitAsync(cancellation);
            }
            RequireOpen();
        }
    }

    private void Append(ReadOnlySpan<byte> bytes, TimeSpan delay)
    {
        if (_first == _end) _first = _end = 0;
        if (_end + bytes.Length > _wire.Length) MakeRoom(bytes.Length);
        bytes.CopyTo(_wire.AsSpan(_end));
        _end += bytes.Length;
        var due = clock.GetTimestamp() + (long)(Math.Max(0, delay.TotalSeconds) * clock.TimestampFrequency);
        _lastDueTicks = Math.Max(_lastDueTicks, due);
        _arrivals.Enqueue(new Arrival(bytes.Length, _lastDueTicks));
        Interlocked.Exchange(ref _more, null)?.TrySetResult();
    }

    private void MakeRoom(int length)
    {
        var kept = _end - _first;
        var target = kept + length <= _wire.Length ? _wire : new byte[Math.Max(_wire.Length * 2, kept + length)];
        _wire.AsSpan(_first, kept).CopyTo(target);
        (_wire, _first, _end) = (target, 0, kept);
    }

    private int Take(Memory<byte> buffer)
    {
        var arrival = _arrivals.Peek();
        var taken = Math.Min(buffer.Length, arrival.Length);
        _wire.AsSpan(_first, taken).CopyTo(buffer.Span);
        _arrivals.Dequeue();
        if (taken < arrival.Length) Requeue(arrival with { Length = arrival.Length - taken });
        Drop(taken);
        return taken;
    }

    // A reader with a small buffer leaves a rest; it stays first in line. Rare, so the queue is rebuilt.
    private void Requeue(Arrival rest)
    {
        var others = _arrivals.ToArray();
        _arrivals.Clear();
        _arrivals.Enqueue(rest);
        foreach (var other in others) _arrivals.Enqueue(other);
    }

    private void Drop(int length) => _first += length;

    private void RequireOpen()
    {
        if (!IsOpen) throw new LinkException($"{address} is closed. Open it first.");
    }

    private readonly record struct Arrival(int Length, long DueTicks);
}
