using System.Collections.Concurrent;
using System.Globalization;
using Acquire.Bench.Time;

namespace Acquire.Simulator.Time;

/// <summary>
/// A single-threaded loop whose clock never waits: it runs everything that is ready, then jumps to the next timer.
/// Twelve hours of a bench pass in seconds, always in the same order.
/// </summary>
/// <remarks>
/// Timers that are due at the same instant fire in the order in which they were set; everything they make ready runs
/// before the next one fires. Bounded twice: by <see cref="VirtualTimeBounds.TurnsPerInstant"/>, so that a loop that
/// never waits is reported instead of hanging, and by <see cref="VirtualTimeBounds.Horizon"/>, so that one that waits
/// for ever is reported too. Work that runs elsewhere (Task.Run, CancellationTokenSource.CancelAsync) is not waited for:
/// the clock has moved on before it comes back.
/// </remarks>
public sealed class VirtualTime : EngineLoop
{
    private readonly VirtualTimeBounds _bounds;
    private readonly Queue<Turn> _ready = new();
    private readonly ConcurrentQueue<Turn> _outside = new();
    private readonly VirtualClock _clock;
    private int _threadId = -1;
    private long _outsideTurns;

    /// <summary>Starts the clock at an instant.</summary>
    public VirtualTime(DateTimeOffset startUtc, VirtualTimeBounds? bounds = null)
    {
        _bounds = bounds ?? new VirtualTimeBounds();
        _clock = new VirtualClock(startUtc.ToUniversalTime());
    }

    /// <inheritdoc/>
    public override TimeProvider Clock => _clock;

    /// <inheritdoc/>
    public override bool IsCurrent => Environment.CurrentManagedThreadId == Volatile.Read(ref _threadId);

    /// <summary>How far the clock has come since it was started.</summary>
    public TimeSpan Elapsed => _clock.Elapsed;

    /// <summary>How many continuations came from other threads; anything but zero means that a run cannot be repeated exactly.</summary>
    public long TurnsFromOutside => Interlocked.Read(ref _outsideTurns);

    /// <inheritdoc/>
    public override void Run(Func<Task> main)
    {
        ArgumentNullException.ThrowIfNull(main);
        var before = Current;
        var nobody = Interlocked.CompareExchange(ref _threadId, Environment.CurrentManagedThreadId, -1) == -1;
        if (!nobody) throw new InvalidOperationException("This virtual time is already running. Use one loop for one run at a time.");
        SetSynchronizationContext(this);
        try
        {
            var task = main();
            RunUntil(task);
            task.GetAwaiter().GetResult();
        }
        finally
        {
            SetSynchronizationContext(before);
            Volatile.Write(ref _threadId, -1);
        }
    }

    /// <inheritdoc/>
    public override void Post(SendOrPostCallback d, object? state)
    {
        if (IsCurrent) _ready.Enqueue(new Turn(d, state));
        else
        {
            Interlocked.Increment(ref _outsideTurns);
            _outside.Enqueue(new Turn(d, state));
        }
    }

    /// <inheritdoc/>
    public override void Send(SendOrPostCallback d, object? state)
    {
        ArgumentNullException.ThrowIfNull(d);
        if (!IsCurrent) throw new InvalidOperationException("Send from another thread would block virtual time. Use Post.");
        d(state);
    }

    /// <inheritdoc/>
    public override SynchronizationContext CreateCopy() => this;

    private void RunUntil(Task main)
    {
        var turns = 0;
        while (!main.IsCompleted)
        {
            if (_ready.TryDequeue(out var turn) || _outside.TryDequeue(out turn))
            {
                turn.Callback(turn.State);
                if (++turns > _bounds.TurnsPerInstant) throw StandsStill();
            }
            else if (_clock.JumpToNextTimer(_bounds.Horizon, out var moved))
            {
                turns = moved ? 0 : turns + 1;
                if (turns > _bounds.TurnsPerInstant) throw StandsStill();
            }
            else
            {
                throw NothingToWaitFor();
            }
        }
    }

    private InvalidOperationException StandsStill() => new(string.Create(
        CultureInfo.InvariantCulture,
        $"Virtual time stands still at {Elapsed}: {_bounds.TurnsPerInstant} turns ran without anyone waiting for the clock."));

    private InvalidOperationException NothingToWaitFor() => new(string.Create(
        CultureInfo.InvariantCulture,
        $"Virtual time ended at {Elapsed}: the main task is not complete, nothing is ready and no timer is due before {_bounds.Horizon}."));

    private readonly record struct Turn(SendOrPostCallback Callback, object? State);
}

/// <summary>How long virtual time goes on before it reports a run that does not end.</summary>
public sealed record VirtualTimeBounds
{
    /// <summary>Most continuations and timers that may run while the clock does not move.</summary>
    public int TurnsPerInstant { get; init; } = 5_000_000;

    /// <summary>Latest instant that the clock jumps to, counted from its start.</summary>
    public TimeSpan Horizon { get; init; } = TimeSpan.FromDays(366);
}
