using System.Globalization;
using System.Text.Json;
using Acquire.Bench.Readings;
using Acquire.Runs.Plans;
using Acquire.Runs.Records;
using Acquire.Sweep.Gates;
using Acquire.Sweep.Measuring;

namespace Acquire.Sweep.Engine;

/// <summary>Where the sequence is; read by the status.</summary>
public sealed class SequencePlace
{
    /// <summary>Step under way.</summary>
    public PlanStep? Step { get; set; }

    /// <summary>Phase in words.</summary>
    public string Phase { get; set; } = "starting";

    /// <summary>What is being waited for.</summary>
    public string Waiting { get; set; } = "";

    /// <summary>Target [K].</summary>
    public double TargetK { get; set; } = double.NaN;

    /// <summary>Points finished.</summary>
    public int Points { get; set; }
}

/// <summary>Executes the steps of a plan, one after the other: go to T, settle, measure.</summary>
public sealed class Sequence(EngineSetup setup, RunLog log, OutputAuthority outputs, BenchMonitor monitor, SequencePlace place)
{
    private const double AtTargetK = 1e-3;
    private const double RampSlack = 1.5;
    private const double RampSlackS = 120;
    private const double LampWarmUpS = 600;
    private const int RecoveryReadings = 5;
    private readonly ConductanceMeasurement _measurement = new(setup, log, outputs, monitor);
    private readonly Dictionary<LightState, double> _lastS = [];
    private double _darkPlusA = double.NaN;
    private bool _lampSteady = true;
    private GateResult _gate;
    private StabilityGate? _asked;
    private double _soakS = double.NaN;
    private bool _gateMet;
    private bool _skipMeasurements;

    /// <summary>Completes when the sequence may go on; replaced while an operator holds it.</summary>
    public Func<CancellationToken, Task> HoldAsync { get; set; } = _ => Task.CompletedTask;

    /// <summary>Runs all steps; returns early, with the reason, when a gate's policy says so.</summary>
    public async Task<string?> RunAsync(CancellationToken cancellation)
    {
        foreach (var step in setup.Plan.Steps)
        {
            await HoldAsync(cancellation);
            place.Step = step;
            switch (step)
            {
                case GoToStep goTo:
                    if (await GoToAsync(goTo, cancellation) is { } reason)
                    {
                        return reason;
                    }

                    break;
                case MeasureStep measure when !_skipMeasurements:
                    await MeasureAsync(measure, cancellation);
                    break;
                default:
                    break;
            }
        }

        return null;
    }

    private async Task<string?> GoToAsync(GoToStep step, CancellationToken cancellation)
    {
        (place.Phase, place.TargetK, _asked, _gateMet, _skipMeasurements, _darkPlusA) = ("ramp", step.TemperatureK, step.Gate, false, false, double.NaN);
        log.Event("step", Severity.Note, "sequence", string.Create(CultureInfo.InvariantCulture,
            $"Leg {step.Leg}: to {step.TemperatureK:F2} K at {step.RampKPerS * 60:G4} K/min."));
        var outcome = await outputs.ApproachAsync(step.TemperatureK, step.RampKPerS, cancellation);
        if (!outcome.Done)
        {
            throw new StepFailedException(outcome.Problem ?? "The controller refused the set point.");
        }

        await RampAsync(step, cancellation);
        return await SoakAsync(step, cancellation);
    }

    private async Task RampAsync(GoToStep step, CancellationToken cancellation)
    {
        var startS = log.NowS;
        var distanceK = Math.Abs(step.TemperatureK - (double.IsFinite(monitor.Last.StageK) ? monitor.Last.StageK : step.TemperatureK));
        var boundS = (RampSlack * distanceK / step.RampKPerS) + RampSlackS;
        while (!(Math.Abs(monitor.SetPointK - step.TemperatureK) <= AtTargetK) && log.NowS - startS <= boundS)
        {
            place.Waiting = string.Create(CultureInfo.InvariantCulture, $"ramp at {monitor.SetPointK:F1} K");
            await monitor.NextTickAsync(cancellation);
        }
    }

    private async Task<string?> SoakAsync(GoToStep step, CancellationToken cancellation)
    {
        place.Phase = "soak";
        var startS = log.NowS;
        var gate = new TemperatureGate(step.Gate, step.TemperatureK);
        do
        {
            await monitor.NextTickAsync(cancellation);
            _gate = gate.Add(monitor.Last);
            place.Waiting = _gate.Waiting;
        }
        while (!_gate.Passed && log.NowS - startS <= step.Gate.TimeOutS);

        (_soakS, _gateMet, place.Waiting) = (log.NowS - startS, _gate.Passed, "");
        return _gate.Passed ? null : await TimedOutAsync(step, cancellation);
    }

