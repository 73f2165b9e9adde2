using Acquire.Runs.Plans;
using Acquire.Sweep.Gates;
using CsCheck;
using Xunit;

namespace Acquire.Sweep.Tests.Gates;

public sealed class GateTests
{
    private static readonly StabilityGate Gate = new(0.1, 0.001, 10, 600, TimeOutPolicy.Flag, "test");

    [Fact]
    public void Gate_OnASteadyTemperature_PassesWhenItsWindowIsFull()
    {
        var gate = new TemperatureGate(Gate, 300);
        for (var tick = 0; tick <= 20; tick++)
        {
            var result = gate.Add(new(tick * 0.5, 300.02, 299.9, false));
            Assert.Equal(tick * 0.5 >= 9.5, result.Passed);
        }
    }

    [Theory]
    [InlineData(300.2, 0, false, "from the target")]
    [InlineData(300.0, 0.01, false, "drift")]
    [InlineData(300.0, 0, true, "limit")]
    public void Gate_WithOnePartNotMet_WaitsAndSaysForWhat(double stageK, double driftKPerS, bool saturated, string words)
    {
        var gate = new TemperatureGate(Gate, 300);
        GateResult result = default;
        for (var tick = 0; tick <= 40; tick++)
        {
            result = gate.Add(new(tick * 0.5, stageK, 299.9 + (driftKPerS * tick * 0.5), saturated));
        }

        Assert.False(result.Passed);
        Assert.Contains(words, result.Waiting, StringComparison.Ordinal);
    }

    [Fact]
    public void Gate_ThatDriftsThroughTheBand_ReportsTheSlope()
    {
        var gate = new TemperatureGate(Gate, 300);
        GateResult result = default;
        for (var tick = 0; tick <= 40; tick++)
        {
            result = gate.Add(new(tick * 0.5, 300, 300 + (0.004 * tick * 0.5), false));
        }

        Assert.Equal(0.004, result.DriftKPerS, 1e-12);
    }

    [Fact]
    public void Gate_WithANaNInItsWindow_NeverPasses() =>
        Gen.Select(Gen.Int[0, 20], Gen.Bool).Sample((bad, stage) =>
        {
            var gate = new TemperatureGate(Gate, 300);
            for (var tick = 0; tick <= 20; tick++)
            {
                var result = gate.Add(new(tick * 0.5, tick == bad && stage ? double.NaN : 300, tick == bad && !stage ? double.NaN : 300, false));
                Assert.False(result.Passed && tick >= bad);
            }
        });

    [Fact]
    public void SettledSignal_OnAConstant_NeedsThreeWindows()
    {
        var test = new SettledSignal(5, 0.002);
        var count = 0;
        while (!test.Add(1e-6))
        {
            count++;
        }

        Assert.Equal(14, count);
    }

    [Fact]
    public void SettledSignal_WhileItRelaxes_Waits()
    {
        var test = new SettledSignal(5, 0.002);
        for (var i = 0; i < 60; i++)
        {
            // A relaxation of 20 readings' time constant and ten times the signal: still 5 % per window at reading 60.
            Assert.False(test.Add(1e-6 * (1 + (10 * Math.Exp(-i / 20.0)))), $"settled at reading {i}");
        }
    }

    [Fact]
    public void SettledSignal_AfterANaN_StartsAgain()
    {
        var test = new SettledSignal(5, 0.002);
        for (var i = 0; i < 30; i++)
        {
            test.Add(1);
        }

        Assert.True(test.IsSettled);
        Assert.False(test.Add(double.NaN));
        Assert.False(test.IsSettled);
    }
}
