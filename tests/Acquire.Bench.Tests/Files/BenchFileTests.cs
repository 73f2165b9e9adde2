using Acquire.Bench.Files;
using Xunit;

namespace Acquire.Bench.Tests.Files;

public sealed class BenchFileTests
{
    [Fact]
    public void BenchFile_OfAGoodText_CarriesEveryValueInSi()
    {
        var bench = BenchFile.Parse(BenchTexts.Source(BenchTexts.Good)).Value!;
        Assert.Equal("a small bench (invented)", bench.Title);
        Assert.True(bench.Simulated);
        Assert.Equal(60, bench.Pace);
        Assert.Equal(["controller", "meter", "lamp"], bench.Instruments.Select(instrument => instrument.Name));
        Assert.Equal(new SerialEntry(115200, "none", 8, 1), bench.Instruments[0].Serial);
        Assert.Equal(10.0 / 60, bench.Limits.RampKPerS, 12);
        Assert.Equal(0.01, bench.Limits.CurrentA, 12);
        Assert.Equal(100, bench.Limits.IrradianceWPerM2, 9);
        Assert.Equal(940e-9, bench.Wiring.Lamp!.WavelengthM, 15);
        Assert.Equal(50, bench.Wiring.Lamp.IrradianceAtRatedWPerM2, 9);
        Assert.Equal(new DateOnly(2026, 10, 1), bench.Protections[0].LastTest);
    }

    /// <summary>Every message an operator can see is pinned: place, what, found, allowed, remedy.</summary>
    [Theory]
    [InlineData("pace: 60", "pase: 60", "small.bench.yaml:4:1: unknown key; found 'pase'; allowed bench, twin, simulated, pace, site, monitor, instruments, wiring, limits, protections, interlocks; did you mean 'pace'?")]
    [InlineData("ramp: 10 K/min", "ramp: 10 K", "small.bench.yaml:15:82: this is not a temperature rate; found '10 K'; allowed a number, a space and one of K/min, K/s, K/h, mK/min; write for example '10 K/min'")]
    [InlineData("bias: 10 V", "bias: 10", "small.bench.yaml:15:118: a voltage with its unit is needed here; found '10'; allowed a number and one of V, mV, uV, kV; write for example '10 V'")]
    [InlineData("over-temperature: 440 K", "over-temperature: 400 K", "small.bench.yaml:15:69: the over-temperature must lie above the hottest set point; found '400 K'; allowed above 420 K; raise it, or lower 'temperature: to'")]
    [InlineData("source-meter: { instrument: meter", "source-meter: { instrument: metre", "small.bench.yaml:13:31: the role 'source-meter' names an instrument that is not there; found 'metre'; allowed controller, meter, lamp; name one of them, or add the instrument")]
    [InlineData("period: 0.5 s", "period: 5 s", "small.bench.yaml:6:20: the time is out of range; found '5 s'; allowed 0.1 s to 1 s; change it")]
    [InlineData("last test: 2026-10-01", "last test: 2026-13-01", "small.bench.yaml:17:50: this is not a date; found '2026-13-01'; allowed year-month-day; write the date of the last test")]
    [InlineData("simulated: true", "simulated: yes", "small.bench.yaml:3:12: true or false is needed here; found 'yes'; allowed true, false; write one of them")]
    public void BenchFile_WithOneMistake_SaysWhereWhatAndWhatToDo(string old, string mistake, string message)
    {
        var parsed = BenchFile.Parse(BenchTexts.With(old, mistake));
        Assert.Null(parsed.Value);
        Assert.Equal(message, Assert.Single(parsed.Diagnostics).ToString());
    }

    [Fact]
    public void BenchFile_WithoutWiring_NamesTheMissingKey()
    {
        var text = string.Join('\n', BenchTexts.Good.Split('\n').Where((_, line) => line is < 10 or > 13));
        var parsed = BenchFile.Parse(BenchTexts.Source(text));
        Assert.Contains(parsed.Diagnostics, finding => finding.What == "the key 'wiring' is missing");
    }

    [Fact]
    public void BenchFile_FasterThanLifeOnRealHardware_IsRefused()
    {
        var parsed = BenchFile.Parse(BenchTexts.With("simulated: true", "simulated: false"));
        Assert.Contains(parsed.Diagnostics, finding => finding.What == "only a simulated bench can run faster than life");
    }
}
