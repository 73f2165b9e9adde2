using Acquire.Bench.Readings;
using Acquire.Testing;

namespace Acquire.Drivers.Tests.Instruments;

public class TextSourceMeterTests
{
    [Theory]
    [InlineData("+1.234560E-06,+5.000000E-01,0", Quality.Good, 1.23456e-6)]
    [InlineData("1E-3,0.21,1", Quality.Compliance, 1e-3)]
    [InlineData("9.91E37,0.5,2", Quality.Overrange, double.NaN)]
    [InlineData("9.91E37,0.5,3", Quality.Overrange | Quality.Compliance, double.NaN)]
    [InlineData("1E-6,0.5,4", Quality.Good, 1e-6)]
    [InlineData("-9.9E37,0.5,0", Quality.Overrange, double.NaN)]
    [InlineData("1E-6,0.5,0.5", Quality.Unreadable, 1e-6)]
    [InlineData("1E-6,0.5,-1", Quality.Unreadable, 1e-6)]
    [InlineData("1E-6,0.5,x", Quality.Unreadable, 1e-6)]
    [InlineData("1,5E-6,0,5,0", Quality.Unreadable, double.NaN)]
    [InlineData("NAN,0.5,0", Quality.Implausible, double.NaN)]
    public void Read_Reply_GivesCurrentWithItsQuality(string reply, Quality quality, double currentA) => TestLoop.Run(async loop =>
    {
        await using var meter = BenchUnderTest.Meter(BenchUnderTest.Device(m => m == "READ?" ? reply : null), loop);
        var reading = await meter.ReadAsync(default);
        Assert.Equal(quality, reading.CurrentA.Quality);
        Assert.Equal(currentA, reading.CurrentA.Value);
        Assert.Equal(quality == Quality.Good ? null : reply, reading.CurrentA.Raw);
    });

    [Fact]
    public void Configure_Everything_SendsSIAndChecksEachSetting() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(_ => null);
        await using var meter = BenchUnderTest.Meter(device, loop);
        Assert.True((await meter.ConfigureAsync(1e-3, 5, default)).Done);
        Assert.True((await meter.SetRangeAsync(1e-6, default)).Done);
        Assert.True((await meter.SetBiasAsync(-0.2, default)).Done);
        Assert.True((await meter.OutputAsync(true, default)).Done);
        Assert.Equal(["SENS:CURR:RANG:AUTO 0", "SENS:CURR:PROT 0.001", "SENS:CURR:NPLC 5", "SENS:CURR:RANG 1E-06", "SOUR:VOLT -0.2", "OUTP 1"],
            device.Messages.Where(m => m != "SYST:ERR?"));
        Assert.Equal(6, device.Messages.Count(m => m == "SYST:ERR?"));
    });

    [Fact]
    public void Ranges_OfTheShippedDriver_AreDecadesFromOneNanoampere() => TestLoop.Run(async loop =>
    {
        await using var meter = BenchUnderTest.Meter(BenchUnderTest.Device(_ => null), loop);
        Assert.Equal(8, meter.CurrentRangesA.Count);
        for (var i = 0; i < 8; i++) Assert.Equal(Math.Pow(10, i - 9), meter.CurrentRangesA[i], Math.Pow(10, i - 24));
    });

    [Fact]
    public void MakeSafe_Meter_TakesTheBiasAwayAndSwitchesOff() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(m => m == "OUTP?" ? "0" : null);
        await using var meter = BenchUnderTest.Meter(device, loop);
        Assert.True((await meter.MakeSafeAsync(default)).Done);
        Assert.Equal(["SOUR:VOLT 0", "OUTP 0", "OUTP?"], device.Messages);
    });
}
