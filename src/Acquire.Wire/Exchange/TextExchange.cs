namespace Acquire.Wire;

/// <summary>Text questions and answers over one link, one at a time, in the order they were asked.</summary>
/// <remarks>
/// Belongs to one loop: no member may be called from two threads at once. The link is opened when it is first needed and again
/// after it failed. Failures are returned in <see cref="Reply.State"/>; only a cancelled token throws.
/// A late answer is never taken as the answer to a later question.
/// </remarks>
public sealed class TextExchange : IAsyncDisposable
{
    private readonly ILink _link;
    private readonly TimeProvider _clock;
    private readonly ExchangeTurns _turns;
    private readonly Conversation _conversation;
    private bool _seized;

    /// <summary>An exchange over a link; <paramref name="clock"/> is the one that time-outs run on.</summary>
    public TextExchange(ILink link, TextFraming framing, TimeProvider clock, ExchangeTrace? trace = null)
    {
        Trace = trace ?? new ExchangeTrace();
        (_link, _clock, _turns) = (link, clock, new ExchangeTurns(framing.LongestQueue));
        _conversation = new Conversation(link, framing, clock, Trace);
    }

    /// <summary>The address of the link.</summary>
    public string Address => _link.Address;

    /// <summary>The last messages, when switched on.</summary>
    public ExchangeTrace Trace { get; }

    /// <summary>Names a question that may be asked at any time and always gets the same answer, to resynchronise a serial line by.</summary>
    public void ResynchroniseBy(string question, string answer) => _conversation.Learn(question, answer);

    /// <summary>Asks a question and waits for its answer.</summary>
    public ValueTask<Reply> AskAsync(string question, TimeSpan timeOut, CancellationToken cancellation) =>
        InTurnAsync(null, question, timeOut, cancellation);

    /// <summary>Sends a message that gets no answer.</summary>
    public ValueTask<Reply> SendAsync(string command, TimeSpan timeOut, CancellationToken cancellation) =>
        InTurnAsync(command, null, timeOut, cancellation);

    /// <summary>Sends a command and asks a question with nothing between them, such as a setting and the error queue.</summary>
    public ValueTask<Reply> SendThenAskAsync(string command, string question, TimeSpan timeOut, CancellationToken cancellation) =>
        InTurnAsync(command, question, timeOut, cancellation);

    /// <summary>
    /// Takes the link with right of way: the exchange in flight and all that wait end as aborted, and others wait until
    /// the result is disposed. A second seizure waits for the first.
    /// </summary>
    public async ValueTask<Seizure> SeizeAsync(CancellationToken cancellation)
    {
        var turn = _turns.EnterFirstAsync(cancellation);
        if (!turn.IsCompleted && !_seized) _conversation.Abort();
        await turn;
        _seized = true;
        return new Seizure(this);
    }

    /// <summary>Ends the exchange in flight and all that wait, without using the link.</summary>
    public async ValueTask AbortAsync(CancellationToken cancellation)
    {
        using var seizure = await SeizeAsync(cancellation);
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        await _link.DisposeAsync();
        _conversation.Dispose();
    }

    internal ValueTask<Reply> AtOnceAsync(string? command, string? question, TimeSpan timeOut, CancellationToken cancellation) =>
        _conversation.RunAsync(command, question, timeOut, cancellation);

    internal void Release()
    {
        _seized = false;
        _turns.Leave();
    }

    private async ValueTask<Reply> InTurnAsync(string? command, string? question, TimeSpan timeOut, CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        var outcome = await _turns.EnterAsync(cancellation);
        if (outcome != TurnOutcome.Granted) return NotGranted(outcome, question ?? command);
        try { return await _conversation.RunAsync(command, question, timeOut, cancellation); }
        finally { _turns.Leave(); }
    }

    private Reply NotGranted(TurnOutcome outcome, string? asked) => outcome == TurnOutcome.SentAway
        ? new Reply(ReplyState.Aborted, "", $"{Address}: '{asked}' was not sent: a make-safe took the link.", _clock.GetTimestamp())
        : new Reply(ReplyState.Refused, "", $"{Address}: '{asked}' was not sent: too many exchanges wait for this instrument. Poll it more slowly.", _clock.GetTimestamp());
}

/// <summary>Sole use of an exchange's link, until disposed.</summary>
public sealed class Seizure : IDisposable
{
    private TextExchange? _exchange;

    internal Seizure(TextExchange exchange) => _exchange = exchange;

    /// <summary>Asks a question and waits for its answer.</summary>
    public ValueTask<Reply> AskAsync(string question, TimeSpan timeOut, CancellationToken cancellation) =>
        Held().AtOnceAsync(null, question, timeOut, cancellation);

    /// <summary>Sends a message that gets no answer.</summary>
    public ValueTask<Reply> SendAsync(string command, TimeSpan timeOut, CancellationToken cancellation) =>
        Held().AtOnceAsync(command, null, timeOut, cancellation);

    /// <inheritdoc/>
    public void Dispose() => Interlocked.Exchange(ref _exchange, null)?.Release();

    private TextExchange Held() => _exchange ?? throw new ObjectDisposedException(nameof(Seizure));
}
