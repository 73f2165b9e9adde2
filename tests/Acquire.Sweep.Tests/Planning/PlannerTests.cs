using Acquire.Physics;
using Acquire.Runs.Plans;
using Acquire.Runs.Records;
using Acquire.Sweep.Planning;
using CsCheck;
using Xunit;

namespace Acquire.Sweep.Tests.Planning;

public sealed class PlannerTests
{
    [Fact]
    public void Temperatures_OfALeg_KeepEndsOrderFloorAndCap() =>
        Gen.Select(Gen.Double[20, 1200], Gen.Double[20, 1200], Gen.Int[2, 200], Gen.Bool, Gen.Select(Gen.Double[0.1, 5], Gen.Double[6, 100])).Sample((from, to, points, reciprocal, step) =>
        {
            if (Math.Abs(from - to) < 6)
            {
                return;
            }

            var temperatures = Spacing.Temperatures(from, to, points, reciprocal, step);
            Assert.Equal((from, to), (temperatures[0], temperatures[^1]));
            for (var i = 1; i < temperatures.Count; i++)
            {
                var gap = temperatures[i] - temperatures[i - 1];
                Assert.Equal(Math.Sign(to - from), Math.Sign(gap));
                // Leaving out a point that is too close to its neighbour can lengthen a step by less than one floor on either side.
                Assert.InRange(Math.Abs(gap), step.Item1 - 1e-6, step.Item2 + (2 * step.Item1) + 1e-6);
            }
        }, iter: 5000);

    [Fact]
    public void Temperatures_InReciprocalSpacing_HaveEqualStepsInOneOverT()
    {
        var temperatures = Spacing.Temperatures(420, 250, 30, true, (0, double.PositiveInfinity));
        var steps = temperatures.Zip(temperatures.Skip(1), (a, b) => (1 / b) - (1 / a)).ToList();
        Assert.Equal(30, temperatures.Count);
        Assert.All(steps, step => Assert.Equal(steps[0], step, 1e-12));
    }

    /// <summary>28 mK in one measuring window at 300 K with 0.56 eV is 0.2 % (worked from d ln sigma/dT = Ea/kT^2).</summary>
    [Fact]
    public void Drift_At300KWithHalfTheSiliconGap_IsThePublishedExample() =>
        Assert.Equal(0.0277, PhysicsGate.DriftKPerS(300, 0.56, 1), 2e-4);

    [Theory]
    [InlineData(77, 0.05)]
    [InlineData(300, 0.15)]
    [InlineData(1000, 0.5)]
    public void Band_AtATemperature_FollowsThePractice(double temperatureK, double bandK) => Assert.Equal(bandK, PhysicsGate.BandK(temperatureK), 1e-12);

    [Fact]
    public void QuickPlan_OnItsBench_TakesUnderAnHourDarkBeforeLight()
    {
        var plan = Planner.Plan(Shipped.Protocol("germanium-quick"), Shipped.Bench("germanium-quick"));
        Assert.InRange(plan.DurationS, 1200, 3600);
        Assert.Equal(Enumerable.Range(0, plan.Steps.Count), plan.Steps.Select(step => step.Index));
        Assert.IsType<FinishStep>(plan.Steps[^1]);
        var measured = plan.Steps.OfType<MeasureStep>().ToList();
        Assert.True(measured.FindIndex(step => step.Light != LightState.Dark) > measured.Count(step => step.Leg == 1 && step.Light == LightState.Dark) - 1);
    }

    [Fact]
    public void NightPlan_OnTheCryostat_TakesAboutTwelveHours() =>
        Assert.InRange(Planner.Plan(Shipped.Protocol("germanium-night"), Shipped.Bench("germanium-cryostat")).DurationS / 3600, 11, 15);

    [Fact]
    public void ExpectedConductance_WithoutDopingGuess_IsTheIntrinsicOne()
    {
        var protocol = Shipped.Protocol("germanium-quick");
        protocol = protocol with { Sample = protocol.Sample with { NetDopingPerM3 = 0 } };
        var step = Planner.Plan(protocol, Shipped.Bench("germanium-quick")).Steps.OfType<MeasureStep>().First();
        // A bar of 8 mm by 2 mm by 0.5 mm: G = sigma w t / L.
        Assert.Equal(Material.Ge.IntrinsicConductivitySPerM(step.TemperatureK) * 2e-3 * 0.5e-3 / 8e-3, step.ExpectedConductanceS, 1e-12);
    }

    [Fact]
    public void PlanJson_WrittenAndRead_IsTheSamePlan()
    {
        var plan = Planner.Plan(Shipped.Protocol("germanium-quick"), Shipped.Bench("germanium-quick"));
        var back = PlanJson.Read(PlanJson.Write(plan))!;
        Assert.Equal(plan.Title, back.Title);
        Assert.Equal(plan.Steps, back.Steps);
        Assert.Equal(plan.Warnings, back.Warnings);
        Assert.Null(PlanJson.Read("{ not json"));
    }

    [Fact]
    public void Warnings_OfAOneWayPlanWithPartialCycles_SayBoth()
    {
        var protocol = Shipped.Protocol("germanium-quick");
        var plan = Planner.Plan(protocol with { Legs = [protocol.Legs[0]], Dark = protocol.Dark with { IntegrationCycles = 0.5 } }, Shipped.Bench("germanium-quick"));
        Assert.Contains(plan.Warnings, warning => warning.Contains("same way", StringComparison.Ordinal));
        Assert.Contains(plan.Warnings, warning => warning.Contains("does not reject mains pick-up", StringComparison.Ordinal));
    }
}
