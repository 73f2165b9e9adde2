namespace Acquire.Wire;

/// <summary>The time-out of the exchange in flight, with the caller's token and make-safe joined to it.</summary>
/// <remarks>
/// One source is reused from exchange to exchange, and its timer is armed only when something has to be waited for:
/// an exchange that is complete at once touches neither timer nor registration.
/// </remarks>
internal sealed class ExchangeDeadline(TimeProvider clock) : IDisposable
{
    private CancellationTokenSource _source = new(Timeout.InfiniteTimeSpan, clock);
    private CancellationTokenRegistration _registration;
    private CancellationToken _caller;
    private TimeSpan _timeOut;
    private long _startTicks;
    private bool _armed;
    private bool _disposed;

    public CancellationToken Token => _source.Token;

    public void Begin(TimeSpan timeOut, long startTicks, CancellationToken caller)
    {
        // An abort that came between two exchanges was meant for the one before.
        if (_source.IsCancellationRequested) End();
        (_timeOut, _startTicks, _caller) = (timeOut, startTicks, caller);
    }

    public ValueTask<int> Within(ValueTask<int> pending)
    {
        if (!pending.IsCompleted) Arm();
        return pending;
    }

    public ValueTask Within(ValueTask pending)
    {
        if (!pending.IsCompleted) Arm();
        return pending;
    }

    /// <summary>Cancels what is in flight.</summary>
    public void Cancel() => _source.Cancel();

    public void End()
    {
        if (_disposed || (!_armed && !_source.IsCancellationRequested)) return;
        _registration.Dispose();
        _registration = default;
        _armed = false;
        // TryReset refuses when the timer has fired or may be about to, and on clocks other than the system's.
        if (_source.TryReset()) return;
        _source.Dispose();
        _source = new CancellationTokenSource(Timeout.InfiniteTimeSpan, clock);
    }

    /// <summary>An exchange still in flight ends by its link being closed, and finds nothing to reset here.</summary>
    public void Dispose()
    {
        _disposed = true;
        _registration.Dispose();
        _source.Dispose();
    }

    /// <summary>Starts the timer even though nothing waits yet, for a loop that may never wait.</summary>
    public void Arm()
    {
        if (_armed) return;
        _armed = true;
        var left = _timeOut - clock.GetElapsedTime(_startTicks);
        _source.CancelAfter(left > TimeSpan.FromMilliseconds(1) ? left : TimeSpan.FromMilliseconds(1));
        if (_caller.CanBeCanceled)
            _registration = _caller.UnsafeRegister(static source => ((CancellationTokenSource)source!).Cancel(), _source);
    }
}
