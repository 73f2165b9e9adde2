using System.Collections.Concurrent;
using Acquire.Bench.Time;

namespace Acquire.Sweep.Loops;

/// <summary>The engine's loop in real time: waits for continuations that links, timers and sockets post, and runs them on its one thread.</summary>
public sealed class RealLoop(TimeProvider clock) : EngineLoop, IDisposable
{
    private readonly BlockingCollection<(SendOrPostCallback Callback, object? State)> _ready = [];
    private int _thread = -1;

    /// <inheritdoc/>
    public override TimeProvider Clock => clock;

    /// <inheritdoc/>
    public override bool IsCurrent => Environment.CurrentManagedThreadId == Volatile.Read(ref _thread);

    /// <inheritdoc/>
    public override void Run(Func<Task> main)
    {
        ArgumentNullException.ThrowIfNull(main);
        var before = Current;
        Volatile.Write(ref _thread, Environment.CurrentManagedThreadId);
        SetSynchronizationContext(this);
        try
        {
            Exception? first = null;
            var task = main();
            // Wakes the loop when the last continuation ran on no loop at all, as for a task that fails at once.
            _ = task.ContinueWith(static (_, self) => ((RealLoop)self!).Post(static _ => { }, null), this, CancellationToken.None, TaskContinuationOptions.ExecuteSynchronously, TaskScheduler.Default);
            while (!task.IsCompleted)
            {
                var (callback, state) = _ready.Take();
                try
                {
                    callback(state);
                }
                catch (Exception fault)
                {
                    // Nobody may end the loop under the engine: it goes on, makes safe, and the fault is thrown at the end.
                    first ??= fault;
                }
            }

            task.GetAwaiter().GetResult();
            if (first is not null)
            {
                throw new InvalidOperationException("A callback on the engine's loop failed: " + first.Message, first);
            }
        }
        finally
        {
            SetSynchronizationContext(before);
            Volatile.Write(ref _thread, -1);
        }
    }

    /// <inheritdoc/>
    public override void Post(SendOrPostCallback d, object? state)
    {
        try
        {
            _ready.Add((d, state));
        }
        catch (ObjectDisposedException)
        {
            // A timer or a socket that answers after the end has nobody to answer to.
        }
    }

    /// <inheritdoc/>
    public override void Send(SendOrPostCallback d, object? state)
    {
        if (!IsCurrent)
        {
            throw new NotSupportedException("Nobody may wait for the engine's loop; post instead.");
        }

        d(state);
    }

    /// <inheritdoc/>
    public override SynchronizationContext CreateCopy() => this;

    /// <inheritdoc/>
    public void Dispose() => _ready.Dispose();
}
