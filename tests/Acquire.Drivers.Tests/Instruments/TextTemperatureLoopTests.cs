using Acquire.Bench.Readings;
using Acquire.Testing;

namespace Acquire.Drivers.Tests.Instruments;

public class TextTemperatureLoopTests
{
    private const string PollLine = "MEAS:TEMP? (@1);:MEAS:TEMP? (@2);:SOUR:TEMP:SPO?;:MEAS:POW?";

    [Fact]
    public void Read_GoodReply_GivesFourValuesInOneExchange() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(m => m == PollLine ? "293.15;+2.930000E+02;300.0;12.5" : null);
        await using var controller = BenchUnderTest.Controller(device, loop);
        var reading = await controller.ReadAsync(default);
        Assert.Equal((Measured.Good(293.15), Measured.Good(293), Measured.Good(300), Measured.Good(12.5)),
            (reading.StageK, reading.SampleK, reading.SetPointK, reading.HeaterW));
        Assert.Equal([PollLine], device.Messages);
    });

    [Fact]
    public void Read_OneSensorOpen_SpoilsThatValueOnly() => TestLoop.Run(async loop =>
    {
        await using var controller = BenchUnderTest.Controller(BenchUnderTest.Device(_ => "293.15;9.91E37;300;12.5"), loop);
        var reading = await controller.ReadAsync(default);
        Assert.Equal((Quality.Good, Quality.Overrange, Quality.Good), (reading.StageK.Quality, reading.SampleK.Quality, reading.SetPointK.Quality));
        Assert.Equal("293.15;9.91E37;300;12.5", reading.SampleK.Raw);
    });

    [Theory]
    [InlineData("293,15;293,00;300,0;12,5")]
    [InlineData("NAN;NAN;NAN;NAN")]
    [InlineData("293.15;293.15")]
    [InlineData("ERR")]
    [InlineData("")]
    public void Read_ReplyThatIsNoPoll_GivesNoGoodValue(string reply) => TestLoop.Run(async loop =>
    {
        await using var controller = BenchUnderTest.Controller(BenchUnderTest.Device(_ => reply), loop);
        var reading = await controller.ReadAsync(default);
        Assert.DoesNotContain(true, new[] { reading.StageK.IsGood, reading.SampleK.IsGood, reading.SetPointK.IsGood, reading.HeaterW.IsGood });
    });

    [Fact]
    public void Read_Silence_IsTimedOutAfterTheTimeOut() => TestLoop.Run(async loop =>
    {
        await using var controller = BenchUnderTest.Controller(BenchUnderTest.Device(_ => null), loop);
        var reading = await controller.ReadAsync(default);
        Assert.Equal((Quality.TimedOut, Quality.TimedOut), (reading.StageK.Quality, reading.HeaterW.Quality));
        Assert.Equal(BenchUnderTest.TimeOut.Ticks, loop.Clock.Ticks);
    });

    [Fact]
    public void SetPoint_InSI_IsSentInTheInstrumentsUnitsRateFirst() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(_ => null);
        await using var controller = BenchUnderTest.Controller(device, loop);
        Assert.True((await controller.SetPointAsync(320.5, 5.0 / 60, default)).Done);
        Assert.Equal(["SOUR:TEMP:RAMP 5", "SYST:ERR?", "SOUR:TEMP:SPO 320.5", "SYST:ERR?"], device.Messages);
    });

    [Fact]
    public void SetPoint_ErrorQueueNotEmpty_FailsWithEveryErrorAndEmptiesTheQueue() => TestLoop.Run(async loop =>
    {
        var queue = new Queue<string>(["-222,\"Data out of range\"", "-221,\"Settings conflict\""]);
        var device = BenchUnderTest.Device(m => m == "SYST:ERR?" && queue.TryDequeue(out var error) ? error : null);
        await using var controller = BenchUnderTest.Controller(device, loop);
        var outcome = await controller.SetPointAsync(9999, 0.1, default);
        Assert.False(outcome.Done);
        Assert.Equal("controller (SIM::controller::INSTR) refused 'SOUR:TEMP:RAMP 6': it reports -222,\"Data out of range\"; -221,\"Settings conflict\". Check the value against the instrument's limits and the driver 'scpi-temperature-controller'.", outcome.Problem);
        Assert.Empty(queue);
        Assert.DoesNotContain("SOUR:TEMP:SPO 9999", device.Messages);
    });

    [Fact]
    public void SetPoint_NotANumber_IsNotSent() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(_ => null);
        await using var controller = BenchUnderTest.Controller(device, loop);
        var outcome = await controller.SetPointAsync(double.NaN, 0.1, default);
        Assert.Contains("the value is not a finite number", outcome.Problem, StringComparison.Ordinal);
        Assert.DoesNotContain(device.Messages, m => m.StartsWith("SOUR:TEMP:SPO", StringComparison.Ordinal));
    });

    [Fact]
    public void Heater_NoAnswerFromTheErrorQueue_SaysThatTheOutcomeIsNotKnown() => TestLoop.Run(async loop =>
    {
        await using var controller = BenchUnderTest.Controller(ScriptedDevice.AtOnce(_ => null), loop);
        var outcome = await controller.HeaterAsync(true, default);
        Assert.Contains("whether 'OUTP 1' was taken is not known", outcome.Problem, StringComparison.Ordinal);
    });

    [Fact]
    public void Identify_RightInstrument_ClearsOldErrors() => TestLoop.Run(async loop =>
    {
        var queue = new Queue<string>(["-113,\"Undefined header\""]);
        var device = BenchUnderTest.Device(m => m == "SYST:ERR?" && queue.TryDequeue(out var error) ? error : null);
        await using var controller = BenchUnderTest.Controller(device, loop);
        var identification = await controller.IdentifyAsync(default);
        Assert.Equal((true, "ACQUIRE,SIMULATED DEVICE,1,1", null), (identification.Answered, identification.Text, identification.Problem));
        Assert.Equal(["*IDN?", "*CLS", "SYST:ERR?", "SYST:ERR?"], device.Messages);
    });

    [Fact]
    public void Identify_SomethingElse_SaysWhatAnsweredAndSendsNothingMore() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(m => m == "*IDN?" ? "coffee machine" : null);
        await using var controller = BenchUnderTest.Controller(device, loop);
        var identification = await controller.IdentifyAsync(default);
        Assert.False(identification.Answered);
        Assert.Contains("'*IDN?' was answered 'coffee machine'", identification.Problem, StringComparison.Ordinal);
        Assert.Equal(["*IDN?"], device.Messages);
    });

    [Fact]
    public void MakeSafe_PollInFlight_GoesAtOnceAndReadsBack() => TestLoop.Run(async loop =>
    {
        var device = new ScriptedDevice { Answer = m => m == "OUTP?" ? ("0\n", TimeSpan.Zero) : m == PollLine ? ("late\n", TimeSpan.FromSeconds(1.9)) : (null, TimeSpan.Zero) };
        await using var controller = BenchUnderTest.Controller(device, loop);
        var poll = controller.ReadAsync(default).AsTask();
        var outcome = await controller.MakeSafeAsync(default);
        Assert.True(outcome.Done);
        Assert.Equal(0, loop.Clock.Ticks);
        Assert.Equal(Quality.LinkFailed, (await poll).StageK.Quality);
        Assert.Equal([PollLine, "OUTP 0", "OUTP?"], device.Messages);
    });

    [Fact]
    public void MakeSafe_OutputStaysOn_TriesAgainThenSaysThatItIsNotSafe() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(m => m == "OUTP?" ? "1" : null);
        await using var controller = BenchUnderTest.Controller(device, loop);
        var outcome = await controller.MakeSafeAsync(default);
        Assert.Equal("controller (SIM::controller::INSTR) is NOT known to be safe: 'OUTP?' was answered '1', expected 0|OFF. Switch its output off by hand.", outcome.Problem);
        Assert.Equal(["OUTP 0", "OUTP?", "OUTP 0", "OUTP?"], device.Messages);
    });

    [Fact]
    public void MakeSafe_Silence_EndsWithinItsTimeOuts() => TestLoop.Run(async loop =>
    {
        var device = BenchUnderTest.Device(_ => null);
        await using var controller = BenchUnderTest.Controller(device, loop);
        Assert.False((await controller.MakeSafeAsync(default)).Done);
        Assert.Equal(2 * BenchUnderTest.TimeOut.Ticks, loop.Clock.Ticks);
        Assert.Equal(2, device.Messages.Count(m => m == "OUTP 0"));
    });
}