    private async Task<string?> TimedOutAsync(GoToStep step, CancellationToken cancellation)
    {
        var text = string.Create(CultureInfo.InvariantCulture,
            $"{step.TemperatureK:F2} K was not steady within {step.Gate.TimeOutS:F0} s: {_gate.Waiting}.");
        log.Event("gate", Severity.Warning, "sequence", $"{text} Policy: {step.Gate.OnTimeOut.ToString().ToLowerInvariant()}.");
        switch (step.Gate.OnTimeOut)
        {
            case TimeOutPolicy.Skip:
                _skipMeasurements = true;
                return null;
            case TimeOutPolicy.Hold:
                return await HoldForHelpAsync(step, cancellation) ? null : text + " Nobody came.";
            case TimeOutPolicy.End:
                return text;
            default:
                return null;
        }
    }

    /// <summary>Waits at the temperature until the gate is met after all or a person ends the run; bounded by ten gate time-outs. True when it is met.</summary>
    private async Task<bool> HoldForHelpAsync(GoToStep step, CancellationToken cancellation)
    {
        log.Event("gate", Severity.Alarm, "sequence", "Holding the temperature and waiting for a person.");
        var gate = new TemperatureGate(step.Gate, step.TemperatureK);
        var startS = log.NowS;
        while (!_gate.Passed && log.NowS - startS <= 10 * step.Gate.TimeOutS)
        {
            await monitor.NextTickAsync(cancellation);
            _gate = gate.Add(monitor.Last);
            place.Waiting = "held for help: " + _gate.Waiting;
        }

        _gateMet = _gate.Passed;
        place.Waiting = "";
        return _gateMet;
    }

    private async Task MeasureAsync(MeasureStep step, CancellationToken cancellation)
    {
        place.Phase = step.Light switch { LightState.Lit => "lit", LightState.DarkAfter => "dark after light", _ => "dark" };
        string? recovery = null;
        var expectedS = double.IsFinite(step.ExpectedConductanceS) && !_lastS.ContainsKey(step.Light) ? step.ExpectedConductanceS : _lastS.GetValueOrDefault(step.Light, step.ExpectedConductanceS);
        try
        {
            if (step.Light == LightState.Lit)
            {
                await LightAsync(step, cancellation);
            }
            else if (step.Light == LightState.DarkAfter && double.IsFinite(step.RecoverRelative))
            {
                recovery = await RecoverAsync(step, cancellation);
            }

            var startUs = log.NowUs;
            var result = await _measurement.RunAsync(step, expectedS, text => place.Waiting = text, cancellation);
            await monitor.NextTickAsync(cancellation); // so that a tick lies behind the last reading, however short the point was
            await RecordAsync(step, result, startUs, recovery, cancellation);
        }
        finally
        {
            if (step.Light == LightState.Lit)
            {
                await LightOffAsync();
            }
        }
    }

    private async Task LightOffAsync()
    {
        if (outputs.IsClosed)
        {
            return; // the bench has been made safe already
        }

        var outcome = await outputs.LightOffAsync(CancellationToken.None);
        if (!outcome.Done && !outputs.IsClosed)
        {
            log.Event("fault", Severity.Alarm, "sequence", $"The light could not be switched off: {outcome.Problem}");
            throw new StepFailedException($"The light could not be switched off: {outcome.Problem}");
        }
    }

    private async Task LightAsync(MeasureStep step, CancellationToken cancellation)
    {
        var outcome = await outputs.LightOnAsync(step.IrradianceWPerM2, cancellation);
        if (!outcome.Done)
        {
            throw new StepFailedException(outcome.Problem ?? "The lamp refused.");
        }

        var steady = new SettledSignal(step.SettledWindow, 5 * step.SettledRelative);
        var startS = log.NowS;
        while (!steady.IsSettled && log.NowS - startS <= LampWarmUpS)
        {
            place.Waiting = "lamp warming up";
            await monitor.NextTickAsync(cancellation);
            steady.Add(monitor.LightMonitorA);
        }

        (_lampSteady, place.Waiting) = (steady.IsSettled, "");
    }

    /// <summary>Waits, bounded, until the dark current is back near its value before the light; says so when it is not.</summary>
    private async Task<string?> RecoverAsync(MeasureStep step, CancellationToken cancellation)
    {
        if (!double.IsFinite(_darkPlusA))
        {
            return "no dark value of this temperature to compare with";
        }

        monitor.MeterAnswered();
        monitor.MeterIsInUse = true;
        await _measurement.PrepareAsync(step, cancellation);
        await _measurement.FindRangeAsync(step, _darkPlusA / step.BiasV, cancellation);
        var startS = log.NowS;
        var relative = double.NaN;
        do
        {
            var currentA = await _measurement.WatchAsync(RecoveryReadings, cancellation);
            relative = Math.Abs((currentA / _darkPlusA) - 1); // the same polarity at the same temperature, so that a background drops out
            place.Waiting = string.Create(CultureInfo.InvariantCulture, $"dark current {relative * 100:F1} % off its value before light, needs {step.RecoverRelative * 100:G3} %");
            await monitor.NextTickAsync(cancellation);
        }
        while (!(relative <= step.RecoverRelative) && log.NowS - startS <= step.RecoverTimeOutS);

        place.Waiting = "";
        return relative <= step.RecoverRelative ? null : string.Create(CultureInfo.InvariantCulture,
            $"dark current still {relative * 100:F1} % off after {step.RecoverTimeOutS:F0} s: persistent photoconductivity");
    }

