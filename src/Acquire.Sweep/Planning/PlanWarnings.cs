using Acquire.Bench.Files;
using Acquire.Physics;
using Acquire.Runs.Plans;
using Acquire.Sweep.Protocols;

namespace Acquire.Sweep.Planning;

/// <summary>What an expert would say before the start. Nothing here refuses.</summary>
internal static class PlanWarnings
{
    private const int FewestIntrinsicPoints = 8;
    private const double IntrinsicOverDoping = 30;

    public static IEnumerable<string> Of(ProtocolFile protocol, BenchFile bench, IReadOnlyList<PlanStep> steps)
    {
        if (protocol.Sample.Material is { } symbol && Material.Find(symbol) is { } material && protocol.Sample.NetDopingPerM3 != 0)
        {
            var intrinsic = steps.OfType<GoToStep>()
                .Count(step => material.IntrinsicDensityPerM3(step.TemperatureK) >= IntrinsicOverDoping * Math.Abs(protocol.Sample.NetDopingPerM3));
            if (intrinsic < FewestIntrinsicPoints)
            {
                yield return FormattableString.Invariant($"only {intrinsic} points lie where n_i exceeds {IntrinsicOverDoping} times the expected net doping; an intrinsic slope wants {FewestIntrinsicPoints} or more: go hotter, or add points there");
            }
        }

        if (protocol.Legs.Select(leg => Math.Sign(leg.ToK - leg.FromK)).Distinct().Count() == 1)
        {
            yield return "all legs go the same way: hysteresis cannot be told from the curve; add a leg back";
        }

        var firstLit = protocol.Legs.ToList().FindIndex(leg => leg.Lit);
        if (firstLit >= 0 && protocol.Legs.Skip(firstLit + 1).Any(leg => !leg.Lit))
        {
            yield return "a dark leg follows a lit one: light fills traps that may not empty for hours; put the dark legs first";
        }

        foreach (var measurement in new[] { protocol.Dark, protocol.Lit }.OfType<ProtocolMeasurement>().Where(measurement => measurement.IntegrationCycles % 1 != 0))
        {
            yield return FormattableString.Invariant($"an integration of {measurement.IntegrationCycles} line cycles does not reject mains pick-up; use whole cycles ({protocol.Source.File}:{measurement.At.Line})");
        }

        if (protocol.Dark.BiasV > 60)
        {
            yield return "the bias is above 60 V dc: an interlocked enclosure and a bleed are needed in hardware";
        }

        if (bench.Protections.Count == 0)
        {
            yield return "the bench declares no protection in hardware; software is not the safety system";
        }
    }
}
