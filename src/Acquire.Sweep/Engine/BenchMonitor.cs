using Acquire.Bench.Readings;
using Acquire.Bench.Roles;
using Acquire.Interlocks;
using Acquire.Runs.Records;
using Acquire.Sweep.Gates;

namespace Acquire.Sweep.Engine;

/// <summary>
/// Polls temperatures, heater and light at a fixed period to absolute deadlines, records every reading, and has the interlocks judge at each tick.
/// </summary>
public sealed class BenchMonitor
{
    private const double SaturatedFraction = 0.995;
    private readonly EngineSetup _setup;
    private readonly RunLog _log;
    private readonly double _startS;
    private InterlockState _interlocks;
    private SensorState _stage;
    private SensorState _sample;
    private double _controllerS;
    private double _meterS;
    private double _lampS;
    private long _skipped;
    private TaskCompletionSource? _next;

    public BenchMonitor(EngineSetup setup, RunLog log)
    {
        _setup = setup;
        _log = log;
        _startS = log.NowS;
        _interlocks = InterlockState.Start(setup.Interlocks);
        _stage = SensorState.NotYet(_startS);
        _sample = SensorState.NotYet(_startS);
        _controllerS = _meterS = _lampS = _startS;
    }

    /// <summary>The temperatures of the last ticks.</summary>
    public MonitorHistory History { get; } = new();

    /// <summary>The last tick.</summary>
    public GateTick Last { get; private set; }

    /// <summary>The set point the controller is working to [K]; NaN when unknown.</summary>
    public double SetPointK { get; private set; } = double.NaN;

    /// <summary>The light monitor [A]; NaN without a lamp.</summary>
    public double LightMonitorA { get; private set; } = double.NaN;

    /// <summary>The interlocks' memory.</summary>
    public InterlockState Interlocks => _interlocks;

    /// <summary>Called when rows trip, once for each evaluation that adds some.</summary>
    public Action<IReadOnlyList<Trip>>? Tripped { get; set; }

    /// <summary>Judges now, before a command: why nothing may be energised, or null.</summary>
    public string? WhyNot()
    {
        Judge();
        return _interlocks.FirstOut?.Text;
    }

    /// <summary>The source-meter answered just now.</summary>
    public void MeterAnswered() => _meterS = _log.NowS;

    /// <summary>Completes after the next tick.</summary>
    public async Task NextTickAsync(CancellationToken cancellation)
    {
        // Awaited as it is: the continuation is posted to the loop, so that nothing runs inside the tick. A WaitAsync would pass through the
        // thread pool, and a tick is never far.
        _next ??= new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        await _next.Task;
        cancellation.ThrowIfCancellationRequested();
    }

    /// <summary>Ticks until cancelled.</summary>
    public async Task RunAsync(CancellationToken cancellation)
    {
        var period = TimeSpan.FromSeconds(_setup.Bench.MonitorPeriodS);
        var clock = _setup.Loop.Clock;
        var start = clock.GetTimestamp();
        for (long tick = 0; !cancellation.IsCancellationRequested;)
        {
            await PollAsync(cancellation);
            Judge();
            Interlocked.Exchange(ref _next, null)?.TrySetResult();

            // Tick k is due at t0 + k * period: a stall loses ticks, never the grid.
            var due = Math.Max(tick + 1, (long)Math.Floor(clock.GetElapsedTime(start) / period) + 1);
            _skipped += due - tick - 1;
            tick = due;
            await Task.Delay((period * due) - clock.GetElapsedTime(start), clock, cancellation).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing | ConfigureAwaitOptions.ContinueOnCapturedContext);
        }

        Interlocked.Exchange(ref _next, null)?.TrySetResult();
        if (_skipped > 0)
        {
            _log.Event("clock", Severity.Note, "monitor", FormattableString.Invariant($"{_skipped} monitor ticks were skipped in this run."));
        }
    }

    private async ValueTask PollAsync(CancellationToken cancellation)
    {
        try
        {
            await PollLoopAsync(cancellation);
            if (_setup.Instruments.Lamp is { } lamp)
            {
                await PollLampAsync(lamp, cancellation);
            }
        }
        catch (OperationCanceledException)
        {
            // The run is ending.
        }

        History.Add(Last.AtS, Last.StageK, Last.SampleK, LightMonitorA);
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
        var saturated = poll.HeaterW.IsGood && poll.HeaterW.Value >= SaturatedFraction * _setup.Bench.Limits.HeaterPowerW;
        Last = new(nowS, poll.StageK.IsGood ? poll.StageK.Value : double.NaN, poll.SampleK.IsGood ? poll.SampleK.Value : double.NaN, saturated);
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

    /// <summary>A meter that nobody asks cannot be silent: outside measurements its silence does not count, so the sequence asks it before it counts on it.</summary>
    private void Judge()
    {
        var nowS = _log.NowS;
        var meterS = MeterIsInUse ? _meterS : nowS;
        var snapshot = new InterlockSnapshot(_stage, _sample, _controllerS, meterS, _lampS, _log.Health.Failure);
        (_interlocks, var fresh) = InterlockDecision.Decide(_setup.Interlocks, _interlocks, snapshot, nowS);
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

    /// <summary>True while the sequence is measuring.</summary>
    public bool MeterIsInUse { get; set; }

    private static bool Answered(in Measured measured) => (measured.Quality & (Quality.TimedOut | Quality.LinkFailed)) == 0;
}
