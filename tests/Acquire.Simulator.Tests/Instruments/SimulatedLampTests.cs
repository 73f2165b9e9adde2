namespace Acquire.Simulator.Tests.Instruments;

public sealed class SimulatedLampTests
{
    [Fact]
    public void Light_AfterSwitchingOn_FallsWhileTheLampWarmsUp()
    {
        var talk = new DeviceTalk(change: twin => twin with { Lamp = twin.Lamp! with { Drift = 0, MonitorNoiseA = 0 } });
        talk.Tell("lamp", "SOUR:CURR 0.5;:OUTP ON");
        talk.Wait(0.25);
        var cold = talk.Bench.Truth().IrradianceWPerM2;
        talk.Wait(600);
        var warm = talk.Bench.Truth().IrradianceWPerM2;
        // True rated irradiance 4.9 mW/cm2, and 2 % lost when warm.
        Assert.InRange(cold, 48.9, 49.0);
        Assert.InRange(warm / 49.0, 0.9799, 0.9801);
        Assert.InRange(talk.Numbers("lamp", "MEAS:CURR? (@2)")[0] / 50e-6, 0.979, 0.981);
    }

    [Fact]
    public void Light_SwitchedOff_IsDarkAndTheDriveReadsZero()
    {
        var talk = new DeviceTalk();
        talk.Tell("lamp", "SOUR:CURR 0.5;:OUTP ON");
        talk.Wait(1);
        Assert.Equal(0.5, talk.Numbers("lamp", "MEAS:CURR? (@1)")[0]);
        talk.Tell("lamp", "OUTP OFF");
        talk.Wait(1);
        Assert.Equal(0, talk.Bench.Truth().IrradianceWPerM2);
        Assert.Equal(0, talk.Numbers("lamp", "MEAS:CURR? (@1)")[0]);
        Assert.Equal("0.5\n", talk.Ask("lamp", "SOUR:CURR?"));
    }
}
