using Acquire.Bench.Files;
using Acquire.Bench.Readings;
using Acquire.Bench.Text;
using CsCheck;
using Xunit;

namespace Acquire.Interlocks.Tests;

public sealed class InterlockDecisionTests
{
    private static readonly BenchFile Bench = BenchFile.Parse(new SourceText("b.bench.yaml", """
        bench: a small bench (invented)
        site: { line frequency: 50 Hz }
        instruments:
          c: { driver: d, address: "TCPIP::h::1::SOCKET" }
          m: { driver: d, address: "TCPIP::h::2::SOCKET" }
        wiring:
          temperature loop: { instrument: c, stage uncertainty: 0.1 K, sample uncertainty: 0.1 K, sensor range: { from: 60 K, to: 500 K } }
          source-meter: { instrument: m }
        limits: { temperature: { from: 77 K, to: 420 K }, over-temperature: 440 K, ramp: 10 K/min, heater power: 50 W, bias: 10 V, current: 10 mA }
        """)).Value!;

    private static readonly InterlockTable Table = InterlockTable.For(Bench);

    [Fact]
    public void Healthy_Bench_NeverTrips()
    {
        var state = InterlockState.Start(Table);
        for (var tick = 0; tick < 100; tick++)
        {
            var before = state;
            (state, var trips) = InterlockDecision.Decide(Table, state, Snapshot(tick * 0.5, 300, 300), tick * 0.5);
            Assert.Empty(trips);
            Assert.Same(before, state); // a quiet tick changes nothing
        }
    }

    [Theory]
    [InlineData(440.01, "over-temperature-stage")]
    [InlineData(505, "invalid-stage-sensor")]
    [InlineData(59, "invalid-stage-sensor")]
    public void Stage_OutOfBounds_TripsAtTheSecondSampleAndNamesTheCause(double stageK, string row)
    {
        var state = InterlockState.Start(Table);
        (state, var first) = InterlockDecision.Decide(Table, state, Snapshot(0, stageK, 300), 0);
        Assert.Empty(first);
        (state, _) = InterlockDecision.Decide(Table, state, Snapshot(0.5, stageK, 300), 0.5);
        Assert.True(state.IsTripped);
        Assert.Equal(row, state.FirstOut!.RowId);
    }

    [Fact]
    public void Spike_OfOneSampleInThree_DoesNotTrip()
    {
        var state = InterlockState.Start(Table);
        for (var tick = 0; tick < 20; tick++)
        {
            (state, _) = InterlockDecision.Decide(Table, state, Snapshot(tick * 0.5, tick % 3 == 0 ? 460 : 300, 300), tick * 0.5);
        }

        Assert.False(state.IsTripped);
    }

    [Fact]
    public void OverTemperature_InTwoOfThreeSamples_Trips()
    {
        var state = InterlockState.Start(Table);
        foreach (var (stageK, tick) in new[] { 460.0, 300, 460 }.Select((value, index) => (value, index)))
        {
            (state, _) = InterlockDecision.Decide(Table, state, Snapshot(tick * 0.5, stageK, 300), tick * 0.5);
        }

        Assert.Equal("over-temperature-stage", state.FirstOut!.RowId);
    }

    [Fact]
    public void Judging_WithoutANewSample_ConfirmsNothing()
    {
        var state = InterlockState.Start(Table);
        for (var command = 0; command < 10; command++)
        {
            (state, _) = InterlockDecision.Decide(Table, state, Snapshot(0, 460, 300), 0, newSample: false);
        }

        Assert.False(state.IsTripped);
    }

