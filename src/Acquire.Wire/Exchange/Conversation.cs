using System.Text;

namespace Acquire.Wire;

/// <summary>One question and its answer at a time over a link, keeping the link free of answers to earlier questions.</summary>
/// <remarks>
/// Invariant: the link is owing from the moment a question leaves until exactly one complete answer to it was read.
/// An owing link is cleaned before the next question: by a new connection where that gives a fresh stream, else by a
/// question whose answer is known, reading until that answer comes; answers keep their order, so all before it are late ones.
/// A copy of that known answer met later, under another question, is such a late one too and is skipped.
/// </remarks>
internal sealed class Conversation(ILink link, TextFraming framing, TimeProvider clock, ExchangeTrace trace) : IDisposable
{
    private const int MostLateReplies = 64;
    private readonly ExchangeDeadline _deadline = new(clock);
    private readonly ReplyReader _reader = new(framing);
    private byte[] _out = new byte[256];
    private string? _knownQuestion;
    private string? _knownAnswer;
    private bool _owing;
    private bool _cutWrite;
    private bool _aborted;

    /// <summary>A question that may be asked at any time, and the answer that it always gets.</summary>
    public void Learn(string question, string answer) => (_knownQuestion, _knownAnswer) = (question, answer);

    /// <summary>Ends what is in flight with <see cref="ReplyState.Aborted"/>; the link then owes an answer and is cleaned when next used.</summary>
    public void Abort()
    {
        _aborted = true;
        _deadline.Cancel();
    }

    /// <summary>Sends a command, if any, then asks a question, if any, within one time-out.</summary>
    public async ValueTask<Reply> RunAsync(string? command, string? question, TimeSpan timeOut, CancellationToken cancellation)
    {
        var startTicks = clock.GetTimestamp();
        _aborted = false;
        _deadline.Begin(timeOut, startTicks, cancellation);
        try
        {
            await OpenAsync();
            if (command is not null) await WriteAsync(command);
            if (question is null) return new Reply(ReplyState.Sent, "", null, startTicks);
            if (_owing) await ResynchroniseAsync();
            startTicks = clock.GetTimestamp();
            _owing = true;
            await WriteAsync(question);
            return await ReadAsync(question, startTicks);
        }
        catch (OperationCanceledException)
        {
            cancellation.ThrowIfCancellationRequested();
            return _aborted ? Ended(ReplyState.Aborted, question ?? command, "a make-safe took the link") : TimedOut(question ?? command, timeOut);
        }
        catch (LinkException e)
        {
            link.Close();
            return _aborted ? Ended(ReplyState.Aborted, question ?? command, "a make-safe took the link")
                : new Reply(ReplyState.LinkFailed, _reader.Rest(), e.Message, clock.GetTimestamp());
        }
        finally { _deadline.End(); }
    }

    public void Dispose() => _deadline.Dispose();

    private async ValueTask OpenAsync()
    {
        _reader.Forget();
        if (link.IsOpen && _owing && link.ReopenSeparates) link.Close();
        if (link.IsOpen)
        {
            try
            {
                await _deadline.Within(link.DiscardInputAsync(_deadline.Token));
                return;
            }
            // Nothing of this exchange was sent yet, so a link found dead may be opened again without harm.
            catch (LinkException) { link.Close(); }
        }
        await _deadline.Within(link.OpenAsync(_deadline.Token));
        if (link.ReopenSeparates) (_owing, _cutWrite) = (false, false);
    }

    private async ValueTask WriteAsync(string message)
    {
        trace.Add(clock.GetTimestamp(), true, message);
        var length = Encode(message);
        _cutWrite = true;
        await _deadline.Within(link.WriteAsync(_out.AsMemory(0, length), _deadline.Token));
        _cutWrite = false;
    }

    // A message that was cut short is ended first, so that its rest does not run into the next one.
    private int Encode(string message)
    {
        var needed = message.Length + 2 * framing.WriteTerminator.Length;
        if (_out.Length < needed) _out = new byte[needed];
        var length = _cutWrite ? Encoding.Latin1.GetBytes(framing.WriteTerminator, _out) : 0;
        length += Encoding.Latin1.GetBytes(message, _out.AsSpan(length));
        return length + Encoding.Latin1.GetBytes(framing.WriteTerminator, _out.AsSpan(length));
    }

    private async ValueTask<Reply> ReadAsync(string question, long startTicks)
    {
        while (true)
        {
            if (_reader.TakeLine() is { } line)
            {
                if (IsLateKnownAnswer(line, question)) continue;
                var endTicks = clock.GetTimestamp();
                trace.Add(endTicks, false, line);
                if (_reader.HasRest) return Ended(ReplyState.Ambiguous, question, $"'{line}' was followed by '{_reader.Rest()}'");
                _owing = false;
                return new Reply(ReplyState.Answered, line, null, startTicks + (endTicks - startTicks) / 2);
            }
            if (_reader.Room.IsEmpty) return TooLong(question);
            _reader.Received(await _deadline.Within(link.ReadAsync(_reader.Room, _deadline.Token)));
        }
    }

    private bool IsLateKnownAnswer(string line, string question) =>
        _knownAnswer is not null && line == _knownAnswer && question != _knownQuestion;

    private async ValueTask ResynchroniseAsync()
    {
        if (_knownQuestion is null)
        {
            await _deadline.Within(new ValueTask(Task.Delay(framing.Quiet, clock, _deadline.Token)));
            await _deadline.Within(link.DiscardInputAsync(_deadline.Token));
            _owing = false;
            return;
        }
        _deadline.Arm();
        await WriteAsync(_knownQuestion);
        for (var late = 0; late < MostLateReplies;)
        {
            if (_reader.TakeLine() is { } line)
            {
                late++;
                if (line != _knownAnswer) continue;
                _owing = false;
                _reader.Forget();
                return;
            }
            if (_reader.Room.IsEmpty) _reader.Forget();
            _reader.Received(await _deadline.Within(link.ReadAsync(_reader.Room, _deadline.Token)));
        }
        throw new LinkException($"{link.Address} gives answers that nobody asked for, more than {MostLateReplies}. Check that no other program talks to it.");
    }

    private Reply TimedOut(string? asked, TimeSpan timeOut) => Ended(ReplyState.TimedOut, asked,
        FormattableString.Invariant($"no complete answer within {timeOut.TotalSeconds:0.###} s; {(_reader.HasRest ? $"found '{_reader.Rest()}'" : "found nothing")}"));

    private Reply TooLong(string question)
    {
        var reply = Ended(ReplyState.TooLong, question,
            FormattableString.Invariant($"the answer exceeds {framing.LongestReply} bytes; it starts with '{_reader.Rest(40)}'"));
        _reader.Forget();
        return reply;
    }

    private Reply Ended(ReplyState state, string? asked, string what) => new(state, _reader.Rest(),
        $"{link.Address}: '{asked}' failed: {what}. Check the instrument, its cable and its time-out in the bench file.", clock.GetTimestamp());
}
