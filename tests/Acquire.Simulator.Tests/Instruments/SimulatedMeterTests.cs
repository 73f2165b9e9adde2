using Acquire.Simulator.Instruments;

namespace Acquire.Simulator.Tests.Instruments;

public sealed class SimulatedMeterTests
{
    [Theory]
    // Published table of thermal current noise at 300 K, sqrt(4 k T / R): 129 fA at 1 Mohm, 12.9 fA at 100 Mohm,
    // 4.1 fA at 1 Gohm, 1.3 fA at 10 Gohm, all in 1 Hz (Nyquist 1928).
    [InlineData(1e6, 129e-15, 0.5e-15)]
    [InlineData(1e8, 12.9e-15, 0.05e-15)]
    [InlineData(1e9, 4.1e-15, 0.05e-15)]
    [InlineData(1e10, 1.3e-15, 0.05e-15)]
    public void Johnson_HalfASecond_IsTheDensityInOneHertz(double resistanceOhm, double expectedA, double toleranceA) =>
        Assert.InRange(CurrentNoise.JohnsonA(300, 1 / resistanceOhm, 0.5), expectedA - toleranceA, expectedA + toleranceA);

    [Fact]
    public void Shot_HalfASecond_IsSchottkysDensityInOneHertz() =>
        // sqrt(2 e I): 17.9 pA in 1 Hz at 1 mA (Schottky 1918 with e = 1.602176634e-19 C).
        Assert.InRange(CurrentNoise.ShotA(1e-3, 0.5), 17.89e-12, 17.91e-12);

    [Fact]
    public void Readings_OnlyThermalNoise_ScatterAsNyquistSays()
    {
        var talk = Quiet(m => m);
        Prepare(talk, "SOUR:VOLT 0;:SENS:CURR:RANG 1E-9;:SENS:CURR:NPLC 1");
        var truth = talk.Bench.Truth();
        var expectedA = Math.Sqrt(4 * 1.380649e-23 * truth.SampleK * truth.ConductanceS / (2 * 0.02));
        AssertScatter(talk, expectedA);
    }

    [Fact]
    public void Readings_FullShotNoise_ScatterAsSchottkySays()
    {
        var talk = Quiet(m => m with { ShotNoise = 1 });
        Prepare(talk, "SOUR:VOLT 1;:SENS:CURR:RANG 1E-3;:SENS:CURR:NPLC 1");
        var truth = talk.Bench.Truth();
        var johnson = 4 * 1.380649e-23 * truth.SampleK * truth.ConductanceS;
        var shot = 2 * 1.602176634e-19 * truth.ConductanceS;
        AssertScatter(talk, Math.Sqrt((johnson + shot) / (2 * 0.02)));
    }

    [Theory]
    [InlineData(1, 0)]
    [InlineData(5, 0)]
    [InlineData(10, 0)]
    // The mean of a sine of amplitude 1 uA over T scatters, over all phases, by |sin(wT/2)/(wT/2)| / sqrt 2.
    [InlineData(0.5, 0.4501582)]
    [InlineData(1.5, 0.1500527)]
    public void LinePickUp_NumberOfCycles_IsRejectedOnlyWhenWhole(double cycles, double expected)
    {
        var talk = Quiet(m => m with { LinePickUpA = 1e-6, LineFrequencyHz = 50 });
        Prepare(talk, FormattableString.Invariant($"SOUR:VOLT 0;:SENS:CURR:RANG 1E-5;:SENS:CURR:NPLC {cycles}"));
        var squares = 0.0;
        const int n = 400;
        for (var i = 0; i < n; i++)
        {
            var current = talk.Read().CurrentA;
            squares += current * current;
            // Waiting 7 ms more each time visits all phases evenly.
            talk.Wait(0.007);
        }
        Assert.InRange(Math.Sqrt(squares / n) / 1e-6, expected - 0.02, expected + 0.02);
    }

    [Fact]
    public void LinePickUp_MainsOffTheirNominalFrequency_LeakThroughWholeCycles()
    {
        var talk = Quiet(m => m with { LinePickUpA = 1e-6, LineFrequencyHz = 50.5 });
        Prepare(talk, "SOUR:VOLT 0;:SENS:CURR:RANG 1E-6;:SENS:CURR:NPLC 1");
        var largestA = Enumerable.Range(0, 100).Max(_ => Math.Abs(talk.Read().CurrentA));
        Assert.InRange(largestA, 5e-9, 2e-8);
    }

    [Fact]
    public void Reading_AboveItsRange_IsTheOverloadMarkerWithItsStatusBit()
    {
        var talk = Quiet(m => m);
        Prepare(talk, "SOUR:VOLT 0.5;:SENS:CURR:RANG 1E-6");
        var (currentA, _, status) = talk.Read();
        // SCPI-1999, volume 1, section 7.2.1.5: not a number is 9.91E37.
        Assert.Equal(9.91e37, currentA);
        Assert.Equal(2, status);
    }

    [Fact]
    public void Reading_AtTheCurrentLimit_SaysSoAndTheVoltageGivesWay()
    {
        var talk = Quiet(m => m);
        Prepare(talk, "SOUR:VOLT 1;:SENS:CURR:PROT 1E-5;:SENS:CURR:RANG 1E-4");
        talk.Wait(1);
        var (currentA, voltageV, status) = talk.Read();
        Assert.Equal(1, status);
        Assert.InRange(currentA, 0.99e-5, 1.01e-5);
        Assert.InRange(voltageV * talk.Bench.Truth().ConductanceS, 0.99e-5, 1.01e-5);
    }

