using Acquire.Bench.Readings;
using Acquire.Testing;

namespace Acquire.Drivers.Tests.Instruments;

public class TextLampTests
{
    [Fact]
    public void Read_GoodReply_GivesDriveAndMonitor() => TestLoop.Run(async loop =>
    {
        await using var lamp = BenchUnderTest.Lamp(BenchUnderTest.Device(m => m == "MEAS:CURR? (@1);:MEAS:CURR? (@2)" ? "0.25;1.5E-6" : null), loop);
        var reading = await lamp.ReadAsync(default);
        Assert.Equal((Measured.Good(0.25), Measured.Good(1.5e-6)), (reading.DriveA, reading.MonitorA));
    });

    [Fact]
    public void SetDriveThenOutput_InOrder_AreSentAndChecked() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(_ => null);
        await using var lamp = BenchUnderTest.Lamp(device, loop);
        Assert.True((await lamp.SetDriveAsync(0.1, default)).Done);
        Assert.True((await lamp.OutputAsync(false, default)).Done);
        Assert.Equal(["SOUR:CURR 0.1", "SYST:ERR?", "OUTP 0", "SYST:ERR?"], device.Messages);
    });

    [Fact]
    public void MakeSafe_Lamp_IsDarkAndReadBack() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(m => m == "OUTP?" ? "OFF" : null);
        await using var lamp = BenchUnderTest.Lamp(device, loop);
        Assert.True((await lamp.MakeSafeAsync(default)).Done);
        Assert.Equal(["OUTP 0", "SOUR:CURR 0", "OUTP?"], device.Messages);
    });
}
