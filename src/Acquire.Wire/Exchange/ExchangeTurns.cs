namespace Acquire.Wire;

/// <summary>Who may use the link now: first come, first served, bounded; a make-safe goes first and sends the others away.</summary>
/// <remarks>Used on one loop only, so there are no locks.</remarks>
internal sealed class ExchangeTurns(int longestQueue)
{
    private readonly LinkedList<TaskCompletionSource<TurnOutcome>> _waiting = new();
    private readonly HashSet<TaskCompletionSource<TurnOutcome>> _firsts = [];
    private bool _taken;

    /// <summary>Takes the link, or waits for it.</summary>
    public ValueTask<TurnOutcome> EnterAsync(CancellationToken cancellation)
    {
        if (!_taken)
        {
            _taken = true;
            return ValueTask.FromResult(TurnOutcome.Granted);
        }
        return _waiting.Count >= longestQueue
            ? ValueTask.FromResult(TurnOutcome.Full)
            : WaitAsync(_waiting.AddLast(Place()), cancellation);
    }

    /// <summary>Sends away everybody who waits, except those who came this way too, and takes the link after these.</summary>
    public ValueTask<TurnOutcome> EnterFirstAsync(CancellationToken cancellation)
    {
        if (!_taken) return EnterAsync(cancellation);
        var sentAway = _waiting.Where(place => !_firsts.Contains(place)).ToArray();
        foreach (var place in sentAway) _waiting.Remove(place);
        var first = _waiting.AddLast(Place());
        _firsts.Add(first.Value);
        foreach (var place in sentAway) place.TrySetResult(TurnOutcome.SentAway);
        return WaitAsync(first, cancellation);
    }

    public void Leave()
    {
        while (_waiting.First is { } next)
        {
            _waiting.RemoveFirst();
            _firsts.Remove(next.Value);
            // One that was cancelled meanwhile gives its turn on.
            if (next.Value.TrySetResult(TurnOutcome.Granted)) return;
        }
        _taken = false;
    }

    // Asynchronously: the next user starts from the loop, not from inside the one that let go.
    private static TaskCompletionSource<TurnOutcome> Place() => new(TaskCreationOptions.RunContinuationsAsynchronously);

    private async ValueTask<TurnOutcome> WaitAsync(LinkedListNode<TaskCompletionSource<TurnOutcome>> place, CancellationToken cancellation)
    {
        using var registration = cancellation.UnsafeRegister(
            static (state, token) => ((TaskCompletionSource<TurnOutcome>)state!).TrySetCanceled(token), place.Value);
        try { return await place.Value.Task; }
        // One that gave up must not count against the bound of the queue.
        finally
        {
            place.List?.Remove(place);
            _firsts.Remove(place.Value);
        }
    }
}

internal enum TurnOutcome
{
    Granted,
    Full,
    SentAway,
}
