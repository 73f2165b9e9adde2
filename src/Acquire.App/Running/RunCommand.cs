using System.CommandLine;
using System.Globalization;
using System.Text.Json;
using Acquire.App.Checking;
using Acquire.App.CommandLine;
using Acquire.App.Files;
using Acquire.App.Planning;
using Acquire.App.Processes;
using Acquire.Control;
using Acquire.Runs;
using Acquire.Runs.Files;
using Acquire.Sweep.Engine;

namespace Acquire.App.Running;

/// <summary><c>acquire run</c>: the run itself, with its engine in the background or, with --foreground, in this process.</summary>
internal static class RunCommand
{
    private static readonly TimeSpan StartBound = TimeSpan.FromSeconds(60);
    private static readonly TimeSpan LookEvery = TimeSpan.FromMilliseconds(250);

    public static Command Build(Terminal terminal)
    {
        var command = Arguments.Command("run", "Runs a protocol on a bench. Ctrl+C or SIGTERM ends it safely; a lost terminal does not touch it.",
            "run protocols/germanium-quick.protocol.yaml --bench simulator/germanium-quick.bench.yaml");
        var foreground = new Option<bool>("--foreground") { Description = "The engine in this process, for scripts and service managers." };
        var read = Options(command);
        command.Add(foreground);
        command.SetAction(async (parsed, cancellation) =>
        {
            var (prepared, request, problem) = Prepare(terminal, read(parsed));
            return prepared is null ? problem
                : parsed.GetValue(foreground) ? await ForegroundAsync(terminal, prepared, request!, cancellation)
                : await BackgroundAsync(terminal, prepared, request!, cancellation);
        });
        return command;
    }

