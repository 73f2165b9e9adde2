using Acquire.Testing;
using CsCheck;

namespace Acquire.Wire.Tests.Exchange;

public class TextExchangeInProcessTests
{
    private static readonly TimeSpan Second = TimeSpan.FromSeconds(1);

    private static TextExchange Over(ScriptedDevice device, TestLoop loop, TextFraming? framing = null) =>
        new(new InProcessLink(device, "SIM::device::INSTR", loop.Clock), framing ?? TextFraming.LineFeed, loop.Clock);

    [Fact]
    public void Ask_DeviceWithoutDelay_CompletesSynchronouslyWithoutTimers() => TestLoop.Run(async loop =>
    {
        await using var exchange = Over(ScriptedDevice.AtOnce(m => m + "!"), loop);
        var pending = exchange.AskAsync("A?", Second, default);
        Assert.True(pending.IsCompletedSuccessfully);
        Assert.Equal((ReplyState.Answered, "A?!"), Summary(await pending));
        Assert.Equal(0, loop.Clock.LiveTimers);
    });

    [Fact]
    public void Ask_DeviceTakesTime_AnswersThenAtMidpoint() => TestLoop.Run(async loop =>
    {
        var device = new ScriptedDevice { Answer = _ => ("1.5\r\n", TimeSpan.FromMilliseconds(40)) };
        await using var exchange = Over(device, loop);
        var reply = await exchange.AskAsync("READ?", Second, default);
        Assert.Equal((ReplyState.Answered, "1.5"), Summary(reply));
        Assert.Equal(TimeSpan.FromMilliseconds(40).Ticks, loop.Clock.Ticks);
        Assert.Equal(TimeSpan.FromMilliseconds(20).Ticks, reply.MidpointTicks);
        Assert.Equal(0, loop.Clock.LiveTimers);
    });

    [Fact]
    public void Ask_Silence_TimesOutAtTheTimeOutAndSaysSo() => TestLoop.Run(async loop =>
    {
        await using var exchange = Over(new ScriptedDevice(), loop);
        var reply = await exchange.AskAsync("READ?", Second, default);
        Assert.Equal(ReplyState.TimedOut, reply.State);
        Assert.Equal(Second.Ticks, loop.Clock.Ticks);
        Assert.Equal("SIM::device::INSTR: 'READ?' failed: no complete answer within 1 s; found nothing. Check the instrument, its cable and its time-out in the bench file.", reply.Problem);
    });

    [Fact]
    public void Ask_AfterTimeOut_LateAnswerIsNeverTheNextOne() => TestLoop.Run(async loop =>
    {
        var device = new ScriptedDevice { Answer = m => m == "SLOW?" ? ("late\n", TimeSpan.FromSeconds(1.5)) : ("fresh\n", Second) };
        await using var exchange = Over(device, loop);
        Assert.Equal(ReplyState.TimedOut, (await exchange.AskAsync("SLOW?", Second, default)).State);
        Assert.Equal((ReplyState.Answered, "fresh"), Summary(await exchange.AskAsync("NEXT?", 2 * Second, default)));
        Assert.Equal([true, false, true], device.Connections);
    });

    [Fact]
    public void Ask_HalfAnswer_TimesOutAndShowsTheHalf() => TestLoop.Run(async loop =>
    {
        await using var exchange = Over(new ScriptedDevice { Answer = _ => ("293.1", TimeSpan.Zero) }, loop);
        var reply = await exchange.AskAsync("T?", Second, default);
        Assert.Equal((ReplyState.TimedOut, "293.1"), Summary(reply));
        Assert.Contains("found '293.1'", reply.Problem, StringComparison.Ordinal);
    });

    [Fact]
    public void Ask_TwoAnswers_TrustsNoneAndRecovers() => TestLoop.Run(async loop =>
    {
        var answer = "1\n2\n";
        await using var exchange = Over(new ScriptedDevice { Answer = _ => (answer, TimeSpan.Zero) }, loop);
        var reply = await exchange.AskAsync("A?", Second, default);
        Assert.Equal(ReplyState.Ambiguous, reply.State);
        answer = "3\n";
        Assert.Equal((ReplyState.Answered, "3"), Summary(await exchange.AskAsync("B?", Second, default)));
    });

    [Fact]
    public void Ask_OverlongAnswer_IsRefusedAndTheNextIsClean() => TestLoop.Run(async loop =>
    {
        var answer = new string('7', 100_000) + "\n";
        await using var exchange = Over(new ScriptedDevice { Answer = _ => (answer, TimeSpan.Zero) }, loop, new TextFraming { LongestReply = 256 });
        var reply = await exchange.AskAsync("A?", Second, default);
        Assert.Equal(ReplyState.TooLong, reply.State);
        Assert.Contains("exceeds 256 bytes", reply.Problem, StringComparison.Ordinal);
        answer = "ok\n";
        Assert.Equal("ok", (await exchange.AskAsync("B?", Second, default)).Text);
    });

