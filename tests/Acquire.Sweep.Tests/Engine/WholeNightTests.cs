using Acquire.Bench.Readings;
using Acquire.Drivers.Files;
using Acquire.Drivers.Instruments;
using Acquire.Interlocks;
using Acquire.Runs.Records;
using Acquire.Simulator;
using Acquire.Simulator.Time;
using Acquire.Sweep.Engine;
using Acquire.Sweep.Planning;
using Acquire.Wire;
using Microsoft.Extensions.Logging.Abstractions;
using Xunit;

namespace Acquire.Sweep.Tests.Engine;

/// <summary>The shipped quick protocol with the shipped text drivers on the simulated bench, under virtual time.</summary>
public sealed class WholeNightTests
{
    [Fact]
    public void QuickProtocol_OnTheSimulatedBench_CompletesWithGoodPointsAndNeverLeavesTheLoop()
    {
        var (outcome, record, outside) = Rehearse(3);
        Assert.Equal("completed", outcome.State);
        Assert.Equal(0, outside);
        Assert.True(record.Points.Count >= 56, $"{record.Points.Count} points");
        Assert.All(record.Points.Where(point => point.Light == LightState.Dark), point => Assert.True(point.Quality == Quality.Good, $"{point.Index}: {point.Reason}"));
        Assert.All(record.Points.Where(point => point.Light == LightState.Lit), point => Assert.True(point.SinceLightS < 120 && point.MonitorA > 0));
    }

    [Fact]
    public void SameSeed_GivesTheSameReadings_AnotherSeedOthers()
    {
        var first = Rehearse(5).Record.Readings;
        Assert.Equal(first, Rehearse(5).Record.Readings);
        Assert.NotEqual(first, Rehearse(6).Record.Readings);
    }

    private static (RunOutcome Outcome, MemoryRecorder Record, long Outside) Rehearse(ulong seed)
    {
        var bench = Shipped.Bench("germanium-quick");
        var time = new VirtualTime(new DateTimeOffset(2026, 1, 1, 18, 0, 0, TimeSpan.Zero));
        var simulated = SimulatedBench.Open(bench, seed, time.Clock).Value!;
        var addresses = bench.Instruments.ToDictionary(instrument => instrument.Name, instrument => $"SIM::{instrument.Name}::INSTR");
        var instruments = InstrumentFactory.Open(bench, new LinkFactory(simulated.PortFor, time.Clock), DriverCatalogue.Shipped, addresses).Value!;
        var record = new MemoryRecorder();
        RunOutcome? outcome = null;
        time.Run(async () =>
        {
            foreach (var instrument in instruments.All)
            {
                Assert.True((await instrument.IdentifyAsync(CancellationToken.None)).Answered);
            }

            using var engine = new SweepEngine(new EngineSetup
            {
                Instruments = instruments,
                Bench = bench,
                Plan = Planner.Plan(Shipped.Protocol("germanium-quick"), bench),
                Interlocks = InterlockTable.For(bench),
                Recorder = record,
                Loop = time,
                OriginTimestamp = time.Clock.GetTimestamp(),
                LinkClock = time.Clock,
                Log = NullLogger.Instance,
            });
            outcome = await engine.RunAsync(CancellationToken.None);
        });
        return (outcome!, record, time.TurnsFromOutside);
    }
}