    /// <summary>The hidden command that the background engine is started with.</summary>
    public static Command BuildEngine(Terminal terminal)
    {
        var command = Arguments.Command("engine", "The engine of a background run.", "engine ...");
        command.Hidden = true;
        var read = Options(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            using var session = DetachedProcess.LeaveSession();
            var (prepared, request, problem) = Prepare(terminal, read(parsed));
            return prepared is null ? problem : await EngineAsync(terminal, prepared, request!, cancellation);
        });
        return command;
    }

    private static Func<ParseResult, RunArguments> Options(Command command)
    {
        var protocol = Arguments.File("PROTOCOL", "The protocol file.");
        var bench = Arguments.Bench(required: true);
        var output = Arguments.Out("The run file to make; otherwise one in runs/.");
        var operatorName = Arguments.Operator();
        var seed = Arguments.Seed();
        command.Add(protocol);
        command.Add(bench);
        command.Add(output);
        command.Add(operatorName);
        command.Add(seed);
        return parsed => new(parsed.GetRequiredValue(protocol), parsed.GetRequiredValue(bench), parsed.GetValue(output), parsed.GetValue(operatorName) ?? Environment.UserName, parsed.GetValue(seed));
    }

    private static (PreparedRun? Prepared, LiveRequest? Request, int Problem) Prepare(Terminal terminal, RunArguments arguments)
    {
        var prepared = PreparedRun.Read(arguments.Protocol, arguments.Bench);
        if (prepared.Value is not { } run)
        {
            CheckCommand.Print(terminal, prepared.Diagnostics);
            return (null, null, ExitCode.NotTaken);
        }

        if (!run.Bench.Simulated)
        {
            terminal.Error.WriteLine(
                $"{arguments.Bench}: run refused. This version energises only a bench that its own simulator serves ('simulated: true' and a twin), because the guard and the full interlocks are not finished. "
                + $"Rehearse it instead: acquire rehearse {arguments.Protocol} --bench {arguments.Bench}");
            return (null, null, ExitCode.NotTaken);
        }

        var path = arguments.Out ?? RunNaming.FreePath(run, "run", TimeProvider.System.GetUtcNow());
        if (File.Exists(path))
        {
            terminal.Error.WriteLine($"{path}: a file of this name exists already and is never overwritten; choose another name with --out.");
            return (null, null, ExitCode.NotTaken);
        }

        return (run, new LiveRequest(path, arguments.Operator, arguments.Seed, null, null), ExitCode.Done);
    }

    private static async Task<int> ForegroundAsync(Terminal terminal, PreparedRun prepared, LiveRequest request, CancellationToken cancellation)
    {
        var (note, problem) = await ServedBench.EnsureAsync(prepared, request.Seed, cancellation);
        if (note is null)
        {
            await terminal.Error.WriteLineAsync(problem);
            return ExitCode.Failed;
        }

        await SayStartAsync(terminal, prepared, note, request.OutPath);
        using var logs = DiagnosticLog.Open();
        var line = new ProgressLine(terminal);
        try
        {
            var outcome = LiveEngine.Run(prepared, note, request with { Show = line.Show }, logs.Logger);
            line.End();
            return RunEnding.Tell(terminal, request.OutPath, outcome, withReport: true);
        }
        catch (RunFileException refused)
        {
            await terminal.Error.WriteLineAsync(refused.Message);
            return ExitCode.NotTaken;
        }
    }

    /// <summary>The engine's own process: says one line when it is ready, then never touches the console again.</summary>
    private static async Task<int> EngineAsync(Terminal terminal, PreparedRun prepared, LiveRequest request, CancellationToken cancellation)
    {
        var (note, problem) = await ServedBench.EnsureAsync(prepared, request.Seed, cancellation);
        using var logs = DiagnosticLog.Open();
        try
        {
            if (note is null)
            {
                throw new IOException(problem);
            }

            var said = false;
            void Say(string line)
            {
                if (!said)
                {
                    said = true;
                    terminal.Out.WriteLine(line);
                    terminal.Out.Flush();
                }
            }

            var outcome = LiveEngine.Run(prepared, note, request with { Ready = header => Say(JsonSerializer.Serialize(new { ready = header.RunId })) }, logs.Logger);
            Say(JsonSerializer.Serialize(new { problem = outcome.Reason }));
            return outcome.State == "completed" ? ExitCode.Done : outcome.State == "failed" ? ExitCode.Failed : ExitCode.EndedEarly;
        }
        catch (IOException failure)
        {
            await terminal.Out.WriteLineAsync(JsonSerializer.Serialize(new { problem = failure.Message }));
            return ExitCode.Failed;
        }
    }

    private static async Task<int> BackgroundAsync(Terminal terminal, PreparedRun prepared, LiveRequest request, CancellationToken cancellation)
    {
        var (_, line) = await DetachedProcess.StartAsync(
            ["engine", prepared.Protocol.Source.File, "--bench", prepared.Bench.Source.File, "--out", request.OutPath, "--operator", request.Operator, "--seed", request.Seed.ToString(CultureInfo.InvariantCulture)],
            StartBound, cancellation);
        var (runId, problem) = ReadLine(line);
        if (runId is null)
        {
            await terminal.Error.WriteLineAsync($"The engine did not start: {problem}");
            return ExitCode.Failed;
        }

        if (SimulatorNote.FindLive(SimulateCommand.KeyOf(prepared.Bench, request.Seed)) is { } note)
        {
            await SayStartAsync(terminal, prepared, note, request.OutPath);
        }

        await FollowAsync(terminal, request, ControlSockets.PathFor(Folders.Runtime, runId));
        return Concluded(terminal, request.OutPath);
    }

    private static (string? RunId, string Problem) ReadLine(string? line)
    {
        if (line is null)
        {
            return (null, $"it said nothing within {StartBound.TotalSeconds:F0} s; the diagnostic log in {DiagnosticLog.Folder} may say why.");
        }

        using var json = JsonDocument.Parse(line);
        return json.RootElement.TryGetProperty("ready", out var ready) ? (ready.GetString(), "") : (null, json.RootElement.GetProperty("problem").GetString() ?? line);
    }

    /// <summary>Watches the engine over its socket until it is gone. Ctrl+C and SIGTERM ask it to end safely; a hang-up leaves it alone.</summary>
    private static async Task FollowAsync(Terminal terminal, LiveRequest request, string socket)
    {
        using var signals = new SafeEndSignals();
        var progress = new ProgressLine(terminal);
        var asked = false;
        var (client, _) = await ControlClient.ConnectAsync(socket, CancellationToken.None);
        while (client is not null)
        {
            if (signals.Token.IsCancellationRequested && !asked)
            {
                asked = true;
                await client.SendAsync("stop", request.Operator, "asked from the terminal that started it", CancellationToken.None);
            }

            if (await client.StatusAsync(CancellationToken.None) is not { } status)
            {
                break;
            }

            progress.Show(status);
            await Task.Delay(LookEvery, TimeProvider.System, asked ? CancellationToken.None : signals.Token).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        }

        progress.End();
        if (client is not null)
        {
            await client.DisposeAsync();
        }

        // The socket closes when the record is sealed; the lock goes with the process.
        for (var wait = 0; wait < 120 && Acquire.Runs.Writing.RunLock.IsHeld(request.OutPath); wait++)
        {
            await Task.Delay(LookEvery, TimeProvider.System);
        }
    }

    /// <summary>The ending as the record tells it: what the engine wrote is what counts.</summary>
    private static int Concluded(Terminal terminal, string path)
    {
        var opening = RunReader.Open(path);
        if (opening.Reader is not { } reader)
        {
            terminal.Error.WriteLine(opening.Problem);
            return ExitCode.Failed;
        }

        RunOutcome outcome;
        using (reader)
        {
            var last = reader.Events().LastOrDefault(entry => entry.Event.Kind == "state").Event?.Text ?? "";
            var state = reader.State.StartsWith("ended: ", StringComparison.Ordinal) ? reader.State["ended: ".Length..] : "failed";
            var prefix = $"The run ends: {state}. ";
            outcome = new(state, reader.State == "cut" ? "The engine was cut off; check the bench by hand." : last.StartsWith(prefix, StringComparison.Ordinal) ? last[prefix.Length..] : last);
        }

        return RunEnding.Tell(terminal, path, outcome, withReport: true);
    }

    private static async Task SayStartAsync(Terminal terminal, PreparedRun prepared, SimulatorNote note, string path)
    {
        await terminal.Out.WriteLineAsync(string.Create(CultureInfo.InvariantCulture,
            $"{prepared.Plan.Title}: {prepared.Plan.Points} points, {DurationText.Of(prepared.Plan.DurationS)} of bench time, on '{prepared.Bench.Title}', simulated by process {note.ProcessId}, {note.Pace:G3} times faster than life."));
        foreach (var (name, address) in note.Addresses)
        {
            await terminal.Out.WriteLineAsync($"  {name}: {address}");
        }

        foreach (var warning in prepared.Plan.Warnings)
        {
            await terminal.Out.WriteLineAsync("Warning: " + warning + ".");
        }

        await terminal.Out.WriteLineAsync($"Recording into {path}.");
    }

    private sealed record RunArguments(string Protocol, string Bench, string? Out, string Operator, ulong Seed);
}
