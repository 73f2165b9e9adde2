using Acquire.Simulator.Noise;

namespace Acquire.Simulator.Tests.Noise;

public sealed class RelaxingNoiseTests
{
    [Fact]
    public void Wandering_AfterOneCorrelationTime_RemembersOneOverE()
    {
        var relaxing = new RelaxingNoise(new SeededNoise(3), 2);
        const int n = 100_000;
        double squares = 0, products = 0;
        var before = relaxing.At(0);
        for (var i = 1; i <= n; i++)
        {
            var now = relaxing.At(i * 2.0);
            squares += now * now;
            products += now * before;
            before = now;
        }
        Assert.InRange(squares / n, 0.97, 1.03);
        Assert.InRange(products / squares, Math.Exp(-1) - 0.02, Math.Exp(-1) + 0.02);
    }

    [Fact]
    public void Wandering_AskedTwiceAtOneTime_GivesOneValue()
    {
        var relaxing = new RelaxingNoise(new SeededNoise(3), 2);
        Assert.Equal(relaxing.At(1), relaxing.At(1));
    }

    [Fact]
    public void Flicker_TenTimesLongerAverages_DoNotGetTenTimesQuieter()
    {
        // White noise averaged over 100 samples loses a factor of 10 in standard deviation; 1/f noise keeps most of it.
        var flicker = new FlickerNoise(new SeededNoise(5), 0.1, 1000);
        const int groups = 2000;
        double single = 0, averaged = 0;
        for (var g = 0; g < groups; g++)
        {
            var sum = 0.0;
            for (var i = 0; i < 100; i++)
            {
                var x = flicker.At(((g * 100) + i) * 0.1);
                single += x * x;
                sum += x;
            }
            averaged += sum / 100 * (sum / 100);
        }
        var loss = Math.Sqrt(single / (groups * 100) / (averaged / groups));
        Assert.InRange(loss, 1.0, 2.5);
    }
}
