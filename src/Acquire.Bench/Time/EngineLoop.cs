namespace Acquire.Bench.Time;

/// <summary>
/// The single thread on which engine, drivers, recorder and simulator run. Continuations queue here and nowhere else;
/// real and virtual time differ only in what wakes the loop up.
/// </summary>
public abstract class EngineLoop : SynchronizationContext
{
    /// <summary>The clock whose timers wake this loop.</summary>
    public abstract TimeProvider Clock { get; }

    /// <summary>True on the loop's own thread while it runs.</summary>
    public abstract bool IsCurrent { get; }

    /// <summary>Runs <paramref name="main"/> and everything it awaits on the calling thread, until it is complete; rethrows its exception.</summary>
    public abstract void Run(Func<Task> main);
}
