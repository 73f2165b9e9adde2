using Acquire.Bench.Readings;
using Acquire.Bench.Roles;
using Acquire.Bench.Time;
using Acquire.Interlocks;
using Acquire.Runs.Plans;
using Acquire.Runs.Records;
using Acquire.Simulator.Time;
using Acquire.Sweep.Engine;
using Microsoft.Extensions.Logging.Abstractions;
using Xunit;

namespace Acquire.Sweep.Tests.Engine;

public sealed class EngineUnderFaultTests : IAsyncDisposable
{
    private readonly VirtualTime _time = new(new DateTimeOffset(2026, 1, 1, 0, 0, 0, TimeSpan.Zero));
    private readonly List<string> _told = [];
    private readonly MemoryRecorder _record = new();
    private readonly FakeLoop _loop;
    private readonly FakeMeter _meter;
    private readonly FakeLamp _lamp;

    public EngineUnderFaultTests()
    {
        (_loop, _meter, _lamp) = (new(_told), new(_told, _time.Clock), new(_told));
    }

    public ValueTask DisposeAsync() => _record.DisposeAsync();

    [Fact]
    public void QuietBench_WholePlan_CompletesSafe()
    {
        Assert.Equal("completed", Run(GoTo(310), Dark()));
        Assert.Equal(1e-5, Assert.Single(_record.Points).ConductanceS, 1e-12);
        Assert.False(_loop.HeaterOn || _meter.OutputOn || _lamp.On);
    }

    [Fact]
    public void FirstPoll_ThatTakesTimeAsOnEveryRealLink_IsWaitedForAndTripsNothing()
    {
        var answered = 0;
        _loop.OnRead = async (_, targetK, cancellation) =>
        {
            await Task.Delay(TimeSpan.FromSeconds(0.1), _time.Clock, cancellation);
            answered++;
            return FakeLoop.Steady(targetK);
        };
        _loop.OnHeater = on => Assert.True(!on || answered > 0, "the heater was energised before any temperature was known");
        Assert.True(Run(GoTo(310)) == "completed", Trips());
    }

    [Fact]
    public void Poll_ThatNeverReturns_TripsAndSwitchesTheHeaterOff()
    {
        _loop.OnRead = (poll, targetK, _) => poll < 10 ? new(FakeLoop.Steady(targetK)) : new(new TaskCompletionSource<LoopReading>().Task);
        var end = RunBounded(120, GoTo(310, windowS: 600));
        Assert.False(_loop.HeaterOn, $"heater still on 120 s after the last temperature; outcome {end ?? "none"}");
    }

    [Fact]
    public void Monitor_ThatThrows_SwitchesTheHeaterOff()
    {
        _loop.OnRead = (poll, targetK, _) => poll < 10 ? new(FakeLoop.Steady(targetK)) : throw new InvalidOperationException("a broken contract");
        var end = RunBounded(120, GoTo(310, windowS: 600));
        Assert.False(_loop.HeaterOn, $"heater still on 120 s after the monitor died; outcome {end ?? "none"}");
    }

    [Fact]
    public void Sequence_ThatThrows_SwitchesEverythingOff()
    {
        _meter.OnRead = () => throw new IOException("the link is gone");
        var end = RunBounded(600, GoTo(310), Dark());
        Assert.False(_loop.HeaterOn || _meter.OutputOn, $"heater {_loop.HeaterOn}, bias {_meter.OutputOn}, made safe {_loop.MadeSafe} times; outcome {end ?? "none"}");
    }

    [Fact]
    public void Lamp_ThatDoesNotSwitchOff_IsNotFollowedByADarkPoint()
    {
        _lamp.RefusesToSwitchOff = true;
        var end = Run(GoTo(310), Lit(), Dark(LightState.DarkAfter));
        Assert.DoesNotContain(_record.Points, point => point.Light == LightState.DarkAfter && point.Quality == Quality.Good);
        Assert.NotEqual("completed", end);
    }

    [Fact]
    public void Light_AboveTheBenchsIrradiance_IsRefusedByTheAuthority()
    {
        var asked = Lit() with { IrradianceWPerM2 = 5000 };
        Run(GoTo(310), asked);
        Assert.False(_lamp.DriveA > InventedBench.File.Wiring.Lamp!.RatedDriveA, $"driven at {_lamp.DriveA} A, rated {InventedBench.File.Wiring.Lamp!.RatedDriveA} A");
    }

