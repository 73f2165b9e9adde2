using Acquire.Bench.Files;
using Acquire.Bench.Readings;
using Acquire.Bench.Text;
using Acquire.Drivers.Files;
using Acquire.Drivers.Instruments;
using Acquire.Testing;
using Acquire.Wire;

namespace Acquire.Drivers.Tests.Instruments;

public class InstrumentFactoryTests
{
    private const string BenchText = """
        bench: factory bench (invented)
        site: { line frequency: 50 Hz }
        instruments:
          controller: { driver: scpi-temperature-controller, address: "SIM::controller::INSTR", time-out: 1 s }
          meter: { driver: scpi-source-meter, address: "ASRL/dev/no-such-port::INSTR", serial: { baud: 115200, parity: even, data bits: 7, stop bits: 2 } }
          lamp: { driver: scpi-lamp, address: "TCPIP::127.0.0.1::0::SOCKET" }
        wiring:
          temperature loop: { instrument: controller, stage uncertainty: 0.1 K, sample uncertainty: 0.1 K, sensor range: { from: 60 K, to: 500 K } }
          source-meter: { instrument: meter, connection: two-wire }
          lamp: { instrument: lamp, wavelength: 940 nm, rated drive: 0.5 A, irradiance at rated drive: 5 mW/cm2 }
        limits: { temperature: { from: 77 K, to: 420 K }, over-temperature: 440 K, ramp: 10 K/min, heater power: 50 W, bias: 10 V, current: 10 mA, irradiance: 10 mW/cm2 }
        protections: []
        """;

    private static BenchFile Bench(string text = BenchText)
    {
        var parsed = BenchFile.Parse(new SourceText("factory.bench.yaml", text));
        Assert.Empty(parsed.Diagnostics);
        return parsed.Value!;
    }

    [Fact]
    public void Open_Bench_GivesEveryRoleAndOpensNothing() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(m => m.StartsWith("MEAS:TEMP", StringComparison.Ordinal) ? "300;301;300;1" : null);
        var opened = InstrumentFactory.Open(Bench(), new LinkFactory(_ => device, loop.Clock), DriverCatalogue.Shipped);
        Assert.Empty(opened.Diagnostics);
        var bench = opened.Value!;
        Assert.Equal(["controller", "meter", "lamp"], bench.All.Select(instrument => instrument.Name));
        Assert.Empty(device.Connections);
        Assert.Equal(Measured.Good(300), (await bench.Loop.ReadAsync(default)).StageK);
        Assert.Equal("ASRL/dev/no-such-port::INSTR", bench.Meter.Address);
        Assert.Equal(Quality.LinkFailed, (await bench.Meter.ReadAsync(default)).CurrentA.Quality);
        foreach (var instrument in bench.All) await instrument.DisposeAsync();
    });

    [Fact]
    public void Open_WithOverrides_UsesThemByInstrumentName() => TestLoop.Run(async loop =>
    {
        var devices = new Dictionary<string, ScriptedDevice> { ["a"] = BenchUnderTest.Device(_ => null), ["b"] = BenchUnderTest.Device(_ => null) };
        var opened = InstrumentFactory.Open(Bench(), new LinkFactory(devices.GetValueOrDefault, loop.Clock), DriverCatalogue.Shipped,
            new Dictionary<string, string> { ["controller"] = "SIM::a::INSTR", ["lamp"] = "SIM::b::INSTR" });
        Assert.Equal("SIM::b::INSTR", opened.Value!.Lamp!.Address);
        Assert.True((await opened.Value.Lamp.IdentifyAsync(default)).Answered);
        Assert.Contains("*IDN?", devices["b"].Messages);
        Assert.Empty(devices["a"].Messages);
    });

    [Theory]
    [InlineData("driver: scpi-lamp", "driver: no-such-lamp", "factory.bench.yaml:6:3: there is no driver of this name; found 'no-such-lamp'")]
    [InlineData("driver: scpi-lamp", "driver: scpi-source-meter", "factory.bench.yaml:6:3: the driver cannot play the role 'lamp'; found 'scpi-source-meter'")]
    [InlineData("SIM::controller::INSTR", "SIM::nobody::INSTR", "no device named 'nobody' lives in this process")]
    public void Open_Impossible_NamesThePlaceInTheBenchFile(string right, string wrong, string message)
    {
        var bench = Bench(BenchText.Replace(right, wrong, StringComparison.Ordinal));
        var opened = InstrumentFactory.Open(bench, new LinkFactory(name => name == "controller" ? new ScriptedDevice() : null), DriverCatalogue.Shipped);
        Assert.Null(opened.Value);
        Assert.Contains(message, Assert.Single(opened.Diagnostics).ToString(), StringComparison.Ordinal);
    }
}
