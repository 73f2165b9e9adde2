using System.Net.Sockets;
using System.Text;
using System.Text.Json;
using Xunit;

namespace Acquire.Control.Tests;

public sealed class ControlSocketTests : IAsyncDisposable
{
    private readonly string _path = ControlSockets.PathFor(Path.GetTempPath(), FormattableString.Invariant($"test-{Environment.ProcessId}-{Interlocked.Increment(ref _count)}"));
    private readonly FakeTarget _target = new();
    private readonly InlineLoop _loop = new();
    private static int _count;
    private ControlServer? _server;

    private ControlServer Serve() => _server = ControlServer.Start(_path, _target, _loop);

    public async ValueTask DisposeAsync()
    {
        if (_server is not null)
        {
            await _server.DisposeAsync();
        }
    }

    [Fact]
    public async Task Status_OverTheSocket_IsTheTargets()
    {
        Serve();
        var (client, problem) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        Assert.Null(problem);
        await using (client)
        {
            Assert.Equal(_target.Status(), await client!.StatusAsync(CancellationToken.None)); // NaN included
        }

        Assert.True(_loop.Posts > 0, "the target was called outside the loop");
    }

    [Theory]
    [InlineData("safe")]
    [InlineData("stop")]
    [InlineData("hold")]
    [InlineData("continue")]
    public async Task Command_OverTheSocket_ReachesTheTargetWithNameAndReason(string verb)
    {
        Serve();
        var (client, _) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        await using (client)
        {
            var outcome = await client!.SendAsync(verb, "A. Tester", "because", CancellationToken.None);
            Assert.Equal(new ControlOutcome(true, $"{verb} A. Tester because"), outcome);
        }
    }

