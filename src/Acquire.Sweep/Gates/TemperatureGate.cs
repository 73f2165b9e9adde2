using Acquire.Runs.Plans;

namespace Acquire.Sweep.Gates;

/// <summary>One monitor tick as the gate sees it.</summary>
/// <param name="AtS">When [s], monotonic.</param>
/// <param name="StageK">Stage temperature [K]; NaN when the reading was not good.</param>
/// <param name="SampleK">Sample temperature [K]; NaN when the reading was not good.</param>
/// <param name="Saturated">True when the heater was at its limit, or its power could not be read.</param>
public readonly record struct GateTick(double AtS, double StageK, double SampleK, bool Saturated);

/// <summary>What the gate found over its window.</summary>
/// <param name="Passed">True when every part holds over the whole window.</param>
/// <param name="SpanS">How much of the window is filled [s].</param>
/// <param name="LargestDistanceK">Largest distance of the stage from the target [K].</param>
/// <param name="DriftKPerS">Least-squares slope of the sample temperature [K/s].</param>
/// <param name="Waiting">What is being waited for, in words; empty when passed.</param>
public readonly record struct GateResult(bool Passed, double SpanS, double LargestDistanceK, double DriftKPerS, string Waiting);

/// <summary>The stability gate over a sliding window: band, drift, no bad reading, no saturation. The fourth part, the signal itself, is the settled-signal test.</summary>
/// <remarks>
/// Drift is the least-squares slope of the sample temperature over the window, time centred before the sums.
/// A NaN anywhere in the window fails the gate; so does a window that is not full.
/// Source: four-part gate of step-and-soak practice; slope: ordinary least squares.
/// </remarks>
public sealed class TemperatureGate
{
    /// <summary>A holder keeps its sample a steady little off the stage; more than this is a fault or a sample still on its way.</summary>
    private const double LargestOffsetK = 1;

    private const double LargestOffsetFraction = 0.02;
    private readonly StabilityGate _gate;
    private readonly double _targetK;
    private readonly Queue<GateTick> _window = new();

    public TemperatureGate(StabilityGate gate, double targetK)
    {
        _gate = gate;
        _targetK = targetK;
    }

    /// <summary>Adds a tick and judges the window that ends with it.</summary>
    public GateResult Add(in GateTick tick)
    {
        _window.Enqueue(tick);
        while (_window.Count > 2 && tick.AtS - _window.Peek().AtS > _gate.WindowS * 1.05)
        {
            _window.Dequeue();
        }

        return Judge(tick.AtS);
    }

    private GateResult Judge(double nowS)
    {
        var spanS = nowS - _window.Peek().AtS;
        var distance = 0.0;
        var saturated = false;
        double meanT = 0, meanK = 0, stageK = 0;
        foreach (var tick in _window)
        {
            // Max gives NaN once a reading was bad, and NaN passes no comparison below.
            distance = Math.Max(distance, Math.Abs(tick.StageK - _targetK));
            saturated |= tick.Saturated;
            meanT += tick.AtS;
            meanK += tick.SampleK;
            stageK += tick.StageK;
        }

        meanT /= _window.Count;
        stageK /= _window.Count;
        meanK /= _window.Count;
        double sxx = 0, sxy = 0;
        foreach (var tick in _window)
        {
            sxx += (tick.AtS - meanT) * (tick.AtS - meanT);
            sxy += (tick.AtS - meanT) * (tick.SampleK - meanK);
        }

        var drift = sxx > 0 ? sxy / sxx : double.NaN;
        var full = spanS >= _gate.WindowS * 0.95;
        var lagK = Math.Abs(meanK - stageK);
        var near = lagK <= Math.Max(LargestOffsetK, LargestOffsetFraction * _targetK);
        var passed = full && distance <= _gate.BandK && Math.Abs(drift) <= _gate.RateKPerS && !saturated && near;
        return new(passed, spanS, distance, drift, passed ? "" : near || double.IsNaN(distance) ? Waiting(full, spanS, distance, drift, saturated)
            : FormattableString.Invariant($"sample {lagK:F1} K off the stage: is its sensor in place?"));
    }

    private string Waiting(bool full, double spanS, double distance, double drift, bool saturated)
    {
        if (!(distance <= _gate.BandK))
        {
            return double.IsNaN(distance)
                ? "a temperature reading was not good"
                : FormattableString.Invariant($"stage {distance:F2} K from the target, needs {_gate.BandK:F2}");
        }

        if (saturated)
        {
            return "heater at its limit, or its power not known";
        }

        return full && !(Math.Abs(drift) <= _gate.RateKPerS)
            ? FormattableString.Invariant($"sample drift {drift * 60:F3} K/min, needs {_gate.RateKPerS * 60:F3}")
            : FormattableString.Invariant($"steady for {spanS:F0} s of {_gate.WindowS:F0} s");
    }
}
