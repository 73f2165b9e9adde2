using System.CommandLine;
using Acquire.App.Checking;
using Acquire.App.CommandLine;
using Acquire.App.Processes;
using Acquire.Bench.Files;
using Acquire.Bench.Text;
using Acquire.Simulator.Serving;
using Acquire.Simulator.Time;

namespace Acquire.App.Running;

/// <summary><c>acquire simulate</c>: serves a simulated bench on sockets and pseudo-terminals until stopped.</summary>
internal static class SimulateCommand
{
    public static Command Build(Terminal terminal)
    {
        var bench = Arguments.File("BENCH", "The bench file; it names its twin.");
        var seed = Arguments.Seed();
        var json = new Option<bool>("--json") { Description = "Announce the addresses as one line of JSON." };
        var lifetime = new Option<double?>("--lifetime") { Description = "Stop by itself after so many minutes.", HelpName = "MINUTES" };
        var detached = new Option<bool>("--detached") { Description = "Leave the terminal's session.", Hidden = true };
        var command = Arguments.Command("simulate", "Serves a simulated bench on sockets and pseudo-terminals until stopped.", "simulate simulator/germanium-quick.bench.yaml");
        foreach (var option in new Option[] { seed, json, lifetime, detached })
        {
            command.Add(option);
        }

        command.Add(bench);
        command.SetAction(async (parsed, _) =>
        {
            using var session = parsed.GetValue(detached) ? DetachedProcess.LeaveSession() : null;
            return await RunAsync(terminal, parsed.GetRequiredValue(bench), parsed.GetValue(seed), (parsed.GetValue(json), parsed.GetValue(lifetime)));
        });
        return command;
    }

    /// <summary>Names the simulator of a bench by its texts and seed.</summary>
    public static string KeyOf(BenchFile bench, ulong seed)
    {
        var twin = bench.TwinFile is null ? null : SourceText.Read(Path.Combine(Path.GetDirectoryName(Path.GetFullPath(bench.Source.File)) ?? ".", bench.TwinFile)).Value;
        return SimulatorNote.KeyOf(bench.Source.File, bench.Source.Text, twin?.Text ?? "", seed.ToString(System.Globalization.CultureInfo.InvariantCulture));
    }

    private static async Task<int> RunAsync(Terminal terminal, string path, ulong seed, (bool Json, double? LifetimeMin) how)
    {
        var parsed = BenchFile.Read(path);
        if (parsed.Value is not { } bench)
        {
            CheckCommand.Print(terminal, parsed.Diagnostics);
            return ExitCode.NotTaken;
        }

        var key = KeyOf(bench, seed);
        using var held = SimulatorNote.TryLock(key);
        if (held is null)
        {
            await terminal.Error.WriteLineAsync($"{path}: this bench is being simulated already ({SimulatorNote.FindLive(key)?.ToJson() ?? "it is just starting"}). Stop that one first, or give another --seed.");
            return ExitCode.NotTaken;
        }

        var started = await SimulatedBenchHost.StartAsync(bench, seed, new ScaledTime(TimeProvider.System, bench.Pace));
        if (started.Value is not { } host)
        {
            CheckCommand.Print(terminal, started.Diagnostics);
            return ExitCode.NotTaken;
        }

        await using (host)
        {
            var note = new SimulatorNote(Environment.ProcessId, Path.GetFullPath(path), bench.Pace, host.Addresses);
            note.Save(key);
            await AnnounceAsync(terminal, bench, note, how.Json);
            using var signals = new SafeEndSignals();
            var wait = how.LifetimeMin is { } minutes ? TimeSpan.FromMinutes(minutes) : Timeout.InfiniteTimeSpan;
            await Task.Delay(wait, TimeProvider.System, signals.Token).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            SimulatorNote.Remove(key);
        }

        return ExitCode.Done;
    }

    private static async Task AnnounceAsync(Terminal terminal, BenchFile bench, SimulatorNote note, bool json)
    {
        if (json)
        {
            await terminal.Out.WriteLineAsync(note.ToJson());
        }
        else
        {
            await terminal.Out.WriteLineAsync(FormattableString.Invariant($"Simulating '{bench.Title}', {note.Pace:G3} times faster than life, until Ctrl+C:"));
            foreach (var (name, address) in note.Addresses)
            {
                await terminal.Out.WriteLineAsync($"  {name}: {address}");
            }
        }

        await terminal.Out.FlushAsync();
    }
}