    [Fact]
    public void Ask_AnswerOfExactlyTheLongest_IsTaken() => TestLoop.Run(async loop =>
    {
        await using var exchange = Over(ScriptedDevice.AtOnce(_ => new string('7', 256)), loop, new TextFraming { LongestReply = 256 });
        Assert.Equal(256, (await exchange.AskAsync("A?", Second, default)).Text.Length);
    });

    [Fact]
    public void Ask_AnyBytesWithoutTerminatorByte_ComeBackUnchanged() =>
        Check.Sample(Gen.Byte.Where(b => b is not ((byte)'\n' or (byte)'\r')).Array[0, 200], bytes => TestLoop.Run(async loop =>
        {
            var text = System.Text.Encoding.Latin1.GetString(bytes);
            await using var exchange = Over(ScriptedDevice.AtOnce(_ => text), loop);
            Assert.Equal((ReplyState.Answered, text), Summary(await exchange.AskAsync("A?", Second, default)));
        }), iter: 200);

    [Fact]
    public void Ask_AnySequenceOfDelays_EveryAnswerBelongsToItsQuestion() =>
        Check.Sample(Gen.Int[0, 2500].Array[1, 12], delaysMs => TestLoop.Run(async loop =>
        {
            var device = new ScriptedDevice { Answer = m => (m + "\n", TimeSpan.FromMilliseconds(delaysMs[int.Parse(m, System.Globalization.CultureInfo.InvariantCulture)])) };
            await using var exchange = Over(device, loop);
            for (var i = 0; i < delaysMs.Length; i++)
            {
                var question = i.ToString(System.Globalization.CultureInfo.InvariantCulture);
                var reply = await exchange.AskAsync(question, Second, default);
                // At exactly the time-out either outcome is right.
                if (delaysMs[i] != 1000) Assert.Equal(delaysMs[i] < 1000 ? ReplyState.Answered : ReplyState.TimedOut, reply.State);
                if (reply.State == ReplyState.Answered) Assert.Equal(question, reply.Text);
            }
        }), iter: 300);

    [Fact]
    public void Ask_SeveralAtOnce_AreServedInOrder() => TestLoop.Run(async loop =>
    {
        var device = new ScriptedDevice { Answer = m => (m + "\n", TimeSpan.FromMilliseconds(10)) };
        await using var exchange = Over(device, loop);
        var replies = await Task.WhenAll(Enumerable.Range(0, 5).Select(i => exchange.AskAsync(FormattableString.Invariant($"Q{i}"), Second, default).AsTask()));
        Assert.Equal(["Q0", "Q1", "Q2", "Q3", "Q4"], replies.Select(r => r.Text));
        Assert.Equal(["Q0", "Q1", "Q2", "Q3", "Q4"], device.Messages);
    });

    [Fact]
    public void Ask_MoreThanTheQueueHolds_IsRefusedNotQueued() => TestLoop.Run(async loop =>
    {
        await using var exchange = Over(new ScriptedDevice { Answer = _ => ("1\n", TimeSpan.FromMilliseconds(10)) }, loop, new TextFraming { LongestQueue = 2 });
        var replies = await Task.WhenAll(Enumerable.Range(0, 4).Select(_ => exchange.AskAsync("A?", Second, default).AsTask()));
        Assert.Equal([ReplyState.Answered, ReplyState.Answered, ReplyState.Answered, ReplyState.Refused], replies.Select(r => r.State));
    });