    [Theory]
    [InlineData(Quality.Implausible)]
    [InlineData(Quality.Overrange)]
    [InlineData(Quality.Unreadable)]
    public void Sensor_WithoutANumber_TripsAtTheSecondSample(Quality quality)
    {
        var bad = new SensorState(Measured.Bad(quality, "9.91E37"), 300, 0);
        var state = InterlockState.Start(Table);
        var snapshot = Snapshot(0.5, 300, 300) with { Sample = bad };
        (state, _) = InterlockDecision.Decide(Table, state, snapshot, 0.5);
        (state, var trips) = InterlockDecision.Decide(Table, state, snapshot, 1);
        Assert.Equal("invalid-sample-sensor", Assert.Single(trips).RowId);
        Assert.Contains("9.91E37", state.FirstOut!.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Sensor_ThatGrowsOld_TripsAfterFiveSeconds()
    {
        var state = InterlockState.Start(Table);
        (state, var early) = InterlockDecision.Decide(Table, state, Snapshot(0, 300, 300), 5);
        Assert.Empty(early);
        (_, var late) = InterlockDecision.Decide(Table, state, Snapshot(0, 300, 300), 5.5);
        Assert.Equal(["stale-stage-sensor", "stale-sample-sensor"], late.Select(trip => trip.RowId));
    }

    [Fact]
    public void Meter_ThatIsSilent_TripsAfterTenSeconds()
    {
        var snapshot = Snapshot(10.5, 300, 300) with { MeterAnsweredS = 0 };
        var (_, trips) = InterlockDecision.Decide(Table, InterlockState.Start(Table), snapshot, 10.5);
        Assert.Equal("silent-meter", Assert.Single(trips).RowId);
    }

    [Fact]
    public void Record_ThatIsLost_TripsAtOnceWithItsReason()
    {
        var (state, _) = InterlockDecision.Decide(Table, InterlockState.Start(Table), Snapshot(0, 300, 300) with { RecordFailure = "the disk is full" }, 0);
        Assert.Contains("the disk is full", state.FirstOut!.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void UnansweredPoll_LeavesTheLastValueAgeing()
    {
        var sensor = SensorState.NotYet(0).After(Measured.Good(300), 1).After(Measured.Bad(Quality.TimedOut), 2);
        Assert.Equal((300, 1), (sensor.LastGood, sensor.LastGoodS));
    }

    [Fact]
    public void Trip_OnceThere_StaysWhateverComes() =>
        Gen.Double[50, 600].Array[1, 60].Sample(temperatures =>
        {
            var state = InterlockState.Start(Table);
            for (var tick = 0; tick < temperatures.Length; tick++)
            {
                var before = state;
                (state, _) = InterlockDecision.Decide(Table, state, Snapshot(tick * 0.5, temperatures[tick], 300), tick * 0.5);
                Assert.True(!before.IsTripped || state.IsTripped);
                Assert.Equal(before.FirstOut ?? state.FirstOut, state.FirstOut);
            }
        });

    [Fact]
    public void NaN_FailsEveryLimit()
    {
        var snapshot = Snapshot(0, double.NaN, double.NaN) with { ControllerAnsweredS = double.NaN, MeterAnsweredS = double.NaN };
        var state = InterlockState.Start(Table);
        (state, _) = InterlockDecision.Decide(Table, state, snapshot, 0);
        (state, _) = InterlockDecision.Decide(Table, state, snapshot, 0.5);
        Assert.Equal(["silent-controller", "silent-meter", "invalid-stage-sensor", "over-temperature-stage", "invalid-sample-sensor", "over-temperature-sample"],
            state.Trips.Select(trip => trip.RowId));
    }

    [Fact]
    public void Hash_OfTheTable_ChangesWithAThreshold()
    {
        var other = InterlockTable.For(Bench with { Limits = Bench.Limits with { OverTemperatureK = 441 } });
        Assert.NotEqual(Table.Sha256(), other.Sha256());
        Assert.Equal(Table.Sha256(), InterlockTable.For(Bench).Sha256());
    }

    private static InterlockSnapshot Snapshot(double atS, double stageK, double sampleK) =>
        new(new(double.IsNaN(stageK) ? Measured.Bad(Quality.Implausible) : Measured.Good(stageK), stageK, atS),
            new(double.IsNaN(sampleK) ? Measured.Bad(Quality.Implausible) : Measured.Good(sampleK), sampleK, atS), atS, atS, atS, null);
}
