using Acquire.Bench.Roles;
using Acquire.Drivers.Files;
using Acquire.Drivers.Instruments;
using Acquire.Testing;
using Acquire.Wire;

namespace Acquire.Drivers.Tests.Instruments;

/// <summary>One instrument over a scripted device, with the driver that is shipped for it.</summary>
internal static class BenchUnderTest
{
    public static readonly TimeSpan TimeOut = TimeSpan.FromSeconds(2);

    public static ITemperatureLoop Controller(ScriptedDevice device, TestLoop loop) =>
        new TextTemperatureLoop(Talk("controller", "scpi-temperature-controller", device, loop, out var driver), driver.Loop!);

    public static ISourceMeter Meter(ScriptedDevice device, TestLoop loop) =>
        new TextSourceMeter(Talk("meter", "scpi-source-meter", device, loop, out var driver), driver.Meter!);

    public static ILamp Lamp(ScriptedDevice device, TestLoop loop) =>
        new TextLamp(Talk("lamp", "scpi-lamp", device, loop, out var driver), driver.Lamp!);

    /// <summary>A device with an empty error queue that says who it is; everything else is up to <paramref name="answer"/>.</summary>
    public static ScriptedDevice Device(Func<string, string?> answer) => ScriptedDevice.AtOnce(message => answer(message) ?? message switch
    {
        "*IDN?" => "ACQUIRE,SIMULATED DEVICE,1,1",
        "SYST:ERR?" => "0,\"No error\"",
        _ => null,
    });

    private static InstrumentTalk Talk(string name, string driverName, ScriptedDevice device, TestLoop loop, out DriverFile driver)
    {
        driver = ShippedDriver(driverName);
        var link = new InProcessLink(device, $"SIM::{name}::INSTR", loop.Clock);
        return new InstrumentTalk(name, driver, new TextExchange(link, driver.Framing, loop.Clock), TimeOut);
    }

    private static DriverFile ShippedDriver(string name)
    {
        var found = DriverCatalogue.Shipped.Find(name);
        Assert.Empty(found.Diagnostics);
        return found.Value!;
    }
}
