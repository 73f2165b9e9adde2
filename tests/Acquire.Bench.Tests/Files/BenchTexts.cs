using Acquire.Bench.Text;

namespace Acquire.Bench.Tests.Files;

/// <summary>A small bench, invented, that tests change one line at a time.</summary>
internal static class BenchTexts
{
    public const string Good = """
        bench: a small bench (invented)
        twin: small.twin.yaml
        simulated: true
        pace: 60
        site: { laboratory: nowhere, line frequency: 50 Hz, time zone: UTC }
        monitor: { period: 0.5 s }
        instruments:
          controller: { driver: scpi-temperature-controller, address: "ASRL/dev/pts/0::INSTR", time-out: 2 s, serial: { baud: 115200, parity: none, data bits: 8, stop bits: 1 } }
          meter: { driver: scpi-source-meter, address: "TCPIP::127.0.0.1::0::SOCKET" }
          lamp: { driver: scpi-lamp, address: "TCPIP::127.0.0.1::0::SOCKET" }
        wiring:
          temperature loop: { instrument: controller, stage uncertainty: 0.1 K, sample uncertainty: 0.1 K, sensor range: { from: 60 K, to: 500 K } }
          source-meter: { instrument: meter, connection: two-wire }
          lamp: { instrument: lamp, wavelength: 940 nm, rated drive: 0.5 A, irradiance at rated drive: 5 mW/cm2 }
        limits: { temperature: { from: 77 K, to: 420 K }, over-temperature: 440 K, ramp: 10 K/min, heater power: 50 W, bias: 10 V, current: 10 mA, irradiance: 10 mW/cm2 }
        protections:
          - { what: over-temperature limiter, last test: 2026-10-01 }
        """;

    public static SourceText Source(string text) => new("small.bench.yaml", text);

    /// <summary>The good text with one piece replaced; the piece must be there.</summary>
    public static SourceText With(string old, string replacement) =>
        Good.Contains(old, StringComparison.Ordinal) ? Source(Good.Replace(old, replacement, StringComparison.Ordinal)) : throw new ArgumentException(old);
}
