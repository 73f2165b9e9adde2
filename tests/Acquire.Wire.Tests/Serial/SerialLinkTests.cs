using Acquire.Testing;

namespace Acquire.Wire.Tests.Serial;

public class SerialLinkTests
{
    private static readonly TimeSpan Long = TimeSpan.FromSeconds(20);
    private static readonly TimeSpan Short = TimeSpan.FromMilliseconds(60);

    private static SerialLink Link(PseudoTerminal terminal, SerialSettings? settings = null) =>
        new(new SerialAddress(terminal.Address, terminal.Path), settings ?? new SerialSettings { Baud = 115200 });

    private static TextExchange Over(SerialLink link) => new(link, TextFraming.LineFeed, TimeProvider.System);

    private static Thread Answering(PseudoTerminal terminal, Func<string, string?> answer)
    {
        var thread = new Thread(() =>
        {
            while (terminal.ReadLine() is { Length: > 0 } line)
                if (answer(line) is { } text) terminal.Send(text);
        })
        { IsBackground = true };
        thread.Start();
        return thread;
    }

    [Fact]
    public async Task Ask_OverPseudoTerminal_AnswersRepeatedly()
    {
        using var terminal = new PseudoTerminal();
        Answering(terminal, line => line + "!\r\n");
        await using var exchange = Over(Link(terminal));
        for (var i = 0; i < 100; i++) Assert.Equal(FormattableString.Invariant($"{i}!"), (await exchange.AskAsync(FormattableString.Invariant($"{i}"), Long, default)).Text);
    }

    [Fact]
    public async Task Ask_ThroughTheRuntimesPort_AnswersToo()
    {
        using var terminal = new PseudoTerminal();
        Answering(terminal, line => line + "!\n");
        await using var exchange = Over(Link(terminal, new SerialSettings { Baud = 9600, PreferRuntimePort = true }));
        Assert.Equal("A!", (await exchange.AskAsync("A", Long, default)).Text);
        Assert.Equal("B!", (await exchange.AskAsync("B", Long, default)).Text);
    }

    [Fact]
    public async Task Ask_AfterTimeOut_ReadsOnToTheKnownAnswerSoThatALateOneIsNotTaken()
    {
        using var terminal = new PseudoTerminal();
        // The late answer leaves only when the next question has arrived: the worst case of all.
        var late = "";
        Answering(terminal, line =>
        {
            if (line == "SLOW?") { late = "late\n"; return null; }
            var text = late + (line == "*IDN?" ? "A,B,C,D\n" : line + "!\n");
            late = "";
            return text;
        });
        await using var exchange = Over(Link(terminal));
        exchange.ResynchroniseBy("*IDN?", "A,B,C,D");
        Assert.Equal(ReplyState.TimedOut, (await exchange.AskAsync("SLOW?", Short, default)).State);
        Assert.Equal("NEXT?!", (await exchange.AskAsync("NEXT?", Long, default)).Text);
    }

    [Fact]
    public async Task Ask_LateAnswersToResynchronisation_AreSkipped()
    {
        using var terminal = new PseudoTerminal();
        var asked = 0;
        Answering(terminal, line => line switch
        {
            "SLOW?" => null,
            // The first resynchronisation is not answered in time; both answers come with the second one and after it.
            "*IDN?" => ++asked == 1 ? null : "late\nA,B,C,D\n",
            _ => "A,B,C,D\n" + line + "!\n",
        });
        await using var exchange = Over(Link(terminal));
        exchange.ResynchroniseBy("*IDN?", "A,B,C,D");
        Assert.Equal(ReplyState.TimedOut, (await exchange.AskAsync("SLOW?", Short, default)).State);
        Assert.Equal(ReplyState.TimedOut, (await exchange.AskAsync("ONE?", Short, default)).State);
        Assert.Equal("TWO?!", (await exchange.AskAsync("TWO?", Long, default)).Text);
    }

    [Fact]
    public async Task Ask_AfterTimeOutWithoutAKnownAnswer_WaitsUntilTheLineIsQuiet()
    {
        using var terminal = new PseudoTerminal();
        Answering(terminal, line => line == "SLOW?" ? "half an answ" : line + "!\n");
        await using var exchange = Over(Link(terminal));
        var reply = await exchange.AskAsync("SLOW?", Short, default);
        Assert.Equal((ReplyState.TimedOut, "half an answ"), (reply.State, reply.Text));
        Assert.Equal("NEXT?!", (await exchange.AskAsync("NEXT?", Long, default)).Text);
    }

    [Fact]
    public async Task Ask_Garbage_ComesBackAsBytesNotAsQuestionMarks()
    {
        using var terminal = new PseudoTerminal();
        Answering(terminal, _ => "\u00ff\u0000\u0080;\n");
        await using var exchange = Over(Link(terminal));
        Assert.Equal("\u00ff\u0000\u0080;", (await exchange.AskAsync("A?", Long, default)).Text);
    }

