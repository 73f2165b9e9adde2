using Acquire.Bench.Readings;
using Acquire.Bench.Roles;
using Acquire.Drivers.Files;
using Acquire.Drivers.Instruments;
using Acquire.Simulator.Tests.Twins;
using Acquire.Simulator.Time;
using Acquire.Wire;

namespace Acquire.Simulator.Tests;

/// <summary>The shipped drivers against the simulated devices, in process and under virtual time.</summary>
public sealed class DriversOnTheTwinTests
{
    [Theory]
    [InlineData("germanium-quick")]
    [InlineData("germanium-cryostat")]
    [InlineData("silicon-furnace")]
    public void Instruments_OfEveryShippedBench_IdentifyThemselvesAndMakeSafe(string name) => Run(name, async (instruments, _) =>
    {
        foreach (var instrument in instruments.All)
        {
            var identity = await instrument.IdentifyAsync(CancellationToken.None);
            Assert.True(identity.Answered, identity.Problem);
            var safe = await instrument.MakeSafeAsync(CancellationToken.None);
            Assert.True(safe.Done, safe.Problem);
        }
    });

    [Fact]
    public void Bench_DrivenThroughTheRoles_HeatsMeasuresAndLights() => Run("germanium-quick", async (instruments, time) =>
    {
        var none = CancellationToken.None;
        foreach (var instrument in instruments.All) await instrument.IdentifyAsync(none);
        Done(await instruments.Loop.SetPointAsync(320, 30.0 / 60, none));
        Done(await instruments.Loop.HeaterAsync(true, none));
        Done(await instruments.Meter.ConfigureAsync(5e-3, 1, none));
        Done(await instruments.Meter.SetRangeAsync(1e-3, none));
        Done(await instruments.Meter.SetBiasAsync(0.2, none));
        Done(await instruments.Meter.OutputAsync(true, none));
        await Task.Delay(TimeSpan.FromMinutes(5), time.Clock);
        var loop = await instruments.Loop.ReadAsync(none);
        Assert.InRange(loop.StageK.Value, 319.9, 320.1);
        Assert.Equal(320, loop.SetPointK.Value);
        Assert.InRange(loop.HeaterW.Value, 15, 21);
        var dark = await instruments.Meter.ReadAsync(none);
        Assert.True(dark.CurrentA.IsGood);
        Done(await instruments.Lamp!.SetDriveAsync(0.5, none));
        Done(await instruments.Lamp.OutputAsync(true, none));
        await Task.Delay(TimeSpan.FromSeconds(5), time.Clock);
        var lit = await instruments.Meter.ReadAsync(none);
        Assert.True(lit.CurrentA.Value > dark.CurrentA.Value * 1.01);
        Assert.Equal(0.5, (await instruments.Lamp.ReadAsync(none)).DriveA.Value);
        Done(await instruments.Meter.SetRangeAsync(1e-9, none));
        Assert.Equal(Quality.Overrange, (await instruments.Meter.ReadAsync(none)).CurrentA.Quality & Quality.Overrange);
    });

    private static void Done(CommandOutcome outcome) => Assert.True(outcome.Done, outcome.Problem);

    private static void Run(string name, Func<BenchInstruments, VirtualTime, Task> use)
    {
        var bench = ShippedBenches.Bench(name);
        var time = new VirtualTime(new DateTimeOffset(2026, 10, 1, 20, 0, 0, TimeSpan.Zero));
        var simulated = SimulatedBench.Open(bench, 1, time.Clock).Value!;
        var overrides = bench.Instruments.ToDictionary(i => i.Name, i => $"SIM::{i.Name}::INSTR");
        var opened = InstrumentFactory.Open(bench, new LinkFactory(simulated.PortFor, time.Clock), DriverCatalogue.Shipped, overrides);
        Assert.True(opened.Value is not null, string.Join('\n', opened.Diagnostics));
        time.Run(() => use(opened.Value!, time));
        Assert.Equal(0, time.TurnsFromOutside);
    }
}