    [Fact]
    public void OneBadSample_WhileCommandsAreJudged_DoesNotTripAsTwo()
    {
        // Every third sample is bad, never two in a row: nothing may trip, however many commands are judged between ticks.
        _loop.OnRead = (poll, targetK, _) => new(poll > 20 && poll % 3 == 0
            ? FakeLoop.Steady(targetK) with { SampleK = Measured.Bad(Quality.Unreadable, "?") } : FakeLoop.Steady(targetK));
        Assert.True(Run(GoTo(310, windowS: 4), Dark() with { Reversals = 20 }) != "tripped", Trips());
    }

    [Fact]
    public void SlowSample_BothPolarities_AreGivenTheSameTimeToSettle()
    {
        _meter.TimeConstantS = 10;
        Run(GoTo(310), Dark());
        var point = Assert.Single(_record.Points);
        Assert.True(Math.Abs((point.ConductanceS / 1e-5) - 1) < 0.01 || point.Quality != Quality.Good,
            $"G = {point.ConductanceS:G5} S for a true 1E-05 S, half-sum {point.HalfSumA:G3} A, quality {point.Quality}");
    }

    [Fact]
    public void MakeSafe_AskedAgainAfterAnInstrumentRefused_TriesAgain()
    {
        var tries = 0;
        _lamp.OnMakeSafe = () => ++tries == 1 ? CommandOutcome.Failed("busy") : CommandOutcome.Ok;
        var log = new RunLog(_record, _time.Clock, 0, NullLogger.Instance);
        var outputs = new OutputAuthority(new(_loop, _meter, _lamp), InventedBench.File.Limits, () => null, log, _time.Clock);
        _time.Run(async () =>
        {
            Assert.False(await outputs.MakeSafeAsync("first press"));
            Assert.True(await outputs.MakeSafeAsync("second press"));
        });
    }

    [Fact]
    public void HoldForHelp_ThatNobodyAnswers_MakesSafeAndEnds()
    {
        _loop.OnRead = (poll, targetK, _) => new(FakeLoop.Steady(targetK + (poll % 2 == 0 ? 2 : -2)) with { SetPointK = Measured.Good(targetK) });
        Run(GoTo(310, policy: TimeOutPolicy.Hold), Dark());
        Assert.Empty(_record.Points);
    }

    [Fact]
    public void Gate_WithoutAHeaterReading_DoesNotPass()
    {
        _loop.OnRead = (_, targetK, _) => new(FakeLoop.Steady(targetK) with { HeaterW = Measured.Bad(Quality.Unreadable, "?") });
        Run(GoTo(310), Dark());
        Assert.DoesNotContain(_record.Points, point => point.Quality == Quality.Good);
    }

    [Fact]
    public void Gate_WhileTheSampleIsFarFromTheTarget_DoesNotPass()
    {
        _loop.OnRead = (_, targetK, _) => new(FakeLoop.Steady(targetK) with { SampleK = Measured.Good(targetK - 20) });
        Run(GoTo(310), Dark());
        Assert.DoesNotContain(_record.Points, point => point.Quality == Quality.Good);
    }

    [Fact]
    public void Monitor_WhosePollEndsJustBeforeItsDeadline_KeepsTicking()
    {
        // Between two looks at the clock a thread may lose the processor for a moment: here 1.5 ms of bench time, 25 us of real time at pace 60.
        var clock = new HesitatingClock(_time.Clock);
        _loop.OnRead = async (poll, targetK, cancellation) =>
        {
            if (poll > 10)
            {
                clock.HesitationTicks = 15_000;
                await Task.Delay(TimeSpan.FromSeconds(0.470 + (0.0005 * (poll % 60))), _time.Clock, cancellation);
            }

            return FakeLoop.Steady(targetK);
        };
        var end = RunBounded(400, new LoopOnClock(_time, clock), GoTo(310, windowS: 1e6));
        // The gate's time-out of 120 s ends the run; a poll now takes nearly a whole period, so that some ticks are skipped.
        Assert.True(_loop.Polls > 120 && end == "completed", $"the monitor stopped after {_loop.Polls} polls; heater {_loop.HeaterOn}; outcome {end ?? "none"}");
    }

    [Fact]
    public void Recorder_ThatThrowsAtEveryEvent_DoesNotKeepTheHeaterOn()
    {
        _record.OnEvent = _ =>
        {
            if (_loop.HeaterOn)
            {
                throw new InvalidOperationException("the recorder broke its contract");
            }
        };
        var end = RunBounded(600, GoTo(310), Dark());
        Assert.False(_loop.HeaterOn || _meter.OutputOn, $"heater {_loop.HeaterOn}, bias {_meter.OutputOn}, made safe {_loop.MadeSafe} times; outcome {end ?? "none"}");
    }

