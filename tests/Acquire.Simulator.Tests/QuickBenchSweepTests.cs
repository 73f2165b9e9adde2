namespace Acquire.Simulator.Tests;

/// <summary>A warm, cold and warm sweep of the quick bench by hand: what a first run must be able to do in an hour of bench time.</summary>
public sealed class QuickBenchSweepTests
{
    private const double BoltzmannEVPerK = 1.380649e-23 / 1.602176634e-19;

    [Fact]
    public void Sweep_WarmColdWarm_FitsIntoAnHourAndGivesTheIntrinsicSlope()
    {
        var talk = new DeviceTalk(seed: 42);
        talk.Tell("controller", "SOUR:TEMP:RAMP 30;SPO 340;:OUTP ON");
        talk.Tell("meter", "SENS:CURR:PROT 5E-3;NPLC 5;:OUTP ON");
        var down = Leg(talk, [.. Enumerable.Range(0, 13).Select(i => 340 - (i * 110.0 / 12))]);
        var up = Leg(talk, [.. Enumerable.Range(0, 13).Select(i => 230 + (i * 110.0 / 12))]);
        Assert.InRange(talk.Time.Elapsed.TotalMinutes, 20, 60);

        foreach (var leg in new[] { down, up })
        {
            // Sensors read 40 mK high at most and the noise is some 1e-5: the slope of the model stands within 2 meV.
            Assert.InRange(SlopeEV([.. leg.Where(p => p.TemperatureK > 293)]), 0.376, 0.388);
        }
        foreach (var (cooling, warming) in down.Zip(up.Reverse()))
            Assert.InRange(Math.Log(cooling.ConductanceS / warming.ConductanceS), -0.01, 0.01);
    }

    private static (double TemperatureK, double ConductanceS)[] Leg(DeviceTalk talk, double[] targetsK) =>
        [.. targetsK.Select(targetK => Point(talk, targetK))];

    private static (double TemperatureK, double ConductanceS) Point(DeviceTalk talk, double targetK)
    {
        talk.Tell("controller", FormattableString.Invariant($"SOUR:TEMP:SPO {targetK}"));
        var goodSince = talk.Time.Elapsed;
        while (talk.Time.Elapsed - goodSince < TimeSpan.FromSeconds(40))
        {
            talk.Wait(0.5);
            var t = talk.Numbers("controller", "MEAS:TEMP? (@1);:MEAS:TEMP? (@2)");
            if (Math.Abs(t[0] - targetK) > 0.03 || Math.Abs(t[1] - t[0]) > 0.05) goodSince = talk.Time.Elapsed;
            Assert.True(talk.Time.Elapsed < TimeSpan.FromHours(2), "the holder never settles");
        }
        talk.Tell("meter", "SENS:CURR:RANG 1E-3");
        talk.Tell("meter", "SOUR:VOLT 0.2");
        talk.Tell("meter", FormattableString.Invariant($"SENS:CURR:RANG {talk.Read().CurrentA * 1.2}"));
        talk.Wait(2);
        var plusA = Enumerable.Range(0, 5).Average(_ => talk.Read().CurrentA);
        talk.Tell("meter", "SOUR:VOLT -0.2");
        talk.Wait(1);
        var minusA = Enumerable.Range(0, 5).Average(_ => talk.Read().CurrentA);
        return (talk.Numbers("controller", "MEAS:TEMP? (@2)")[0], (plusA - minusA) / 0.4);
    }

    private static double SlopeEV((double TemperatureK, double ConductanceS)[] points)
    {
        var x = points.Select(p => 1 / (BoltzmannEVPerK * p.TemperatureK)).ToArray();
        var y = points.Select(p => Math.Log(p.ConductanceS)).ToArray();
        var (xm, ym) = (x.Average(), y.Average());
        return -x.Zip(y, (a, b) => (a - xm) * (b - ym)).Sum() / x.Sum(a => (a - xm) * (a - xm));
    }
}
