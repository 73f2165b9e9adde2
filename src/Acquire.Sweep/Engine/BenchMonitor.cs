using Acquire.Bench.Readings;
using Acquire.Bench.Roles;
using Acquire.Interlocks;
using Acquire.Runs.Records;
using Acquire.Sweep.Gates;

namespace Acquire.Sweep.Engine;

/// <summary>
/// Polls temperatures and light at a fixed period to absolute deadlines, records every reading, and has the interlocks judge: after every poll, and
/// at every tick even while a poll hangs.
/// </summary>
public sealed class BenchMonitor
{
    private const double SaturatedFraction = 0.995;
    private const double SkippedEveryS = 60;
    private readonly EngineSetup _setup;
    private readonly RunLog _log;
    private readonly TimeSpan _period;
    private InterlockState _interlocks;
    private SensorState _stage;
    private SensorState _sample;
    private double _controllerS;
    private double _meterS;
    private double _lampS;
    private double _skippedToldS = double.NegativeInfinity;
    private long _skipped;
    private bool _ended;
    private TaskCompletionSource? _next;

    public BenchMonitor(EngineSetup setup, RunLog log)
    {
        _setup = setup;
        _log = log;
        _period = TimeSpan.FromSeconds(setup.Bench.MonitorPeriodS);
        var nowS = log.NowS;
        _interlocks = InterlockState.Start(setup.Interlocks);
        _stage = SensorState.NotYet(nowS);
        _sample = SensorState.NotYet(nowS);
        _controllerS = _meterS = _lampS = nowS;
    }

    /// <summary>The temperatures of the last ticks.</summary>
    public MonitorHistory History { get; } = new();

    /// <summary>The last tick.</summary>
    public GateTick Last { get; private set; } = new(double.NegativeInfinity, double.NaN, double.NaN, true);

    /// <summary>The set point the controller is working to [K]; NaN when unknown.</summary>
    public double SetPointK { get; private set; } = double.NaN;

    /// <summary>The light monitor [A]; NaN without a lamp.</summary>
    public double LightMonitorA { get; private set; } = double.NaN;

    /// <summary>The interlocks' memory.</summary>
    public InterlockState Interlocks => _interlocks;

    /// <summary>True while the sequence is measuring: a meter that nobody asks cannot be silent.</summary>
    public bool MeterIsInUse { get; set; }

    /// <summary>Called when rows trip, once for each evaluation that adds some.</summary>
    public Action<IReadOnlyList<Trip>>? Tripped { get; set; }

    /// <summary>Judges now, before a command: why nothing may be energised, or null.</summary>
    public string? WhyNot()
    {
        if (!_ended)
        {
            Judge(newSample: false);
        }

        return _interlocks.FirstOut?.Text ?? (_ended ? "the monitor has ended" : null);
    }

    /// <summary>The source-meter answered just now.</summary>
    public void MeterAnswered() => _meterS = _log.NowS;

    /// <summary>Completes after the next poll, or when <see cref="Wake"/> is called; throws when cancelled or when the monitor has ended.</summary>
    public async Task NextTickAsync(CancellationToken cancellation)
    {
        // Awaited as it is: the continuation is posted to the loop, so that nothing runs inside the tick. A WaitAsync would pass through the
        // thread pool.
        if (!_ended)
        {
            _next ??= new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
            await _next.Task;
        }

        cancellation.ThrowIfCancellationRequested();
        if (_ended)
        {
            throw new OperationCanceledException("The monitor has ended.");
        }
    }

    /// <summary>Wakes whoever waits for a tick, because what they wait for will not come.</summary>
    public void Wake()
    {
        var waiting = _next;
        _next = null;
        waiting?.TrySetResult();
    }

    /// <summary>Ticks until cancelled. Throws when one of its loops fails; the engine makes the bench safe then.</summary>
    public async Task RunAsync(CancellationToken cancellation)
    {
        List<Task> loops = [EveryAsync(PollLoopAsync, cancellation), EveryAsync(JudgeTickAsync, cancellation)];
        if (_setup.Instruments.Lamp is { } lamp)
        {
            loops.Add(EveryAsync(token => PollLampAsync(lamp, token), cancellation));
        }

        try
        {
            await await Task.WhenAny(loops);
        }
        finally
        {
            _ended = true;
            Wake();
        }
    }

