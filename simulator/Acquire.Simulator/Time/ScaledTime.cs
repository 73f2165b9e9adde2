namespace Acquire.Simulator.Time;

/// <summary>A clock that runs a given number of times faster than another one.</summary>
/// <remarks>Waits are rounded up to whole milliseconds of the other clock, so that nothing fires early.</remarks>
public sealed class ScaledTime : TimeProvider
{
    private readonly TimeProvider _life;
    private readonly DateTimeOffset _startUtc;
    private readonly long _startTimestamp;

    /// <summary>Starts at the present of <paramref name="life"/> and runs <paramref name="factor"/> times faster.</summary>
    public ScaledTime(TimeProvider life, double factor)
    {
        ArgumentNullException.ThrowIfNull(life);
        if (!double.IsFinite(factor) || factor <= 0)
            throw new ArgumentOutOfRangeException(nameof(factor), factor, "The pace must be a positive number.");
        _life = life;
        Factor = factor;
        _startUtc = life.GetUtcNow();
        _startTimestamp = life.GetTimestamp();
    }

    /// <summary>How many times faster than life.</summary>
    public double Factor { get; }

    /// <inheritdoc/>
    public override long TimestampFrequency => _life.TimestampFrequency;

    /// <inheritdoc/>
    public override TimeZoneInfo LocalTimeZone => _life.LocalTimeZone;

    /// <inheritdoc/>
    public override long GetTimestamp() => _startTimestamp + (long)((_life.GetTimestamp() - _startTimestamp) * Factor);

    /// <inheritdoc/>
    public override DateTimeOffset GetUtcNow() => _startUtc + GetElapsedTime(_startTimestamp);

    /// <inheritdoc/>
    public override ITimer CreateTimer(TimerCallback callback, object? state, TimeSpan dueTime, TimeSpan period) =>
        new ScaledTimer(_life.CreateTimer(callback, state, Shrink(dueTime), Shrink(period)), this);

    private TimeSpan Shrink(TimeSpan wait) =>
        wait <= TimeSpan.Zero ? wait : TimeSpan.FromMilliseconds(Math.Ceiling(wait.TotalMilliseconds / Factor));

    private sealed class ScaledTimer(ITimer timer, ScaledTime clock) : ITimer
    {
        public bool Change(TimeSpan dueTime, TimeSpan period) => timer.Change(clock.Shrink(dueTime), clock.Shrink(period));

        public void Dispose() => timer.Dispose();

        public ValueTask DisposeAsync() => timer.DisposeAsync();
    }
}
