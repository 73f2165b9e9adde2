namespace Acquire.Simulator.Time;

/// <summary>The clock of <see cref="VirtualTime"/>: stands still until it is told to jump to its next timer.</summary>
/// <remarks>One tick is 100 ns. Used on the loop's thread only. Stopped timers stay in the queue and are skipped when they surface.</remarks>
internal sealed class VirtualClock(DateTimeOffset startUtc) : TimeProvider
{
    private readonly PriorityQueue<Alarm, (long DueTicks, long Order)> _alarms = new();
    private long _nowTicks;
    private long _order;

    public override long TimestampFrequency => TimeSpan.TicksPerSecond;

    public override TimeZoneInfo LocalTimeZone => TimeZoneInfo.Utc;

    public TimeSpan Elapsed => new(_nowTicks);

    public override long GetTimestamp() => _nowTicks;

    public override DateTimeOffset GetUtcNow() => startUtc.AddTicks(_nowTicks);

    public override ITimer CreateTimer(TimerCallback callback, object? state, TimeSpan dueTime, TimeSpan period)
    {
        ArgumentNullException.ThrowIfNull(callback);
        var timer = new VirtualTimer(this, callback, state);
        timer.Change(dueTime, period);
        return timer;
    }

    /// <summary>Fires the next timer that is still set; false when there is none before the horizon.</summary>
    public bool JumpToNextTimer(TimeSpan horizon, out bool moved)
    {
        moved = false;
        while (_alarms.TryPeek(out var alarm, out var at))
        {
            if (!alarm.IsSet)
            {
                _alarms.Dequeue();
                continue;
            }
            if (at.DueTicks > horizon.Ticks) return false;
            _alarms.Dequeue();
            moved = at.DueTicks > _nowTicks;
            _nowTicks = Math.Max(_nowTicks, at.DueTicks);
            alarm.Timer.Fire();
            return true;
        }
        return false;
    }

    private void Set(VirtualTimer timer, TimeSpan dueTime) =>
        _alarms.Enqueue(new Alarm(timer, timer.Setting), (_nowTicks + Math.Max(0, dueTime.Ticks), _order++));

    private readonly record struct Alarm(VirtualTimer Timer, long Setting)
    {
        public bool IsSet => Timer.Setting == Setting;
    }

    private sealed class VirtualTimer(VirtualClock clock, TimerCallback callback, object? state) : ITimer
    {
        private TimeSpan _period = Timeout.InfiniteTimeSpan;
        private bool _disposed;

        /// <summary>Counts the changes: an alarm in the queue counts only when it carries the latest number.</summary>
        public long Setting { get; private set; }

        public bool Change(TimeSpan dueTime, TimeSpan period)
        {
            if (_disposed) return false;
            Setting++;
            _period = period;
            if (dueTime != Timeout.InfiniteTimeSpan) clock.Set(this, dueTime);
            return true;
        }

        public void Fire()
        {
            if (_period > TimeSpan.Zero) clock.Set(this, _period);
            else Setting++;
            callback(state);
        }

        public void Dispose()
        {
            _disposed = true;
            Setting++;
        }

        public ValueTask DisposeAsync()
        {
            Dispose();
            return ValueTask.CompletedTask;
        }
    }
}
