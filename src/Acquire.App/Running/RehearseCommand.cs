using System.CommandLine;
using System.Diagnostics;
using Acquire.App.Checking;
using Acquire.App.CommandLine;
using Acquire.App.Planning;
using Acquire.Runs;
using Acquire.Simulator;
using Acquire.Simulator.Time;
using Acquire.Wire;
using Microsoft.Extensions.Logging.Abstractions;

namespace Acquire.App.Running;

/// <summary><c>acquire rehearse</c>: the whole run on the simulated bench under virtual time.</summary>
internal static class RehearseCommand
{
    /// <summary>Every rehearsal begins at the same instant, so that its record depends on protocol, bench and seed alone.</summary>
    private static readonly DateTimeOffset Evening = new(2026, 1, 1, 18, 0, 0, TimeSpan.Zero);

    public static Command Build(Terminal terminal)
    {
        var protocol = Arguments.File("PROTOCOL", "The protocol file.");
        var bench = Arguments.Bench(required: true);
        var seed = Arguments.Seed();
        var output = Arguments.Out("The run file to make; otherwise one in runs/.");
        var command = Arguments.Command("rehearse", "Runs the whole night on the simulated bench under virtual time, with the very engine of the night.",
            "rehearse protocols/germanium-night.protocol.yaml --bench simulator/germanium-cryostat.bench.yaml --seed 7");
        command.Add(protocol);
        command.Add(bench);
        command.Add(seed);
        command.Add(output);
        command.SetAction(parsed => Run(terminal, parsed.GetRequiredValue(protocol), parsed.GetRequiredValue(bench), parsed.GetValue(seed), parsed.GetValue(output)));
        return command;
    }

    private static int Run(Terminal terminal, string protocolPath, string benchPath, ulong seed, string? output)
    {
        var prepared = PreparedRun.Read(protocolPath, benchPath);
        if (prepared.Value is not { } run)
        {
            CheckCommand.Print(terminal, prepared.Diagnostics);
            return ExitCode.NotTaken;
        }

        var path = output ?? RunNaming.FreePath(run, "rehearsal", TimeProvider.System.GetUtcNow());
        var time = new VirtualTime(Evening);
        var simulated = SimulatedBench.Open(run.Bench, seed, time.Clock);
        if (simulated.Value is not { } twin)
        {
            CheckCommand.Print(terminal, simulated.Diagnostics);
            return ExitCode.NotTaken;
        }

        try
        {
            var outcome = BenchSession.Run(run, new SessionSetup
            {
                Loop = time,
                Links = new LinkFactory(twin.PortFor, time.Clock),
                LinkClock = time.Clock,
                Addresses = run.Bench.Instruments.ToDictionary(instrument => instrument.Name, instrument => $"SIM::{instrument.Name}::INSTR", StringComparer.Ordinal),
                OutPath = path,
                Header = RunNaming.Header(run, "rehearsal", "rehearsal", seed, Evening),
                Durable = false,
                Log = NullLogger.Instance,
            }, CancellationToken.None);
            Debug.Assert(time.TurnsFromOutside == 0, "a continuation left the loop");
            terminal.Out.WriteLine($"Rehearsed {DurationText.Of(time.Elapsed.TotalSeconds)} of bench time (planned {DurationText.Of(run.Plan.DurationS)}); drivers exercised: {string.Join(", ", run.Texts.Where(text => text.Role == "driver").Select(text => text.Name))}.");
            return RunEnding.Tell(terminal, path, outcome, withReport: false);
        }
        catch (RunFileException problem)
        {
            terminal.Error.WriteLine(problem.Message);
            return ExitCode.NotTaken;
        }
    }
}
