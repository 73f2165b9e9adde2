namespace Acquire.Simulator.Tests.Instruments;

public sealed class SimulatedControllerTests
{
    [Fact]
    public void SetPoint_DuringARamp_MovesAtItsRate()
    {
        var talk = new DeviceTalk();
        talk.Tell("controller", "SOUR:TEMP:RAMP 12;SPO 330;:OUTP ON");
        talk.Wait(10);
        var first = talk.Numbers("controller", "SOUR:TEMP:SPO?")[0];
        talk.Wait(60);
        Assert.InRange(talk.Numbers("controller", "SOUR:TEMP:SPO?")[0] - first, 11.95, 12.05);
        Assert.Equal("12\n", talk.Ask("controller", "SOUR:TEMP:RAMP?"));
    }

    [Fact]
    public void SetPoint_HeaterOff_FollowsTheStage()
    {
        var talk = new DeviceTalk();
        talk.Tell("controller", "SOUR:TEMP:SPO 330");
        talk.Wait(120);
        var numbers = talk.Numbers("controller", "SOUR:TEMP:SPO?;:MEAS:TEMP? (@1);:MEAS:POW?");
        Assert.InRange(numbers[0] - numbers[1], -0.05, 0.05);
        Assert.Equal(0, numbers[2]);
    }

    [Fact]
    public void Power_FarBelowTheSetPoint_StaysAtTheLimit()
    {
        var talk = new DeviceTalk();
        talk.Ask("controller", "*IDN?");
        talk.Wait(300);
        talk.Tell("controller", "SOUR:TEMP:RAMP 0;SPO 345;:OUTP ON");
        talk.Wait(2);
        Assert.Equal(40, talk.Numbers("controller", "MEAS:POW?")[0]);
    }

    [Fact]
    public void Readings_OfBothSensors_CarryTheirConstantErrors()
    {
        var talk = new DeviceTalk(change: twin => twin with { Holder = twin.Holder with { ColdEndK = 295 } });
        const int n = 400;
        double stage = 0, sample = 0;
        for (var i = 0; i < n; i++)
        {
            var numbers = talk.Numbers("controller", "MEAS:TEMP? (@1);:MEAS:TEMP? (@2)");
            stage += numbers[0];
            sample += numbers[1];
        }
        // Five standard errors of 1.5 mK over 400 readings, and half a step of the display.
        Assert.InRange((stage / n) - 295, 0.030 - 0.0009, 0.030 + 0.0009);
        Assert.InRange((sample / n) - 295, 0.040 - 0.0009, 0.040 + 0.0009);
    }
}
