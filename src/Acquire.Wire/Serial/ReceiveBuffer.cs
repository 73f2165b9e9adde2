namespace Acquire.Wire;

/// <summary>Bytes that a reader thread received and the loop has not yet taken; bounded, oldest dropped and counted.</summary>
/// <remarks>
/// A read that is cancelled takes no bytes with it: only whole hand-overs happen, under the lock. At most one reader waits.
/// </remarks>
internal sealed class ReceiveBuffer
{
    private const int Capacity = 64 * 1024;
    private readonly Lock _gate = new();
    private readonly byte[] _bytes = new byte[Capacity];
    private int _count;
    private LinkException? _failure;
    private TaskCompletionSource? _waiter;

    /// <summary>Bytes lost because nobody read them.</summary>
    public long Dropped { get; private set; }

    public void Append(ReadOnlySpan<byte> received)
    {
        TaskCompletionSource? waiter;
        lock (_gate)
        {
            if (received.Length > Capacity) received = received[^Capacity..];
            var surplus = _count + received.Length - Capacity;
            if (surplus > 0) RemoveFirst(surplus);
            received.CopyTo(_bytes.AsSpan(_count));
            _count += received.Length;
            Dropped += Math.Max(0, surplus);
            (waiter, _waiter) = (_waiter, null);
        }
        waiter?.TrySetResult();
    }

    /// <summary>No more bytes will come; every later read throws <paramref name="failure"/> once the buffer is empty.</summary>
    public void Fail(LinkException failure)
    {
        TaskCompletionSource? waiter;
        lock (_gate)
        {
            _failure ??= failure;
            (waiter, _waiter) = (_waiter, null);
        }
        waiter?.TrySetResult();
    }

    public LinkException? Failure
    {
        get { lock (_gate) return _failure; }
    }

    public void Clear()
    {
        lock (_gate) _count = 0;
    }

    public async ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellation)
    {
        while (true)
        {
            // A flood never makes the reader wait, so the time-out has to be looked at here.
            cancellation.ThrowIfCancellationRequested();
            Task more;
            lock (_gate)
            {
                if (_count > 0) return Take(buffer.Span);
                if (_failure is not null) throw _failure;
                _waiter ??= new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
                more = _waiter.Task;
            }
            await more.WaitAsync(cancellation).ConfigureAwait(false);
        }
    }

    private int Take(Span<byte> target)
    {
        var taken = Math.Min(target.Length, _count);
        _bytes.AsSpan(0, taken).CopyTo(target);
        RemoveFirst(taken);
        return taken;
    }

    private void RemoveFirst(int length)
    {
        length = Math.Min(length, _count);
        _bytes.AsSpan(length, _count - length).CopyTo(_bytes);
        _count -= length;
    }
}