    /// <summary>Runs an action at t0 + k * period: a stall loses ticks, never the grid.</summary>
    private async Task EveryAsync(Func<CancellationToken, ValueTask> action, CancellationToken cancellation)
    {
        var clock = _setup.Loop.Clock;
        var start = clock.GetTimestamp();
        for (long tick = 0; !cancellation.IsCancellationRequested;)
        {
            try
            {
                await action(cancellation);
            }
            catch (OperationCanceledException) when (cancellation.IsCancellationRequested)
            {
                return;
            }

            var elapsed = clock.GetElapsedTime(start); // read once: a second look may be later
            var due = Math.Max(tick + 1, (long)Math.Floor(elapsed / _period) + 1);
            Skipped(due - tick - 1);
            tick = due;
            var wait = (_period * due) - elapsed;
            await Task.Delay(wait > TimeSpan.Zero ? wait : TimeSpan.Zero, clock, cancellation).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing | ConfigureAwaitOptions.ContinueOnCapturedContext);
        }
    }

    private void Skipped(long ticks)
    {
        _skipped += ticks;
        if (ticks > 0 && _log.NowS - _skippedToldS >= SkippedEveryS)
        {
            _skippedToldS = _log.NowS;
            _log.Event("clock", Severity.Note, "monitor", FormattableString.Invariant($"{_skipped} ticks skipped so far."));
        }
    }

    private async ValueTask PollLoopAsync(CancellationToken cancellation)
    {
        var from = _log.NowUs;
        var poll = await _setup.Instruments.Loop.ReadAsync(cancellation);
        var to = _log.NowUs;
        var nowS = to * 1e-6;
        _log.Reading(EngineChannels.Stage, from, to, poll.StageK);
        _log.Reading(EngineChannels.Sample, from, to, poll.SampleK);
        _log.Reading(EngineChannels.SetPoint, from, to, poll.SetPointK);
        _log.Reading(EngineChannels.Heater, from, to, poll.HeaterW);
        _stage = _stage.After(poll.StageK, nowS);
        _sample = _sample.After(poll.SampleK, nowS);
        if (Answered(poll.StageK))
        {
            _controllerS = nowS;
        }

        SetPointK = poll.SetPointK.IsGood ? poll.SetPointK.Value : double.NaN;
        var saturated = !poll.HeaterW.IsGood || poll.HeaterW.Value >= SaturatedFraction * _setup.Bench.Limits.HeaterPowerW;
        Last = new(nowS, poll.StageK.IsGood ? poll.StageK.Value : double.NaN, poll.SampleK.IsGood ? poll.SampleK.Value : double.NaN, saturated);
        History.Add(nowS, Last.StageK, Last.SampleK, LightMonitorA);
        Judge(newSample: Answered(poll.StageK)); // an unanswered poll is no new sample: the old one ages
        Wake();
    }

    private async ValueTask PollLampAsync(ILamp lamp, CancellationToken cancellation)
    {
        var from = _log.NowUs;
        var poll = await lamp.ReadAsync(cancellation);
        var to = _log.NowUs;
        _log.Reading(EngineChannels.LampDrive, from, to, poll.DriveA);
        _log.Reading(EngineChannels.LampMonitor, from, to, poll.MonitorA);
        LightMonitorA = poll.MonitorA.IsGood ? poll.MonitorA.Value : double.NaN;
        if (Answered(poll.DriveA))
        {
            _lampS = to * 1e-6;
        }
    }

    private ValueTask JudgeTickAsync(CancellationToken cancellation)
    {
        Judge(newSample: false);
        return ValueTask.CompletedTask;
    }

    private void Judge(bool newSample)
    {
        var nowS = _log.NowS;
        var snapshot = new InterlockSnapshot(_stage, _sample, _controllerS, MeterIsInUse ? _meterS : nowS, _lampS, _log.Health.Failure);
        (_interlocks, var fresh) = InterlockDecision.Decide(_setup.Interlocks, _interlocks, snapshot, nowS, newSample);
        if (fresh.IsEmpty)
        {
            return;
        }

        foreach (var trip in fresh)
        {
            _log.Event("trip", Severity.Trip, "interlocks", (trip == _interlocks.FirstOut ? "First cause: " : "Then: ") + trip.Text, $"{{\"row\":\"{trip.RowId}\"}}");
        }

        Tripped?.Invoke(fresh);
    }

    private static bool Answered(in Measured measured) => (measured.Quality & (Quality.TimedOut | Quality.LinkFailed)) == 0;
}
