using Acquire.App.Planning;
using Acquire.Bench.Roles;
using Acquire.Bench.Time;
using Acquire.Drivers.Instruments;
using Acquire.Interlocks;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;
using Acquire.Sweep.Engine;
using Acquire.Wire;
using Microsoft.Extensions.Logging;

namespace Acquire.App.Running;

/// <summary>What a session needs beside the prepared run.</summary>
internal sealed record SessionSetup
{
    /// <summary>The loop, real or virtual.</summary>
    public required EngineLoop Loop { get; init; }

    /// <summary>Makes links.</summary>
    public required ILinkFactory Links { get; init; }

    /// <summary>Clock of link time-outs and make-safe bounds.</summary>
    public required TimeProvider LinkClock { get; init; }

    /// <summary>Where each instrument really answers; null: as the bench file says.</summary>
    public IReadOnlyDictionary<string, string>? Addresses { get; init; }

    /// <summary>The run file to make.</summary>
    public required string OutPath { get; init; }

    /// <summary>The header, without instruments.</summary>
    public required RunHeader Header { get; init; }

    /// <summary>True: flushed commits behind a writer thread. False: inline, for virtual time.</summary>
    public required bool Durable { get; init; }

    /// <summary>Diagnostics.</summary>
    public required ILogger Log { get; init; }

    /// <summary>Called on the loop when the engine is there, before it runs.</summary>
    public Func<SweepEngine, RunHeader, IAsyncDisposable?>? Started { get; init; }
}

/// <summary>The composition root of a run: instruments, recorder, interlocks, engine, on one loop. Rehearsal and reality differ in what is passed in.</summary>
internal static class BenchSession
{
    /// <summary>Runs on the calling thread until the run has ended.</summary>
    public static RunOutcome Run(PreparedRun prepared, SessionSetup setup, CancellationToken cancellation)
    {
        RunOutcome? outcome = null;
        setup.Loop.Run(async () => outcome = await RunOnLoopAsync(prepared, setup, cancellation));
        return outcome!; // set by the line above, or the loop has thrown
    }

    private static async Task<RunOutcome> RunOnLoopAsync(PreparedRun prepared, SessionSetup setup, CancellationToken cancellation)
    {
        var opened = InstrumentFactory.Open(prepared.Bench, setup.Links, prepared.Drivers, setup.Addresses);
        if (opened.Value is not { } instruments)
        {
            return new("failed", string.Join(' ', opened.Diagnostics));
        }

        try
        {
            return await RunInstrumentsAsync(prepared, setup, instruments, cancellation);
        }
        finally
        {
            foreach (var instrument in instruments.All)
            {
                await instrument.DisposeAsync();
            }
        }
    }

    private static async Task<RunOutcome> RunInstrumentsAsync(PreparedRun prepared, SessionSetup setup, BenchInstruments instruments, CancellationToken cancellation)
    {
        var identified = new List<RunInstrument>();
        foreach (var instrument in instruments.All)
        {
            var answer = await instrument.IdentifyAsync(cancellation);
            if (!answer.Answered)
            {
                return new("failed", $"{instrument.Name} at {instrument.Address}: {answer.Problem}");
            }

            var entry = prepared.Bench.Instruments.First(candidate => candidate.Name == instrument.Name);
            // A rehearsal's record must not depend on the machine, so the address is the one of the bench file there.
            identified.Add(new(instrument.Name, entry.Driver, setup.Durable ? instrument.Address : entry.Address, answer.Text ?? ""));
        }

        var header = setup.Header with { Instruments = identified };
        var origin = setup.Loop.Clock.GetTimestamp();
        await using var recorder = RunWriter.Create(setup.OutPath, header, EngineChannels.Of(prepared.Bench), new WriterOptions(setup.Durable, setup.Loop.Clock, origin));
        using var engine = new SweepEngine(new EngineSetup
        {
            Instruments = instruments,
            Bench = prepared.Bench,
            Plan = prepared.Plan,
            Interlocks = InterlockTable.For(prepared.Bench, setup.Durable ? prepared.Bench.Pace : 1),
            Recorder = recorder,
            Loop = setup.Loop,
            OriginTimestamp = origin,
            LinkClock = setup.LinkClock,
            Log = setup.Log,
        });
        await using var follower = setup.Started?.Invoke(engine, header);
        return await engine.RunAsync(cancellation);
    }
}
