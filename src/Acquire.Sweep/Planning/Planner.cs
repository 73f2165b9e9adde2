using Acquire.Bench.Files;
using Acquire.Physics;
using Acquire.Runs.Plans;
using Acquire.Runs.Records;
using Acquire.Sweep.Protocols;

namespace Acquire.Sweep.Planning;

/// <summary>Expands a protocol into the flat list of steps that the engine executes, with estimates.</summary>
public static class Planner
{
    /// <summary>Readings that the settled-signal test needs at the least: three windows of five.</summary>
    public const int SettledWindow = 5;

    /// <summary>Part of a gate's window that passes on average before it starts to hold.</summary>
    private const double SoakOverhead = 1.1;

    /// <summary>Plans; the protocol has passed <see cref="ProtocolCheck"/> for this bench.</summary>
    public static Plan Plan(ProtocolFile protocol, BenchFile bench)
    {
        var steps = new List<PlanStep>();
        var material = protocol.Sample.Material is { } symbol ? Material.Find(symbol) : null;
        var here = double.NaN;
        for (var number = 1; number <= protocol.Legs.Count; number++)
        {
            var leg = protocol.Legs[number - 1];
            var direction = Math.Sign(leg.ToK - leg.FromK);
            foreach (var temperatureK in Spacing.Temperatures(leg.FromK, leg.ToK, leg.Points, leg.Reciprocal, (leg.LeastStepK, leg.LargestStepK)))
            {
                var activationEV = material is null ? PhysicsGate.DefaultEnergyEV : material.Gap.LinearGapEV(temperatureK) / 2;
                var measureS = MeasureS(protocol.Dark, bench);
                var distance = double.IsNaN(here) ? 0 : Math.Abs(temperatureK - here);
                steps.Add(new GoToStep
                {
                    Index = steps.Count,
                    Leg = number,
                    Direction = direction,
                    EstimateS = (distance / leg.RampKPerS) + (SoakOverhead * protocol.Settling.WindowS) + Math.Min(20, distance / leg.RampKPerS / 2),
                    TemperatureK = temperatureK,
                    RampKPerS = leg.RampKPerS,
                    Gate = PhysicsGate.At(temperatureK, activationEV, measureS, protocol.Settling),
                });
                AddMeasurements(steps, protocol, bench, (number, direction, temperatureK, Expected(material, protocol.Sample, temperatureK)));
                here = temperatureK;
            }
        }

        steps.Add(new FinishStep { Index = steps.Count, Leg = 0, Direction = 0, EstimateS = 5 });
        return new(protocol.Title, steps, [.. PlanWarnings.Of(protocol, bench, steps)]);
    }

    /// <summary>Time one measurement takes [s]: settling, then readings of two integrations each (the measurement and its zero), and two discarded after each reversal.</summary>
    public static double MeasureS(ProtocolMeasurement measurement, BenchFile bench)
    {
        var readingS = 2 * measurement.IntegrationCycles / bench.LineFrequencyHz;
        return ((4 * SettledWindow) + (2 * measurement.Reversals * (measurement.Readings + 2))) * readingS;
    }

    private static void AddMeasurements(List<PlanStep> steps, ProtocolFile protocol, BenchFile bench, (int Leg, int Direction, double TemperatureK, double ExpectedS) at)
    {
        steps.Add(Measure(steps.Count, protocol.Dark, LightState.Dark, bench, at));
        if (!protocol.Legs[at.Leg - 1].Lit || protocol.Lit is not { } lit || protocol.Light is not { } light)
        {
            return;
        }

        var step = Measure(steps.Count, lit, LightState.Lit, bench, at);
        steps.Add(step with { WavelengthM = light.WavelengthM, IrradianceWPerM2 = light.IrradianceWPerM2, ExpectedConductanceS = double.NaN, EstimateS = step.EstimateS + 15 });
        step = Measure(steps.Count, protocol.Dark, LightState.DarkAfter, bench, at);
        steps.Add(step with { RecoverRelative = light.RecoverRelative, RecoverTimeOutS = light.RecoverTimeOutS, EstimateS = step.EstimateS + 5 });
    }

    private static MeasureStep Measure(int index, ProtocolMeasurement measurement, LightState light, BenchFile bench, (int Leg, int Direction, double TemperatureK, double ExpectedS) at) => new()
    {
        Index = index,
        Leg = at.Leg,
        Direction = at.Direction,
        EstimateS = MeasureS(measurement, bench),
        TemperatureK = at.TemperatureK,
        Light = light,
        BiasV = measurement.BiasV,
        Reversals = measurement.Reversals,
        Readings = measurement.Readings,
        IntegrationCycles = measurement.IntegrationCycles,
        ExpectedConductanceS = at.ExpectedS,
        SettledRelative = measurement.SettledRelative,
        SettledWindow = SettledWindow,
        SettleTimeOutS = measurement.SettleTimeOutS,
    };

    /// <summary>Expected conductance [S] from material, net doping guess and geometry; NaN when any of them is unknown.</summary>
    private static double Expected(Material? material, ProtocolSample sample, double temperatureK)
    {
        if (material is null || double.IsNaN(sample.GeometryPerM))
        {
            return double.NaN;
        }

        var (electrons, holes) = Neutrality.FullyIonised(material.IntrinsicDensityPerM3(temperatureK), sample.NetDopingPerM3);
        return material.ConductivitySPerM(temperatureK, electrons, holes) / sample.GeometryPerM;
    }
}