    [Fact]
    public async Task Command_WithoutAName_IsRefused()
    {
        Serve();
        var (client, _) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        await using (client)
        {
            var outcome = await client!.SendAsync("stop", " ", null, CancellationToken.None);
            Assert.False(outcome.Done);
            Assert.Contains("operator's name", outcome.Text, StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData("this is no JSON", -32700)]
    [InlineData("{}", -32600)]
    [InlineData("[1,2]", -32700)]
    [InlineData("{\"jsonrpc\":\"2.0\",\"id\":1,\"method\":\"dance\"}", -32601)]
    [InlineData("{\"jsonrpc\":\"2.0\",\"id\":1,\"method\":\"stop\"}", -32602)]
    [InlineData("{\"jsonrpc\":\"2.0\",\"id\":1,\"method\":\"hello\",\"params\":{\"version\":99}}", -32602)]
    public async Task Line_ThatIsNotRight_GivesAnErrorAndTheConnectionLives(string line, int code)
    {
        Serve();
        using var raw = await RawAsync();
        Assert.Equal(code, Code(await AskAsync(raw, line)));
        Assert.Equal(0, Code(await AskAsync(raw, "{\"jsonrpc\":\"2.0\",\"id\":\"x\",\"method\":\"status\"}")));
    }

    /// <summary>A late answer to hold once stood for the outcome of make safe, which had been refused.</summary>
    [Fact]
    public async Task LateAnswer_IsNeverTakenForTheNextCommand()
    {
        using var listener = new Socket(AddressFamily.Unix, SocketType.Stream, ProtocolType.Unspecified);
        listener.Bind(new UnixDomainSocketEndPoint(_path));
        listener.Listen(1);
        var peer = SilentOnHoldAsync(listener);
        var (client, problem) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        Assert.Null(problem);
        await using (client)
        {
            client!.AnswerBound = TimeSpan.FromMilliseconds(300);
            var hold = await client.SendAsync("hold", "A. Tester", null, CancellationToken.None);
            Assert.False(hold.Done);
            Assert.Contains("may still be carried out", hold.Text, StringComparison.Ordinal);
            client.AnswerBound = TimeSpan.FromSeconds(10);
            Assert.Equal(new ControlOutcome(false, "safe refused"), await client.SendAsync("safe", "A. Tester", null, CancellationToken.None));
        }

        await peer;
        File.Delete(_path);
    }

    /// <summary>An engine that begins its answer to hold, goes silent within the line, and ends it when asked the next thing.</summary>
    private static async Task SilentOnHoldAsync(Socket listener)
    {
        using var socket = await listener.AcceptAsync();
        using var reader = new StreamReader(new NetworkStream(socket));
        await reader.ReadLineAsync();
        await socket.SendAsync("{\"jsonrpc\":\"2.0\",\"id\":1,\"result\":{\"version\":1,\"runId\":\"r\"}}\n"u8.ToArray());
        await reader.ReadLineAsync();
        await socket.SendAsync("{\"jsonrpc\":\"2.0\",\"id\":2,\"res"u8.ToArray());
        await reader.ReadLineAsync();
        await socket.SendAsync("ult\":{\"done\":true,\"text\":\"held\"}}\n{\"jsonrpc\":\"2.0\",\"id\":3,\"result\":{\"done\":false,\"text\":\"safe refused\"}}\n"u8.ToArray());
    }

    [Fact]
    public async Task Command_WithoutItsLineEnd_IsNotObeyed()
    {
        Serve();
        using var raw = await RawAsync();
        await raw.SendAsync("{\"jsonrpc\":\"2.0\",\"id\":1,\"method\":\"stop\",\"params\":{\"operator\":\"A\"}}"u8.ToArray());
        raw.Shutdown(SocketShutdown.Send);
        Assert.Equal(0, await raw.ReceiveAsync(new byte[1000]));
        Assert.Equal(0, _loop.Posts);
    }

    [Fact]
    public async Task Target_ThatThrows_GivesAnErrorAndTheConnectionLives()
    {
        _target.Throws = true;
        Serve();
        using var raw = await RawAsync();
        Assert.Equal(-32603, Code(await AskAsync(raw, "{\"jsonrpc\":\"2.0\",\"id\":1,\"method\":\"status\"}")));
        _target.Throws = false;
        Assert.Equal(0, Code(await AskAsync(raw, "{\"jsonrpc\":\"2.0\",\"id\":2,\"method\":\"status\"}")));
    }

    [Fact]
    public async Task Loop_ThatHasEnded_GivesAnErrorAndTheServerEndsQuietly()
    {
        _loop.Ended = true;
        Serve();
        using var raw = await RawAsync();
        Assert.Equal(-32603, Code(await AskAsync(raw, "{\"jsonrpc\":\"2.0\",\"id\":1,\"method\":\"status\"}")));
        await _server!.DisposeAsync();
        _server = null;
    }

    [Fact]
    public async Task SeventeenthClient_IsToldAndTheFreedPlaceIsGivenAgain()
    {
        Serve();
        var sockets = new List<Socket>();
        for (var i = 0; i < 16; i++)
        {
            sockets.Add(await RawAsync());
            await AskAsync(sockets[i], "{}"); // served, not only queued
        }

        var (client, problem) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        Assert.Null(client);
        Assert.Contains("places for consoles are taken", problem, StringComparison.Ordinal);
        sockets.ForEach(socket => socket.Dispose());
        for (var wait = 0; client is null && wait < 100; wait++)
        {
            await Task.Delay(TimeSpan.FromMilliseconds(50), TimeProvider.System);
            (client, _) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        }

        Assert.NotNull(client);
        await client.DisposeAsync();
    }

    [Fact]
    public async Task Path_ThatIsTooLong_IsRefusedByBothEnds()
    {
        var path = Path.Combine(Path.GetTempPath(), new string('a', 150));
        Assert.Contains("too long", (await ControlClient.ConnectAsync(path, CancellationToken.None)).Problem, StringComparison.Ordinal);
        Assert.Contains("XDG_RUNTIME_DIR", Assert.Throws<IOException>(() => ControlServer.Start(path, _target, _loop)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task OrdinaryFile_AtTheSocketsPath_IsLeftAlone()
    {
        await File.WriteAllTextAsync(_path, "precious");
        Assert.Throws<IOException>(() => ControlServer.Start(_path, _target, _loop));
        Assert.Equal("precious", await File.ReadAllTextAsync(_path));
        File.Delete(_path);
    }

    [Fact]
    public async Task Line_ThatIsTooLong_IsToldSo()
    {
        Serve();
        using var raw = await RawAsync();
        Assert.Equal(-32600, Code(await AskAsync(raw, new string('x', (64 * 1024) + 1))));
    }

    [Fact]
    public async Task Line_ThatIsTooLong_ClosesTheConnectionAndNothingElse()
    {
        Serve();
        using var raw = await RawAsync();
        try
        {
            await raw.SendAsync(Encoding.ASCII.GetBytes(new string('x', 200_000)));
            while (await raw.ReceiveAsync(new byte[1000]) > 0)
            {
                // The error's line; then the end.
            }
        }
        catch (SocketException)
        {
            // Closed while we were still writing: closed all the same.
        }

        var (client, problem) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        Assert.Null(problem);
        await client!.DisposeAsync();
    }

    [Fact]
    public async Task ManyClients_AtOnce_AreAllAnswered()
    {
        Serve();
        var clients = await Task.WhenAll(Enumerable.Range(0, 10).Select(_ => ControlClient.ConnectAsync(_path, CancellationToken.None)));
        foreach (var (client, problem) in clients)
        {
            Assert.Null(problem);
            Assert.NotNull(await client!.StatusAsync(CancellationToken.None));
            await client.DisposeAsync();
        }
    }

    [Fact]
    public async Task Nobody_Listening_IsSaid()
    {
        var (client, problem) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        Assert.Null(client);
        Assert.Contains("not running", problem, StringComparison.Ordinal);
    }

    [Fact]
    public async Task ServerGone_ClientGetsAnOutcomeAndNoException()
    {
        Serve();
        var (client, _) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        await _server!.DisposeAsync();
        _server = null;
        Assert.Null(await client!.StatusAsync(CancellationToken.None));
        Assert.False((await client.SendAsync("stop", "A. Tester", null, CancellationToken.None)).Done);
        Assert.False(File.Exists(_path));
    }

    [Fact]
    public async Task StaleSocketFile_IsReplaced_AndALiveOneIsNot()
    {
        await File.WriteAllTextAsync(_path, ""); // what a killed engine leaves: a name that nobody listens on
        Serve();
        var (client, problem) = await ControlClient.ConnectAsync(_path, CancellationToken.None);
        Assert.Null(problem);
        await client!.DisposeAsync();
        Assert.Throws<IOException>(() => ControlServer.Start(_path, _target, _loop));
    }

    [Fact]
    public void SocketFile_IsForThisAccountOnly()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "Unix permissions.");
        Serve();
#pragma warning disable CA1416 // guarded by the skip above
        Assert.Equal(UnixFileMode.UserRead | UnixFileMode.UserWrite, File.GetUnixFileMode(_path));
#pragma warning restore CA1416
    }

    private async Task<Socket> RawAsync()
    {
        var socket = new Socket(AddressFamily.Unix, SocketType.Stream, ProtocolType.Unspecified);
        await socket.ConnectAsync(new UnixDomainSocketEndPoint(_path));
        return socket;
    }

    private static async Task<string> AskAsync(Socket raw, string line)
    {
        await raw.SendAsync(Encoding.UTF8.GetBytes(line + "\n"));
        var buffer = new byte[65536];
        var length = 0;
        do
        {
            var read = await raw.ReceiveAsync(buffer.AsMemory(length));
            Assert.True(read > 0, "the connection was closed");
            length += read;
        }
        while (buffer[length - 1] != '\n');
        return Encoding.UTF8.GetString(buffer, 0, length);
    }

    private static int Code(string answer)
    {
        using var json = JsonDocument.Parse(answer);
        return json.RootElement.TryGetProperty("error", out var error) ? error.GetProperty("code").GetInt32() : 0;
    }

    private sealed class FakeTarget : IControlTarget
    {
        public bool Throws { get; set; }

        public EngineStatusMessage Status() => Throws ? throw new InvalidOperationException("broken") : new("r1", "a.run", "running", "soak", 1, 2, 3, 40, 300.5, double.NaN, 310, 1234.5, 99, "drift");

        public ControlOutcome MakeSafe(string operatorName, string? reason) => new(true, $"safe {operatorName} {reason}");

        public ControlOutcome Stop(string operatorName, string? reason) => new(true, $"stop {operatorName} {reason}");

        public ControlOutcome Hold(string operatorName, string? reason) => new(true, $"hold {operatorName} {reason}");

        public ControlOutcome Continue(string operatorName, string? reason) => new(true, $"continue {operatorName} {reason}");
    }

    private sealed class InlineLoop : SynchronizationContext
    {
        public int Posts { get; private set; }

        public bool Ended { get; set; }

        public override void Post(SendOrPostCallback d, object? state)
        {
            if (Ended)
            {
                throw new InvalidOperationException("the loop has ended");
            }

            lock (this)
            {
                Posts++;
                d(state);
            }
        }
    }
}
