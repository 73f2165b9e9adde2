using Acquire.App.Files;
using Acquire.App.Planning;
using Acquire.App.Processes;
using Acquire.Control;
using Acquire.Runs.Records;
using Acquire.Simulator.Time;
using Acquire.Sweep.Engine;
using Acquire.Sweep.Loops;
using Acquire.Wire;
using Microsoft.Extensions.Logging;

namespace Acquire.App.Running;

/// <summary>A run in real time in this process: loop, links, control socket, signals.</summary>
internal static class LiveEngine
{
    private static readonly TimeSpan ShowEvery = TimeSpan.FromMilliseconds(250);

    /// <summary>Runs until the end; the calling thread is the engine's loop.</summary>
    public static RunOutcome Run(PreparedRun prepared, SimulatorNote note, LiveRequest request, ILogger log)
    {
        var clock = note.Pace == 1 ? TimeProvider.System : new ScaledTime(TimeProvider.System, note.Pace);
        using var loop = new RealLoop(clock);
        using var signals = new SafeEndSignals();
        return BenchSession.Run(prepared, new SessionSetup
        {
            Loop = loop,
            Links = new LinkFactory(),
            LinkClock = TimeProvider.System,
            Addresses = note.Addresses,
            OutPath = request.OutPath,
            Header = RunNaming.Header(prepared, "run", request.Operator, request.Seed, clock.GetUtcNow()),
            Durable = true,
            Log = log,
            Started = (engine, header) => Follow(engine, header, request, loop),
        }, signals.Token);
    }

    private static Follower Follow(SweepEngine engine, RunHeader header, LiveRequest request, RealLoop loop)
    {
        var target = new EngineControl(engine, header, request.OutPath);
        var server = ControlServer.Start(ControlSockets.PathFor(Folders.Runtime, header.RunId), target, loop);
        request.Ready?.Invoke(header);
        return new Follower(server, request.Show is null ? null : ShowAsync(target, request.Show, loop));
    }

    /// <summary>Shows the status a few times a second until the engine has ended.</summary>
    private static async Task ShowAsync(EngineControl target, Action<EngineStatusMessage> show, RealLoop loop)
    {
        while (true)
        {
            var status = target.Status();
            show(status);
            if (status.State.StartsWith("ended", StringComparison.Ordinal))
            {
                return;
            }

            await Task.Delay(ShowEvery, TimeProvider.System);
        }
    }

    private sealed class Follower(ControlServer server, Task? showing) : IAsyncDisposable
    {
        public async ValueTask DisposeAsync()
        {
            if (showing is not null)
            {
                await showing;
            }

            await server.DisposeAsync();
        }
    }
}

/// <summary>What a live run is asked for.</summary>
/// <param name="OutPath">The run file to make.</param>
/// <param name="Operator">Who runs it.</param>
/// <param name="Seed">Seed of the simulated bench.</param>
/// <param name="Ready">Called on the loop when the run file and the socket are there.</param>
/// <param name="Show">Called on the loop with the status, a few times a second; null: nobody looks.</param>
internal sealed record LiveRequest(string OutPath, string Operator, ulong Seed, Action<RunHeader>? Ready, Action<EngineStatusMessage>? Show);