    private async Task RecordAsync(MeasureStep step, ReversalResult result, long startUs, string? recovery, CancellationToken cancellation)
    {
        var endUs = log.NowUs;
        var means = monitor.History.Over(startUs * 1e-6, endUs * 1e-6);
        for (var wait = 0; means.Count < 2 && wait < 4; wait++)
        {
            await monitor.NextTickAsync(cancellation);
            means = monitor.History.Over(startUs * 1e-6, log.NowS);
        }

        var quality = result.Quality | (_gateMet ? Quality.Good : Quality.UnstableTemperature) | (double.IsFinite(means.SampleK) ? Quality.Good : Quality.Implausible)
            | (recovery is null ? Quality.Good : Quality.Unsettled);
        _lastS[step.Light] = result.ConductanceS;
        if (step.Light == LightState.Dark)
        {
            _darkPlusA = result.Plus.CurrentA;
        }

        if (step.Light == LightState.Lit && !_lampSteady)
        {
            quality |= Quality.Unsettled;
            recovery = "the lamp was not steady";
        }

        var point = PointOf(step, result, (startUs, endUs), means) with { Quality = quality, Reason = Reason(quality, recovery), GatesJson = Gates(result) };
        log.Point(point);
        place.Points++;
        log.Event("point", quality == Quality.Good ? Severity.Note : Severity.Warning, "sequence", string.Create(CultureInfo.InvariantCulture,
            $"Point {point.Index}: {point.SampleK:F3} K {place.Phase} {point.ConductanceS:G6} S, u {point.ConductanceUncertaintyS:G2} S{(point.Reason is null ? "" : ", " + point.Reason)}."));
    }

    private PointRecord PointOf(MeasureStep step, ReversalResult result, (long StartUs, long EndUs) span, in IntervalMeans means) => new()
    {
        Index = place.Points + 1,
        Step = step.Index,
        Leg = step.Leg,
        Direction = step.Direction,
        Light = step.Light,
        StartUs = span.StartUs,
        EndUs = span.EndUs,
        SetPointK = step.TemperatureK,
        StageK = means.StageK,
        SampleK = means.SampleK,
        SampleUncertaintyK = means.SampleSpreadK,
        BiasV = result.BiasV,
        CurrentPlusA = result.Plus.CurrentA,
        CurrentMinusA = result.Minus.CurrentA,
        ConductanceS = result.ConductanceS,
        ConductanceUncertaintyS = result.ConductanceUncertaintyS,
        HalfSumA = result.HalfSumA,
        RangeA = result.RangeA,
        Readings = result.Plus.Count + result.Minus.Count,
        SoakS = _soakS,
        SignalSettleS = result.SettleS,
        WavelengthM = step.WavelengthM,
        IrradianceWPerM2 = step.IrradianceWPerM2,
        MonitorA = means.MonitorA,
        SinceLightS = log.NowS - outputs.LightChangedS,
        Quality = Quality.Good,
        Reason = null,
        GatesJson = "",
    };

    private static string? Reason(Quality quality, string? recovery)
    {
        var reasons = new List<string>();
        foreach (var (bit, words) in new[]
        {
            (Quality.UnstableTemperature, "temperature not steady"), (Quality.Overrange, "overload"), (Quality.Compliance, "source limiting"),
            (Quality.Implausible, "no usable value"), (Quality.TimedOut, "readings timed out"), (Quality.LinkFailed, "link failed"), (Quality.Unreadable, "unreadable replies"),
        })
        {
            if ((quality & bit) != 0)
            {
                reasons.Add(words);
            }
        }

        if (recovery is not null)
        {
            reasons.Add(recovery);
        }
        else if ((quality & Quality.Unsettled) != 0)
        {
            reasons.Add("signal not settled");
        }

        return reasons.Count == 0 ? null : string.Join("; ", reasons);
    }

    private string Gates(ReversalResult result) => JsonSerializer.Serialize(new Dictionary<string, object?>
    {
        ["band_K"] = Finite(_asked?.BandK),
        ["drift_K_per_s"] = Finite(_asked?.RateKPerS),
        ["window_s"] = Finite(_asked?.WindowS),
        ["rule"] = _asked?.Rule ?? "",
        ["met"] = _gateMet,
        ["achieved_distance_K"] = Finite(_gate.LargestDistanceK),
        ["achieved_drift_K_per_s"] = Finite(_gate.DriftKPerS),
        ["signal_settled"] = result.Settled,
    });

    private static double? Finite(double? value) => value is { } number && double.IsFinite(number) ? number : null;
}
