using Acquire.Bench.Files;
using Acquire.Bench.Text;

namespace Acquire.Sweep.Protocols;

/// <summary>Holds a protocol against a bench: is everything it asks for reachable, wired and allowed?</summary>
public static class ProtocolCheck
{
    /// <summary>Everything that is refused; empty when the bench can run the protocol.</summary>
    public static IReadOnlyList<Diagnostic> Against(ProtocolFile protocol, BenchFile bench)
    {
        var report = new ShapeReport(protocol.Source.File);
        foreach (var leg in protocol.Legs)
        {
            CheckLeg(leg, bench, report);
        }

        CheckMeasurement(protocol.Dark, bench, report);
        if (protocol.Lit is { } lit && protocol.Light is { } light)
        {
            CheckMeasurement(lit, bench, report);
            CheckLight(light, bench, report);
        }

        return report.Diagnostics;
    }

    private static void CheckLeg(ProtocolLeg leg, BenchFile bench, ShapeReport report)
    {
        var limits = bench.Limits;
        var allowed = $"{Kelvin(limits.TemperatureFromK)} to {Kelvin(limits.TemperatureToK)} ({Place(bench, "temperature")})";
        foreach (var (key, valueK) in new[] { ("from", leg.FromK), ("to", leg.ToK) })
        {
            if (!(valueK >= limits.TemperatureFromK && valueK <= limits.TemperatureToK))
            {
                report.Add(leg.At.AtOf(key), "the temperature is outside the bench", $"'{leg.At.Text(key)}'", allowed, "change it, or use another bench");
            }
        }

        if (!(leg.RampKPerS <= limits.RampKPerS * (1 + 1e-9)))
        {
            report.Add(leg.At.AtOf("ramp"), "the ramp is faster than the bench allows", $"'{leg.At.Text("ramp")}'",
                $"at most {QuantityText.Format(Math.Round(limits.RampKPerS * 60, 9) / 60, Dimension.TemperatureRate)} ({Place(bench, "ramp")})", "slow it down");
        }
    }

    private static void CheckMeasurement(ProtocolMeasurement measurement, BenchFile bench, ShapeReport report)
    {
        if (!(measurement.BiasV <= bench.Limits.BiasV))
        {
            report.Add(measurement.At, "the bias is above what the bench allows", $"'{QuantityText.Format(measurement.BiasV, Dimension.Voltage)}'",
                $"at most {QuantityText.Format(bench.Limits.BiasV, Dimension.Voltage)} ({Place(bench, "bias")})", "lower it");
        }
    }

    private static void CheckLight(ProtocolLight light, BenchFile bench, ShapeReport report)
    {
        if (bench.Wiring.Lamp is not { } lamp)
        {
            report.Add(light.At, "the protocol wants light and the bench has no lamp", "'lit'", "a wired lamp", $"wire one in {bench.Source.File}, or measure dark only");
            return;
        }

        if (Math.Abs(light.WavelengthM - lamp.WavelengthM) > 0.5e-9)
        {
            report.Add(light.At, "the lamp has another wavelength", $"'{Nanometre(light.WavelengthM)}'",
                $"{Nanometre(lamp.WavelengthM)} ({bench.Source.File}:{lamp.At.Line})", "change the wavelength, or wire another lamp");
        }

        var most = Math.Min(lamp.IrradianceAtRatedWPerM2, bench.Limits.IrradianceWPerM2);
        if (!(light.IrradianceWPerM2 <= most))
        {
            report.Add(light.At, "the irradiance is above what the bench allows", $"'{QuantityText.Format(light.IrradianceWPerM2, Dimension.Irradiance)}'",
                $"at most {QuantityText.Format(most, Dimension.Irradiance)} ({bench.Source.File}:{lamp.At.Line})", "lower it");
        }
    }

    private static string Kelvin(double temperatureK) => QuantityText.Format(temperatureK, Dimension.Temperature);

    private static string Nanometre(double lengthM) => FormattableString.Invariant($"{Math.Round(lengthM * 1e9, 3):G9} nm");

    private static string Place(BenchFile bench, string key) => FormattableString.Invariant($"{bench.Source.File}:{bench.Limits.At[key].Line}");
}
