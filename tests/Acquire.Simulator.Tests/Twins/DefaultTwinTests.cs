using Acquire.Simulator.Time;
using Acquire.Simulator.Twins;

namespace Acquire.Simulator.Tests.Twins;

public sealed class DefaultTwinTests
{
    [Theory]
    [InlineData("germanium-quick")]
    [InlineData("germanium-cryostat")]
    [InlineData("silicon-furnace")]
    public void Holder_FromRatingsAlone_ReachesBothEndsOfItsRange(string name)
    {
        var bench = ShippedBenches.Bench(name) with { TwinFile = null };
        var twin = DefaultTwin.For(bench);
        Assert.Contains("made up", twin.Title, StringComparison.Ordinal);
        foreach (var targetK in new[] { bench.Limits.TemperatureToK, bench.Limits.TemperatureFromK })
        {
            var time = new VirtualTime(new DateTimeOffset(2026, 10, 1, 20, 0, 0, TimeSpan.Zero));
            var talk = new DeviceTalk(new SimulatedBench(bench, twin, 1, time.Clock), time);
            talk.Tell("controller", FormattableString.Invariant($"SOUR:TEMP:SPO {targetK};:OUTP ON"));
            talk.Wait(5 * 3600);
            Assert.InRange(talk.Bench.Truth().StageK - targetK, -0.05, 0.05);
        }
    }

    [Fact]
    public void Bench_WithoutTwinFile_IsSimulatedByADefaultTwinAndSaysSo()
    {
        var time = new VirtualTime(new DateTimeOffset(2026, 10, 1, 20, 0, 0, TimeSpan.Zero));
        var bench = SimulatedBench.Open(ShippedBenches.Bench("germanium-quick") with { TwinFile = null }, 1, time.Clock);
        Assert.True(bench.Value!.IsTwinMadeUp);
        var own = SimulatedBench.Open(ShippedBenches.Bench("germanium-quick"), 1, time.Clock);
        Assert.False(own.Value!.IsTwinMadeUp);
    }
}