    [Fact]
    public void Reading_TakesTwiceItsIntegration()
    {
        var talk = new DeviceTalk();
        talk.Tell("meter", "SENS:CURR:NPLC 5");
        talk.Ask("meter", "READ?");
        Assert.Equal(0.2, talk.Took.TotalSeconds, 6);
        // Asked again while busy, the device begins when it has finished.
        talk.Ask("meter", "READ?");
        Assert.Equal(0.4, talk.Took.TotalSeconds, 6);
    }

    [Fact]
    public void Current_AfterABiasStep_SettlesWithResistanceTimesCapacitance()
    {
        var talk = Quiet(m => m with { CableF = 1e-4 });
        Prepare(talk, "SOUR:VOLT 0.1;:SENS:CURR:RANG 1E-3;:SENS:CURR:NPLC 0.01");
        talk.Wait(30);
        var truth = talk.Bench.Truth();
        var tauS = 1e-4 / truth.ConductanceS;
        talk.Tell("meter", "SOUR:VOLT 0.2");
        talk.Wait(Math.Round(tauS, 3));
        var expectedA = truth.ConductanceS * (0.2 - (0.1 * Math.Exp(-1)));
        Assert.InRange(talk.Read().CurrentA / expectedA, 0.99, 1.01);
    }

    [Fact]
    public void Range_Changed_DisturbsTheNextReadingsOnly()
    {
        var talk = Quiet(m => m with { RangeGlitch = 0.005, RangeGlitchTimeS = 0.15 });
        Prepare(talk, "SOUR:VOLT 0;:SENS:CURR:RANG 1E-4;:SENS:CURR:NPLC 1");
        talk.Wait(10);
        talk.Tell("meter", "SENS:CURR:RANG 1E-3");
        Assert.InRange(talk.Read().CurrentA, 3e-6, 5.1e-6);
        talk.Wait(2);
        Assert.InRange(talk.Read().CurrentA, -1e-9, 1e-9);
    }

    [Fact]
    public void Autorange_CurrentThatGrows_ClimbsTheRanges()
    {
        var talk = Quiet(m => m);
        Prepare(talk, "SENS:CURR:RANG:AUTO ON;:SOUR:VOLT 1E-6");
        talk.Read();
        var low = talk.Numbers("meter", "SENS:CURR:RANG?")[0];
        talk.Tell("meter", "SOUR:VOLT 1");
        talk.Wait(1);
        talk.Read();
        var high = talk.Numbers("meter", "SENS:CURR:RANG?")[0];
        Assert.Equal(1e-9, low);
        Assert.Equal(1e-3, high);
        Assert.Equal("1\n", talk.Ask("meter", "SENS:CURR:RANG:AUTO?"));
    }

    [Fact]
    public void Reversal_HalfSum_IsTheEmfOfTheSample()
    {
        var talk = Quiet(m => m);
        Prepare(talk, "SENS:CURR:PROT 1E-2;:SENS:CURR:RANG 1E-4;:SENS:CURR:NPLC 10;:SOUR:VOLT 0.1");
        talk.Wait(1);
        var plusA = Mean(talk);
        talk.Tell("meter", "SOUR:VOLT -0.1");
        talk.Wait(1);
        var minusA = Mean(talk);
        var emfV = (plusA + minusA) / (plusA - minusA) * 0.1;
        // 3 uV of the contacts; stage and sample are at rest, but for their self-heating.
        Assert.InRange(emfV, 2e-6, 4e-6);
    }

    private static double Mean(DeviceTalk talk) => Enumerable.Range(0, 20).Average(_ => talk.Read().CurrentA);

    private static DeviceTalk Quiet(Func<MeterModel, MeterModel> change) => new(change: twin => twin with
    {
        // At rest: the cold end is as warm as the start, so that the sample's conductance stands.
        Holder = twin.Holder with { ColdEndK = 295 },
        Meter = change(twin.Meter with
        {
            Offset = 0,
            WhiteNoise = 0,
            FlickerNoise = 0,
            ShotNoise = 0,
            LinePickUpA = 0,
            RangeGlitch = 0,
            VoltageNoiseV = 0,
            Resolution = 1e-8,
            CableF = 1e-12,
        }),
    });

    private static void Prepare(DeviceTalk talk, string settings)
    {
        talk.Tell("meter", "OUTP ON");
        talk.Tell("meter", settings);
        talk.Wait(0.5);
    }

    // 99.99 % limits of a standard deviation from n numbers lie at 1 +/- 3.9 / sqrt(2 n).
    private static void AssertScatter(DeviceTalk talk, double expectedA)
    {
        const int n = 3000;
        talk.Wait(600);
        var readings = Enumerable.Range(0, n).Select(_ => talk.Read().CurrentA).ToList();
        var mean = readings.Average();
        var found = Math.Sqrt(readings.Sum(r => (r - mean) * (r - mean)) / (n - 1));
        Assert.InRange(found / expectedA, 0.95, 1.05);
    }
}