    [Fact]
    public async Task Ask_AdapterUnplugged_FailsAtOnceAndClosesWithoutHanging()
    {
        using var terminal = new PseudoTerminal();
        await using var link = Link(terminal);
        await using var exchange = Over(link);
        var pending = exchange.AskAsync("A?", TimeSpan.FromMinutes(10), default).AsTask();
        Assert.Equal("A?", terminal.ReadLine());
        terminal.Unplug();
        var reply = await pending;
        Assert.Equal(ReplyState.LinkFailed, reply.State);
        Assert.Contains("Check the adapter and its cable", reply.Problem, StringComparison.Ordinal);
        Assert.False(link.IsOpen);
        Assert.Equal(ReplyState.LinkFailed, (await exchange.AskAsync("A?", Long, default)).State);
    }

    [Fact]
    public async Task Write_NobodyReads_TimesOutAndCloses()
    {
        using var terminal = new PseudoTerminal();
        await using var exchange = Over(Link(terminal));
        var reply = await exchange.SendAsync(new string('x', 1_000_000), Short, default);
        Assert.Equal(ReplyState.TimedOut, reply.State);
    }

    [Fact]
    public async Task Ask_AfterAMessageWasCutShort_EndsThatOneFirst()
    {
        using var terminal = new PseudoTerminal();
        await using var exchange = Over(Link(terminal));
        Assert.Equal(ReplyState.TimedOut, (await exchange.SendAsync(new string('x', 1_000_000), Short, default)).State);
        Answering(terminal, line => line.StartsWith('x') ? null : line + "!\n");
        Assert.Equal("A?!", (await exchange.AskAsync("A?", Long, default)).Text);
    }

    [Fact]
    public void Seize_WithExchangeInFlight_EndsItAndResynchronises() => TestLoop.RunReal(async () =>
    {
        using var terminal = new PseudoTerminal();
        using var asked = new SemaphoreSlim(0);
        var got = new List<string>();
        Answering(terminal, line =>
        {
            lock (got) got.Add(line);
            if (line == "READ?") asked.Release();
            return line switch { "*IDN?" => "late 1.5\nA,B,C,D\n", "OUTP?" => "0\n", _ => null };
        });
        await using var exchange = Over(Link(terminal));
        exchange.ResynchroniseBy("*IDN?", "A,B,C,D");
        var inFlight = exchange.AskAsync("READ?", TimeSpan.FromMinutes(10), default).AsTask();
        await asked.WaitAsync();
        using (var seizure = await exchange.SeizeAsync(default))
        {
            await seizure.SendAsync("OUTP 0", Long, default);
            Assert.Equal("0", (await seizure.AskAsync("OUTP?", Long, default)).Text);
        }
        Assert.Equal(ReplyState.Aborted, (await inFlight).State);
        // The order that makes safe is not held up by resynchronising.
        Assert.Equal(["READ?", "OUTP 0", "*IDN?", "OUTP?"], got);
    });

    [Fact]
    public async Task Open_PortHeldBySomebodyElse_IsRefusedUntilReleased()
    {
        using var terminal = new PseudoTerminal();
        await using var first = Link(terminal);
        await first.OpenAsync(default);
        await using var second = Link(terminal);
        var refused = await Assert.ThrowsAsync<LinkException>(() => second.OpenAsync(default).AsTask());
        Assert.Contains("another program holds the port", refused.Message, StringComparison.Ordinal);
        first.Close();
        await second.OpenAsync(default);
        Assert.True(second.IsOpen);
    }

    [Fact]
    public async Task Open_SevenBitsEvenParityOnPseudoTerminal_WarnsButWorks()
    {
        using var terminal = new PseudoTerminal();
        await using var link = Link(terminal, new SerialSettings { Baud = 12345, DataBits = 7, Parity = SerialParity.Even });
        await link.OpenAsync(default);
        Assert.Contains("did not take 7 data bits, parity Even", link.Warning, StringComparison.Ordinal);
        await using var exchange = Over(link);
        Answering(terminal, line => line + "\n");
        Assert.Equal("A?", (await exchange.AskAsync("A?", Long, default)).Text);
    }

    [Theory]
    [InlineData("/dev/null", "not a serial port")]
    [InlineData("/dev/no-such-port", "No such file or directory")]
    public async Task Open_NotASerialPort_SaysWhy(string path, string why)
    {
        if (!OperatingSystem.IsLinux()) Assert.Skip("The messages are those of Linux.");
        await using var link = new SerialLink(new SerialAddress($"ASRL{path}::INSTR", path), new SerialSettings());
        var refused = await Assert.ThrowsAsync<LinkException>(() => link.OpenAsync(default).AsTask());
        Assert.Contains(why, refused.Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(9600, 5, 1, "data bits 5 refused; allowed 7 or 8")]
    [InlineData(9600, 8, 3, "stop bits 3 refused; allowed 1 or 2")]
    [InlineData(0, 8, 1, "baud 0 refused; allowed 50 to 4000000")]
    public async Task Open_ImpossibleFraming_IsRefused(int baud, int dataBits, int stopBits, string message)
    {
        await using var link = new SerialLink(new SerialAddress("ASRL/dev/x::INSTR", "/dev/x"), new SerialSettings { Baud = baud, DataBits = dataBits, StopBits = stopBits });
        var refused = await Assert.ThrowsAsync<LinkException>(() => link.OpenAsync(default).AsTask());
        Assert.Contains(message, refused.Message, StringComparison.Ordinal);
    }
}
