using Acquire.Simulator.Time;
using CsCheck;

namespace Acquire.Simulator.Tests.Time;

public sealed class VirtualTimeTests
{
    private static readonly DateTimeOffset Start = new(2026, 10, 1, 20, 0, 0, TimeSpan.Zero);

    [Fact]
    public void Run_TwelveHoursAtTwoHertz_EndsAtTheLastDeadline()
    {
        var time = new VirtualTime(Start);
        var ticks = 0;
        time.Run(async () =>
        {
            for (; ticks < 86_400; ticks++) await Task.Delay(TimeSpan.FromMilliseconds(500), time.Clock);
        });
        Assert.Equal(86_400, ticks);
        Assert.Equal(TimeSpan.FromHours(12), time.Elapsed);
        Assert.Equal(Start.AddHours(12), time.Clock.GetUtcNow());
        Assert.Equal(0, time.TurnsFromOutside);
    }

    [Fact]
    public void Timers_AnyDueTimes_FireInOrderOfDueTimeThenOfSetting() =>
        Gen.Int[0, 50].Array[1, 40].Sample(dueMs =>
        {
            var time = new VirtualTime(Start);
            var fired = new List<int>();
            time.Run(() => Task.WhenAll(dueMs.Select(async (ms, i) =>
            {
                await Task.Delay(TimeSpan.FromMilliseconds(ms), time.Clock);
                fired.Add(i);
            })));
            var expected = Enumerable.Range(0, dueMs.Length).OrderBy(i => dueMs[i]).ToList();
            Assert.Equal(expected, fired);
        });

    [Fact]
    public void Run_EveryContinuation_StaysOnTheLoop()
    {
        var time = new VirtualTime(Start);
        var thread = Environment.CurrentManagedThreadId;
        time.Run(async () =>
        {
            await Task.Yield();
            Assert.Equal(thread, Environment.CurrentManagedThreadId);
            await Task.Delay(TimeSpan.FromSeconds(1), time.Clock);
            Assert.Equal(thread, Environment.CurrentManagedThreadId);
            Assert.True(time.IsCurrent);
        });
        Assert.False(time.IsCurrent);
    }

    [Fact]
    public void Run_ReadyWork_IsDoneBeforeTheClockMoves()
    {
        var time = new VirtualTime(Start);
        var order = new List<string>();
        time.Run(async () =>
        {
            var wait = Task.Delay(TimeSpan.FromMilliseconds(1), time.Clock);
            for (var i = 0; i < 3; i++)
            {
                await Task.Yield();
                order.Add($"ready at {time.Elapsed.TotalMilliseconds:R}");
            }
            await wait;
            order.Add($"timer at {time.Elapsed.TotalMilliseconds:R}");
        });
        Assert.Equal(["ready at 0", "ready at 0", "ready at 0", "timer at 1"], order);
    }

    [Fact]
    public void Run_CancelledWait_DoesNotMoveTheClock()
    {
        var time = new VirtualTime(Start);
        time.Run(async () =>
        {
            using var cancel = new CancellationTokenSource();
            var wait = Task.Delay(TimeSpan.FromHours(1), time.Clock, cancel.Token);
            // CancelAsync would run the callbacks on a thread of the pool, off the loop.
            cancel.Cancel();
            await Assert.ThrowsAnyAsync<OperationCanceledException>(() => wait);
        });
        Assert.Equal(TimeSpan.Zero, time.Elapsed);
    }

    [Fact]
    public void Run_TimeOutOnTheClock_Fires()
    {
        var time = new VirtualTime(Start);
        Assert.ThrowsAny<OperationCanceledException>(() => time.Run(async () =>
        {
            using var cancel = new CancellationTokenSource(TimeSpan.FromSeconds(2), time.Clock);
            await Task.Delay(Timeout.InfiniteTimeSpan, time.Clock, cancel.Token);
        }));
        Assert.Equal(TimeSpan.FromSeconds(2), time.Elapsed);
    }

    [Fact]
    public void Timer_WithPeriod_FiresOnItsGridUntilDisposed()
    {
        var time = new VirtualTime(Start);
        var at = new List<double>();
        time.Run(async () =>
        {
            var timer = time.Clock.CreateTimer(
                _ => at.Add(time.Elapsed.TotalSeconds), null, TimeSpan.FromSeconds(1), TimeSpan.FromSeconds(2));
            await Task.Delay(TimeSpan.FromSeconds(6), time.Clock);
            await timer.DisposeAsync();
            await Task.Delay(TimeSpan.FromSeconds(6), time.Clock);
        });
        Assert.Equal([1.0, 3.0, 5.0], at);
    }

    [Fact]
    public void Run_NothingToWaitFor_SaysSoInsteadOfHanging()
    {
        var time = new VirtualTime(Start);
        var never = new TaskCompletionSource();
        var problem = Assert.Throws<InvalidOperationException>(() => time.Run(() => never.Task));
        Assert.Contains("nothing is ready and no timer is due", problem.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_LoopThatNeverWaits_SaysThatTimeStandsStill()
    {
        var time = new VirtualTime(Start, new VirtualTimeBounds { TurnsPerInstant = 1000 });
        var problem = Assert.Throws<InvalidOperationException>(() => time.Run(async () =>
        {
            while (true) await Task.Yield();
        }));
        Assert.Contains("stands still", problem.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_FailureInside_IsRethrownAndTheLoopCanBeUsedAgain()
    {
        var time = new VirtualTime(Start);
        Assert.Throws<TimeoutException>(() => time.Run(async () =>
        {
            await Task.Yield();
            throw new TimeoutException();
        }));
        var again = false;
        time.Run(() =>
        {
            again = true;
            return Task.CompletedTask;
        });
        Assert.True(again);
    }
}
