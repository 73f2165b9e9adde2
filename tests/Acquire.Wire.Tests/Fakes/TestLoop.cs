namespace Acquire.Testing;

/// <summary>A single-threaded loop under virtual time: runs what is ready, then jumps to the next timer.</summary>
internal sealed class TestLoop : SynchronizationContext
{
    private readonly Queue<(SendOrPostCallback Callback, object? State)> _ready = new();
    private readonly int _threadId = Environment.CurrentManagedThreadId;

    public TestClock Clock { get; } = new();

    /// <summary>Runs a test body to its end; fails when it waits for something that no timer and no continuation will bring.</summary>
    public static void Run(Func<TestLoop, Task> body)
    {
        var before = Current;
        var loop = new TestLoop();
        SetSynchronizationContext(loop);
        try
        {
            var main = body(loop);
            while (!main.IsCompleted)
            {
                if (loop._ready.TryDequeue(out var work)) work.Callback(work.State);
                else if (!loop.Clock.JumpToNextTimer()) throw new InvalidOperationException("The test waits for something that never comes.");
            }
            main.GetAwaiter().GetResult();
        }
        finally { SetSynchronizationContext(before); }
    }

    /// <summary>Runs a test body on one thread in real time, as the engine does with real links.</summary>
    public static void RunReal(Func<Task> body)
    {
        var before = Current;
        using var loop = new RealLoop();
        SetSynchronizationContext(loop);
        try { loop.Pump(body()); }
        finally { SetSynchronizationContext(before); }
    }

    public override void Post(SendOrPostCallback d, object? state)
    {
        if (Environment.CurrentManagedThreadId != _threadId) throw new InvalidOperationException("A continuation left the loop's thread.");
        _ready.Enqueue((d, state));
    }

    public override SynchronizationContext CreateCopy() => this;
}

/// <summary>A single-threaded loop in real time; continuations come from any thread and run on this one.</summary>
internal sealed class RealLoop : SynchronizationContext, IDisposable
{
    private readonly System.Collections.Concurrent.BlockingCollection<(SendOrPostCallback Callback, object? State)> _ready = [];

    public override void Post(SendOrPostCallback d, object? state) => _ready.Add((d, state));

    public override SynchronizationContext CreateCopy() => this;

    public void Pump(Task main)
    {
        main.ContinueWith(_ => _ready.CompleteAdding(), TaskScheduler.Default);
        foreach (var work in _ready.GetConsumingEnumerable()) work.Callback(work.State);
        main.GetAwaiter().GetResult();
    }

    public void Dispose() => _ready.Dispose();
}

/// <summary>A clock that stands still until it is told to jump.</summary>
internal sealed class TestClock : TimeProvider
{
    private readonly List<Timer> _timers = [];

    public long Ticks { get; private set; }

    public int LiveTimers => _timers.Count;

    public override long TimestampFrequency => TimeSpan.TicksPerSecond;

    public override long GetTimestamp() => Ticks;

    public override DateTimeOffset GetUtcNow() => DateTimeOffset.UnixEpoch.AddTicks(Ticks);

    public override ITimer CreateTimer(TimerCallback callback, object? state, TimeSpan dueTime, TimeSpan period)
    {
        var timer = new Timer(this, callback, state);
        timer.Change(dueTime, period);
        return timer;
    }

    public bool JumpToNextTimer()
    {
        var next = _timers.MinBy(t => t.DueTicks);
        if (next is null) return false;
        Ticks = Math.Max(Ticks, next.DueTicks);
        _timers.Remove(next);
        next.Fire();
        return true;
    }

    private sealed class Timer(TestClock clock, TimerCallback callback, object? state) : ITimer
    {
        public long DueTicks { get; private set; }

        public bool Change(TimeSpan dueTime, TimeSpan period)
        {
            clock._timers.Remove(this);
            if (dueTime == Timeout.InfiniteTimeSpan) return true;
            DueTicks = clock.Ticks + dueTime.Ticks;
            clock._timers.Add(this);
            return true;
        }

        public void Fire() => callback(state);

        public void Dispose() => clock._timers.Remove(this);

        public ValueTask DisposeAsync()
        {
            Dispose();
            return ValueTask.CompletedTask;
        }
    }
}