    [Fact]
    public void OneHotGlitch_FollowedByAnUnansweredPoll_TripsNothing()
    {
        var timedOut = Measured.Bad(Quality.TimedOut);
        _loop.OnRead = (poll, targetK, _) => new(poll switch
        {
            10 => FakeLoop.Steady(targetK) with { StageK = Measured.Good(460) },
            11 => new LoopReading(timedOut, timedOut, timedOut, timedOut),
            _ => FakeLoop.Steady(targetK),
        });
        Assert.True(Run(GoTo(310)) == "completed", Trips());
    }

    private static GoToStep GoTo(double temperatureK, double windowS = 20, TimeOutPolicy policy = TimeOutPolicy.Flag) => new()
    {
        Index = 0,
        Leg = 1,
        Direction = 1,
        EstimateS = 60,
        TemperatureK = temperatureK,
        RampKPerS = 0.1,
        Gate = new(0.15, 0.001, windowS, 120, policy, "explicit"),
    };

    private static MeasureStep Dark(LightState light = LightState.Dark) => new()
    {
        Index = 1,
        Leg = 1,
        Direction = 1,
        EstimateS = 30,
        TemperatureK = 310,
        Light = light,
        BiasV = 0.2,
        Reversals = 2,
        Readings = 10,
        IntegrationCycles = 5,
        ExpectedConductanceS = 1e-5,
        SettledRelative = 0.002,
        SettledWindow = 5,
        SettleTimeOutS = 300,
    };

    private static MeasureStep Lit() => Dark(LightState.Lit) with { WavelengthM = 940e-9, IrradianceWPerM2 = 10 };

    private string Trips() => string.Join(" | ", _record.Events.Where(record => record.Kind == "trip").Select(record => FormattableString.Invariant($"{record.TimeUs * 1e-6:F1} s {record.Text}")));

    private string? Run(params PlanStep[] steps) => RunBounded(7200, steps);

    /// <summary>Runs until the end or a bound of bench time; null when the engine had not ended, or its exception's type.</summary>
    private string? RunBounded(double boundS, params PlanStep[] steps) => RunBounded(boundS, _time, steps);

    private string? RunBounded(double boundS, EngineLoop loop, params PlanStep[] steps)
    {
        using var engine = new SweepEngine(new EngineSetup
        {
            Instruments = new BenchInstruments(_loop, _meter, _lamp),
            Bench = InventedBench.File,
            Plan = new Plan("p", steps, []),
            Interlocks = InterlockTable.For(InventedBench.File),
            Recorder = _record,
            Loop = loop,
            OriginTimestamp = _time.Clock.GetTimestamp(),
            LinkClock = _time.Clock,
            Log = NullLogger.Instance,
        });
        string? end = null;
        _time.Run(async () =>
        {
            var run = engine.RunAsync(CancellationToken.None);
            var bound = Task.Delay(TimeSpan.FromSeconds(boundS), _time.Clock);
            if (await Task.WhenAny(run, bound) == run)
            {
                end = run.IsFaulted ? run.Exception!.InnerException!.GetType().Name : (await run).State;
            }
        });
        return end;
    }
}

/// <summary>Virtual time as seen by a thread that loses the processor at every look at the clock.</summary>
internal sealed class HesitatingClock(TimeProvider clock) : TimeProvider
{
    private long _lostTicks;

    public long HesitationTicks { get; set; }

    public override long TimestampFrequency => clock.TimestampFrequency;

    public override long GetTimestamp() => clock.GetTimestamp() + (_lostTicks += HesitationTicks);

    public override DateTimeOffset GetUtcNow() => clock.GetUtcNow();

    public override ITimer CreateTimer(TimerCallback callback, object? state, TimeSpan dueTime, TimeSpan period) => clock.CreateTimer(callback, state, dueTime, period);
}

/// <summary>A loop with another clock.</summary>
internal sealed class LoopOnClock(EngineLoop loop, TimeProvider clock) : EngineLoop
{
    public override TimeProvider Clock => clock;

    public override bool IsCurrent => loop.IsCurrent;

    public override void Run(Func<Task> main) => loop.Run(main);

    public override void Post(SendOrPostCallback d, object? state) => loop.Post(d, state);
}
