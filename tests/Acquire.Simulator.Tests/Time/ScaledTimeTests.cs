using Acquire.Simulator.Time;

namespace Acquire.Simulator.Tests.Time;

public sealed class ScaledTimeTests
{
    private static readonly DateTimeOffset Start = new(2026, 10, 1, 20, 0, 0, TimeSpan.Zero);

    [Fact]
    public void Clock_SixtyTimesFaster_ShowsAnHourAfterAMinute()
    {
        var life = new VirtualTime(Start);
        var scaled = new ScaledTime(life.Clock, 60);
        var started = scaled.GetTimestamp();
        life.Run(() => Task.Delay(TimeSpan.FromMinutes(1), life.Clock));
        Assert.Equal(TimeSpan.FromHours(1), scaled.GetElapsedTime(started));
        Assert.Equal(Start.AddHours(1), scaled.GetUtcNow());
    }

    [Theory]
    [InlineData(1)]
    [InlineData(7)]
    [InlineData(60)]
    public void Wait_AnyPace_IsNeverEarlyAndAtMostOneRealMillisecondLate(double pace)
    {
        var life = new VirtualTime(Start);
        var scaled = new ScaledTime(life.Clock, pace);
        life.Run(async () =>
        {
            for (var ms = 1; ms < 2000; ms += 37)
            {
                var started = scaled.GetTimestamp();
                await Task.Delay(TimeSpan.FromMilliseconds(ms), scaled);
                var waitedMs = scaled.GetElapsedTime(started).TotalMilliseconds;
                Assert.InRange(waitedMs, ms - 0.001, ms + pace);
            }
        });
    }

    [Theory]
    [InlineData(0)]
    [InlineData(-1)]
    [InlineData(double.NaN)]
    public void Clock_PaceNotPositive_IsRefused(double pace) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => new ScaledTime(TimeProvider.System, pace));
}
