using System.Globalization;
using Acquire.Bench.Files;
using Acquire.Bench.Roles;
using Acquire.Runs.Records;

namespace Acquire.Sweep.Engine;

/// <summary>
/// The only object that may energise heater, bias or light. It asks the interlocks at every command, holds every value against the bench's
/// limits, and once it has made the bench safe it energises nothing again.
/// </summary>
public sealed class OutputAuthority(
    BenchInstruments instruments, BenchLimits limits, Func<string?> whyNot, RunLog log, TimeProvider linkClock, LampWiring? wiring = null)
{
    private static readonly TimeSpan MakeSafeBound = TimeSpan.FromSeconds(30);
    private bool _closed;
    private Task<bool>? _makingSafe;

    /// <summary>True once the bench was made safe: for good, within this run.</summary>
    public bool IsClosed => _closed;

    /// <summary>When the light last changed [s], monotonic; NaN when it never was on.</summary>
    public double LightChangedS { get; private set; } = double.NaN;

    /// <summary>True while the light is commanded on.</summary>
    public bool LightIsOn { get; private set; }

    /// <summary>Sends the controller to a temperature and switches the heater on.</summary>
    public async ValueTask<CommandOutcome> ApproachAsync(double temperatureK, double rampKPerS, CancellationToken cancellation)
    {
        if (Refusal("set point", temperatureK >= limits.TemperatureFromK && temperatureK <= limits.TemperatureToK, temperatureK, "K",
            string.Create(CultureInfo.InvariantCulture, $"{limits.TemperatureFromK:G6} to {limits.TemperatureToK:G6} K")) is { } refused)
        {
            return refused;
        }

        if (Refusal("ramp", rampKPerS > 0 && rampKPerS <= limits.RampKPerS * (1 + 1e-9), rampKPerS * 60, "K/min",
            string.Create(CultureInfo.InvariantCulture, $"at most {limits.RampKPerS * 60:G6} K/min")) is { } fast)
        {
            return fast;
        }

        var set = await instruments.Loop.SetPointAsync(temperatureK, rampKPerS, cancellation);
        if (!set.Done || _closed)
        {
            return _closed ? Closed() : set;
        }

        return await instruments.Loop.HeaterAsync(true, cancellation);
    }

    /// <summary>Applies a bias, of either sign.</summary>
    public async ValueTask<CommandOutcome> BiasAsync(double biasV, CancellationToken cancellation) =>
        Refusal("bias", Math.Abs(biasV) <= limits.BiasV, biasV, "V", string.Create(CultureInfo.InvariantCulture, $"up to {limits.BiasV:G6} V of either sign"))
        ?? await instruments.Meter.SetBiasAsync(biasV, cancellation);

    /// <summary>Switches the bias output.</summary>
    public async ValueTask<CommandOutcome> OutputAsync(bool on, CancellationToken cancellation) =>
        (on ? Refusal("bias output", true, 1, "", "") : null) ?? await instruments.Meter.OutputAsync(on, cancellation);

    /// <summary>Switches the light on at an irradiance on the sample [W/m2].</summary>
    public async ValueTask<CommandOutcome> LightOnAsync(double irradianceWPerM2, CancellationToken cancellation)
    {
        if (instruments.Lamp is not { } lamp || wiring is null)
        {
            return CommandOutcome.Failed("Light refused: the bench has no lamp.");
        }

        var most = Math.Min(limits.IrradianceWPerM2, wiring.IrradianceAtRatedWPerM2);
        if (Refusal("light", irradianceWPerM2 > 0 && irradianceWPerM2 <= most * (1 + 1e-9), irradianceWPerM2, "W/m2",
            string.Create(CultureInfo.InvariantCulture, $"at most {most:G6} W/m2")) is { } refused)
        {
            return refused;
        }

        var driveA = wiring.RatedDriveA * irradianceWPerM2 / wiring.IrradianceAtRatedWPerM2;
        var set = await lamp.SetDriveAsync(driveA, cancellation);
        if (!set.Done || _closed)
        {
            return _closed ? Closed() : set;
        }

        LightIsOn = true;
        LightChangedS = log.NowS;
        return await lamp.OutputAsync(true, cancellation);
    }

    /// <summary>Switches the light off; never refused.</summary>
    public async ValueTask<CommandOutcome> LightOffAsync(CancellationToken cancellation)
    {
        if (instruments.Lamp is not { } lamp)
        {
            return CommandOutcome.Ok;
        }

        var outcome = await lamp.OutputAsync(false, cancellation);
        if (LightIsOn)
        {
            LightIsOn = false;
            LightChangedS = log.NowS;
        }

        return outcome;
    }

    /// <summary>
    /// Heater off, bias 0, light off, all instruments at once, with right of way over whatever is in flight, bounded. One that fails does not stop the
    /// others. What was done is recorded. True when every instrument confirmed.
    /// </summary>
    public Task<bool> MakeSafeAsync(string because)
    {
        _closed = true;
        // Pressed again after an instrument refused, it tries again; while one attempt is under way it is that one.
        if (_makingSafe is null || (_makingSafe.IsCompleted && !(_makingSafe.IsCompletedSuccessfully && _makingSafe.Result)))
        {
            _makingSafe = MakeSafeOnceAsync(because);
        }

        return _makingSafe;
    }

    private async Task<bool> MakeSafeOnceAsync(string because)
    {
        using var bound = new CancellationTokenSource(MakeSafeBound, linkClock);
        var tasks = instruments.All.Select(instrument => MakeSafeAsync(instrument, bound.Token)).ToList(); // first act, then write about it
        log.Event("safe", Severity.Note, "engine", $"Making the bench safe: {because}");
        var confirmed = await Task.WhenAll(tasks);
        LightIsOn = false;
        var all = Array.TrueForAll(confirmed, one => one);
        log.Event("safe", all ? Severity.Note : Severity.Alarm, "engine",
            all ? "Heater off, bias 0, light off: every instrument confirmed." : "Not every instrument confirmed that it is off. Check the bench by hand.");
        return all;
    }

    private async Task<bool> MakeSafeAsync(IInstrument instrument, CancellationToken cancellation)
    {
        string problem;
        try
        {
            var outcome = await instrument.MakeSafeAsync(cancellation);
            if (outcome.Done)
            {
                return true;
            }

            problem = outcome.Problem ?? "no reason given";
        }
        catch (OperationCanceledException)
        {
            problem = $"no confirmation within {MakeSafeBound.TotalSeconds:F0} s";
        }
        catch (Exception fault)
        {
            problem = fault.Message; // whatever it was, the other instruments still have to be made safe
        }

        log.Event("fault", Severity.Alarm, instrument.Name, $"{instrument.Name} at {instrument.Address} did not confirm make-safe: {problem}");
        return false;
    }

    private CommandOutcome? Refusal(string what, bool inside, double value, string unit, string allowed)
    {
        if (_closed)
        {
            return Closed();
        }

        if (whyNot() is { } reason)
        {
            return CommandOutcome.Failed($"The {what} was refused: {reason}");
        }

        return inside ? null : CommandOutcome.Failed(string.Create(CultureInfo.InvariantCulture,
            $"The {what} of {value:G6} {unit} was refused: allowed is {allowed}. Change the protocol, or the limit in the bench file."));
    }

    private static CommandOutcome Closed() => CommandOutcome.Failed("Refused: the bench has been made safe, and nothing is energised again in this run.");
}
