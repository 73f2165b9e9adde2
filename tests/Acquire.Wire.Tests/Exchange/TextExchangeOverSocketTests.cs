using Acquire.Testing;

namespace Acquire.Wire.Tests.Exchange;

public class TextExchangeOverSocketTests
{
    private static readonly TimeSpan Long = TimeSpan.FromSeconds(20);
    private static readonly TimeSpan Short = TimeSpan.FromMilliseconds(60);

    private static TextExchange Over(LoopbackInstrument instrument, TextFraming? framing = null)
    {
        var link = new LinkFactory().Create(instrument.Address, LinkSettings.Default);
        return new TextExchange(link, framing ?? TextFraming.LineFeed, link.TimeOutClock);
    }

    [Fact]
    public async Task Ask_Repeatedly_KeepsOneConnection()
    {
        await using var instrument = new LoopbackInstrument(line => line + "!");
        await using var exchange = Over(instrument);
        for (var i = 0; i < 200; i++)
            Assert.Equal(FormattableString.Invariant($"{i}!"), (await exchange.AskAsync(FormattableString.Invariant($"{i}"), Long, default)).Text);
        Assert.Equal(1, instrument.Connections);
    }

    [Fact]
    public async Task Ask_AnswerInPieces_IsPutTogether()
    {
        await using var instrument = new LoopbackInstrument(async (_, c) =>
        {
            foreach (var piece in new[] { "29", "3.", "15", "\n" }) await c.SendAsync(piece);
        });
        await using var exchange = Over(instrument);
        Assert.Equal("293.15", (await exchange.AskAsync("T?", Long, default)).Text);
    }

    [Fact]
    public async Task Ask_AfterTimeOut_LateAnswerGoesToTheClosedConnection()
    {
        var release = new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        var lateSent = new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        await using var instrument = new LoopbackInstrument(async (line, c) =>
        {
            if (line == "SLOW?")
            {
                await release.Task;
                try { await c.SendAsync("late\n"); }
                finally { lateSent.SetResult(); }
                return;
            }
            release.TrySetResult();
            await Task.WhenAny(lateSent.Task);
            await c.SendAsync("fresh\n");
        });
        await using var exchange = Over(instrument);
        Assert.Equal(ReplyState.TimedOut, (await exchange.AskAsync("SLOW?", Short, default)).State);
        Assert.Equal("fresh", (await exchange.AskAsync("NEXT?", Long, default)).Text);
        Assert.Equal(2, instrument.Connections);
    }

    [Fact]
    public async Task Ask_ConnectionClosedInTheMiddleOfAnAnswer_FailsNamingTheAddressAndRecovers()
    {
        var close = true;
        await using var instrument = new LoopbackInstrument(async (_, c) =>
        {
            await c.SendAsync(close ? "29" : "293\n");
            if (close) c.Close();
        });
        await using var exchange = Over(instrument);
        var reply = await exchange.AskAsync("T?", Long, default);
        Assert.Equal((ReplyState.LinkFailed, "29"), (reply.State, reply.Text));
        Assert.Contains(instrument.Address, reply.Problem, StringComparison.Ordinal);
        close = false;
        Assert.Equal("293", (await exchange.AskAsync("T?", Long, default)).Text);
    }

    [Fact]
    public async Task Ask_ConnectionClosedBetweenExchanges_IsOpenedAgain()
    {
        var closed = new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        await using var instrument = new LoopbackInstrument(async (_, c) =>
        {
            await c.SendAsync("1\n");
            if (closed.TrySetResult()) c.Close();
        });
        await using var exchange = Over(instrument);
        Assert.Equal("1", (await exchange.AskAsync("A?", Long, default)).Text);
        await closed.Task;
        Reply reply;
        // The end of the connection may still be on its way when the next question leaves; that one then fails, and says so.
        do reply = await exchange.AskAsync("B?", Long, default); while (reply.State == ReplyState.LinkFailed && instrument.Connections == 1);
        Assert.Equal("1", reply.Text);
        Assert.Equal(2, instrument.Connections);
    }

    [Fact]
    public async Task Ask_NobodyListens_FailsWithTheRemedy()
    {
        string address;
        await using (var instrument = new LoopbackInstrument(_ => "")) address = instrument.Address;
        var link = new LinkFactory().Create(address, LinkSettings.Default);
        await using var exchange = new TextExchange(link, TextFraming.LineFeed, link.TimeOutClock);
        var reply = await exchange.AskAsync("*IDN?", Long, default);
        Assert.Equal(ReplyState.LinkFailed, reply.State);
        Assert.Contains("Check that the instrument is on", reply.Problem, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Ask_PortZero_SaysThatABenchMustBeServedFirst()
    {
        var link = new LinkFactory().Create("TCPIP::127.0.0.1::0::SOCKET", LinkSettings.Default);
        await using var exchange = new TextExchange(link, TextFraming.LineFeed, link.TimeOutClock);
        Assert.Contains("Serve the bench first", (await exchange.AskAsync("*IDN?", Long, default)).Problem, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Ask_EndlessAnswer_IsRefusedAtTheBound()
    {
        await using var instrument = new LoopbackInstrument(async (line, c) =>
        {
            if (line == "OK?") await c.SendAsync("ok\n");
            else await c.SendAsync(new string('9', 200_000));
        });
        await using var exchange = Over(instrument, new TextFraming { LongestReply = 1000 });
        Assert.Equal(ReplyState.TooLong, (await exchange.AskAsync("A?", Long, default)).State);
        Assert.Equal("ok", (await exchange.AskAsync("OK?", Long, default)).Text);
    }

    [Fact]
    public async Task Ask_TwoAnswersAtOnce_AreAmbiguous()
    {
        await using var instrument = new LoopbackInstrument((_, c) => c.SendAsync("1\n2\n"));
        await using var exchange = Over(instrument);
        Assert.Equal(ReplyState.Ambiguous, (await exchange.AskAsync("A?", Long, default)).State);
    }

    [Fact]
    public void Seize_WithExchangeInFlight_SendsOverANewConnection() => TestLoop.RunReal(async () =>
    {
        var got = new List<string>();
        var asked = new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        await using var instrument = new LoopbackInstrument(async (line, c) =>
        {
            lock (got) got.Add(line);
            if (line == "READ?") asked.SetResult();
            if (line == "OUTP?") await c.SendAsync("0\n");
        });
        await using var exchange = Over(instrument);
        var inFlight = exchange.AskAsync("READ?", Long, default).AsTask();
        await asked.Task;
        using (var seizure = await exchange.SeizeAsync(default))
        {
            await seizure.SendAsync("OUTP 0", Long, default);
            Assert.Equal("0", (await seizure.AskAsync("OUTP?", Long, default)).Text);
        }
        Assert.Equal(ReplyState.Aborted, (await inFlight).State);
        Assert.Equal(["READ?", "OUTP 0", "OUTP?"], got);
    });
}
