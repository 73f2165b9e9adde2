using System.Text;

namespace Acquire.Simulator.Tests;

public sealed class SimulatedBenchTests
{
    private const string Poll = "MEAS:TEMP? (@1);:MEAS:TEMP? (@2);:SOUR:TEMP:SPO?;:MEAS:POW?";

    [Fact]
    public void Replies_SameSeed_AreTheSameByteForByte() => Assert.Equal(Transcript(11), Transcript(11));

    [Fact]
    public void Replies_OtherSeed_Differ() => Assert.NotEqual(Transcript(11), Transcript(12));

    [Fact]
    public void Bench_PolledTenTimesMore_MovesTheSameWay()
    {
        Assert.Equal(StageAfterRamp(pollEveryS: 5), StageAfterRamp(pollEveryS: 0.5));
    }

    [Theory]
    [InlineData("germanium-quick", 330, 320, 30.0)]
    [InlineData("germanium-quick", 240, 230, 30.0)]
    [InlineData("germanium-quick", 230, 240, 30.0)]
    public void Loop_TenKelvinStepOnTheQuickHolder_IsStableWithinTwoMinutesWithLittleOvershoot(string bench, double fromK, double toK, double rampKPerMin)
    {
        var talk = new DeviceTalk(bench);
        talk.Tell("controller", FormattableString.Invariant($"SOUR:TEMP:RAMP {rampKPerMin};SPO {fromK}"));
        talk.Tell("controller", "OUTP ON");
        talk.Wait(600);
        var startK = talk.Bench.Truth().StageK;
        talk.Tell("controller", FormattableString.Invariant($"SOUR:TEMP:SPO {toK}"));
        var overshootK = 0.0;
        for (var i = 0; i < 600; i++)
        {
            talk.Wait(0.2);
            overshootK = Math.Max(overshootK, (talk.Bench.Truth().StageK - toK) * Math.Sign(toK - startK));
        }
        Assert.InRange(overshootK, 0, 0.5);
        for (var i = 0; i < 300; i++)
        {
            talk.Wait(0.2);
            var truth = talk.Bench.Truth();
            // The controller regulates what its sensor shows, which reads 30 mK high.
            Assert.InRange(truth.StageK + 0.030 - toK, -0.02, 0.02);
            Assert.InRange(truth.SampleK - truth.StageK, -0.02, 0.02);
        }
    }

    [Theory]
    [InlineData("germanium-cryostat", 80.0)]
    [InlineData("germanium-cryostat", 420.0)]
    [InlineData("silicon-furnace", 1100.0)]
    [InlineData("silicon-furnace", 320.0)]
    public void Loop_EndsOfTheRange_AreReachedAndHeld(string bench, double targetK)
    {
        var talk = new DeviceTalk(bench);
        talk.Tell("controller", FormattableString.Invariant($"SOUR:TEMP:RAMP 10;SPO {targetK}"));
        talk.Tell("controller", "OUTP ON");
        talk.Wait(4 * 3600);
        var offsetK = bench == "silicon-furnace" ? 0.8 : 0.05;
        Assert.InRange(talk.Bench.Truth().StageK + offsetK - targetK, -0.05, 0.05);
    }

    [Fact]
    public void PortFor_UnknownInstrument_NamesThoseThatAreThere()
    {
        var problem = Assert.Throws<ArgumentException>(() => new DeviceTalk().Bench.PortFor("pump"));
        Assert.Contains("controller, meter, lamp", problem.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Bench_WaitingForItsFirstClient_StaysAsItWasSwitchedOn()
    {
        var talk = new DeviceTalk();
        talk.Wait(3600);
        Assert.InRange(talk.Numbers("controller", "MEAS:TEMP? (@1)")[0], 294.9, 295.1);
    }

    [Fact]
    public void Bench_LeftAloneForDays_IsAtRestAtItsColdEnd()
    {
        var talk = new DeviceTalk();
        talk.Ask("controller", "*IDN?");
        talk.Wait(5 * 86400);
        Assert.InRange(talk.Numbers("controller", "MEAS:TEMP? (@1)")[0], 200.0, 200.1);
    }

    private static string Transcript(ulong seed)
    {
        var talk = new DeviceTalk(seed: seed);
        var text = new StringBuilder();
        text.Append(talk.Ask("controller", "*RST;:SOUR:TEMP:RAMP 20;SPO 310;:OUTP ON"));
        text.Append(talk.Ask("lamp", "SOUR:CURR 0.4;:OUTP ON"));
        text.Append(talk.Ask("meter", "SOUR:VOLT 0.2;:OUTP ON"));
        for (var i = 0; i < 200; i++)
        {
            text.Append(talk.Ask("controller", Poll));
            text.Append(talk.Ask("lamp", "MEAS:CURR? (@1);:MEAS:CURR? (@2)"));
            text.Append(talk.Ask("meter", "READ?"));
            talk.Wait(0.5);
        }
        return text.ToString();
    }

    private static double StageAfterRamp(double pollEveryS)
    {
        var talk = new DeviceTalk();
        talk.Tell("controller", "SOUR:TEMP:RAMP 20;SPO 330;:OUTP ON");
        for (var t = 0.0; t < 300; t += pollEveryS)
        {
            talk.Ask("controller", Poll);
            talk.Wait(pollEveryS);
        }
        return talk.Bench.Truth().StageK;
    }
}