    [Fact]
    public void Ask_CancelledByItsCaller_ThrowsAndLeavesTheLinkUsable() => TestLoop.Run(async loop =>
    {
        var device = new ScriptedDevice { Answer = m => (m + "\n", TimeSpan.FromMilliseconds(m == "A?" ? 500 : 0)) };
        await using var exchange = Over(device, loop);
        using var source = new CancellationTokenSource(TimeSpan.FromMilliseconds(100), loop.Clock);
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => exchange.AskAsync("A?", Second, source.Token).AsTask());
        Assert.Equal("B?", (await exchange.AskAsync("B?", Second, default)).Text);
    });

    [Fact]
    public void Seize_WithExchangeInFlightAndOthersWaiting_GoesFirstAndSendsThemAway() => TestLoop.Run(async loop =>
    {
        var device = new ScriptedDevice { Answer = m => m == "READ?" ? ("1\n", TimeSpan.FromSeconds(30)) : m == "OUTP?" ? ("0\n", TimeSpan.Zero) : (null, TimeSpan.Zero) };
        await using var exchange = Over(device, loop);
        var inFlight = exchange.AskAsync("READ?", TimeSpan.FromMinutes(1), default).AsTask();
        var waiting = exchange.AskAsync("READ?", TimeSpan.FromMinutes(1), default).AsTask();
        await Task.Delay(Second, loop.Clock);
        using (var seizure = await exchange.SeizeAsync(default))
        {
            Assert.Equal(Second.Ticks, loop.Clock.Ticks);
            var polled = exchange.AskAsync("OUTP?", Second, default);
            Assert.Equal(ReplyState.Sent, (await seizure.SendAsync("OUTP 0", Second, default)).State);
            Assert.Equal("0", (await seizure.AskAsync("OUTP?", Second, default)).Text);
            Assert.False(polled.IsCompleted);
            seizure.Dispose();
            Assert.Equal("0", (await polled).Text);
        }
        Assert.Equal(ReplyState.Aborted, (await inFlight).State);
        Assert.Equal(ReplyState.Aborted, (await waiting).State);
        Assert.Equal(["READ?", "OUTP 0", "OUTP?", "OUTP?"], device.Messages);
    });

    [Fact]
    public void Seize_WhileSeized_WaitsForTheFirst() => TestLoop.Run(async loop =>
    {
        var device = new ScriptedDevice { Answer = m => (m + "\n", TimeSpan.FromMilliseconds(50)) };
        await using var exchange = Over(device, loop);
        var first = await exchange.SeizeAsync(default);
        var answer = first.AskAsync("OUTP?", Second, default).AsTask();
        var second = exchange.SeizeAsync(default).AsTask();
        Assert.Equal(ReplyState.Answered, (await answer).State);
        Assert.False(second.IsCompleted);
        first.Dispose();
        (await second).Dispose();
        Assert.Equal("A?", (await exchange.AskAsync("A?", Second, default)).Text);
    });

    [Fact]
    public void Seize_ManyAtOnceWithExchangeInFlight_TakeTurnsAndEachIsWhole() => TestLoop.Run(async loop =>
    {
        var device = new ScriptedDevice { Answer = m => m == "READ?" ? (null, TimeSpan.Zero) : (m + "\n", TimeSpan.FromMilliseconds(5)) };
        await using var exchange = Over(device, loop);
        var inFlight = exchange.AskAsync("READ?", TimeSpan.FromHours(1), default).AsTask();
        async Task<string> SafeAsync(int who)
        {
            using var seizure = await exchange.SeizeAsync(default);
            var one = await seizure.AskAsync(FormattableString.Invariant($"{who}a"), Second, default);
            var two = await seizure.AskAsync(FormattableString.Invariant($"{who}b"), Second, default);
            return one.Text + two.Text;
        }
        var first = SafeAsync(1);
        var second = SafeAsync(2);
        await Task.Yield();
        var third = SafeAsync(3);
        var waiting = exchange.AskAsync("Z?", Second, default).AsTask();
        Assert.Equal(["1a1b", "2a2b", "3a3b"], await Task.WhenAll(first, second, third));
        Assert.Equal((ReplyState.Aborted, "Z?"), ((await inFlight).State, (await waiting).Text));
        Assert.Equal(["READ?", "1a", "1b", "2a", "2b", "3a", "3b", "Z?"], device.Messages);
    });

    [Fact]
    public void Ask_WaitersThatGaveUp_MakeRoomInTheQueue() => TestLoop.Run(async loop =>
    {
        await using var exchange = Over(new ScriptedDevice { Answer = m => (m + "\n", TimeSpan.FromMilliseconds(100)) }, loop, new TextFraming { LongestQueue = 1 });
        var first = exchange.AskAsync("A?", Second, default).AsTask();
        using var source = new CancellationTokenSource();
        var second = exchange.AskAsync("B?", Second, source.Token).AsTask();
        source.Cancel();
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => second);
        var third = exchange.AskAsync("C?", Second, default).AsTask();
        Assert.Equal(("A?", "C?"), ((await first).Text, (await third).Text));
    });

    [Fact]
    public void Dispose_WithExchangeInFlight_EndsItAsALinkFailure() => TestLoop.Run(async loop =>
    {
        var exchange = Over(new ScriptedDevice(), loop);
        var inFlight = exchange.AskAsync("READ?", TimeSpan.FromHours(1), default).AsTask();
        await exchange.DisposeAsync();
        Assert.Equal(ReplyState.LinkFailed, (await inFlight).State);
        Assert.Equal(0, loop.Clock.LiveTimers);
    });

    [Fact]
    public void Abort_EndsTheExchangeInFlight() => TestLoop.Run(async loop =>
    {
        await using var exchange = Over(new ScriptedDevice(), loop);
        var inFlight = exchange.AskAsync("READ?", TimeSpan.FromHours(1), default).AsTask();
        await exchange.AbortAsync(default);
        Assert.Equal(ReplyState.Aborted, (await inFlight).State);
        Assert.Equal(0, loop.Clock.Ticks);
    });

    [Fact]
    public void Trace_SwitchedOn_HoldsTheLastMessagesOnly() => TestLoop.Run(async loop =>
    {
        await using var exchange = new TextExchange(new InProcessLink(ScriptedDevice.AtOnce(m => m.ToLowerInvariant()), "SIM::device::INSTR", loop.Clock),
            TextFraming.LineFeed, loop.Clock, new ExchangeTrace(3) { Enabled = true });
        await exchange.AskAsync("A?", Second, default);
        await exchange.AskAsync("B?", Second, default);
        Assert.Equal(4, exchange.Trace.Count);
        Assert.Equal([(false, "a?"), (true, "B?"), (false, "b?")], exchange.Trace.Snapshot().Select(e => (e.Sent, e.Text)));
    });

    private static (ReplyState, string) Summary(Reply reply) => (reply.State, reply.Text);
}
