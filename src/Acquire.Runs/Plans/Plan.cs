namespace Acquire.Runs.Plans;

/// <summary>The sweep as it will run: a flat list of typed steps with estimates. Stored in the run as JSON.</summary>
/// <param name="Title">The protocol's title.</param>
/// <param name="Steps">The steps in order.</param>
/// <param name="Warnings">What an expert would say before starting.</param>
public sealed record Plan(string Title, IReadOnlyList<PlanStep> Steps, IReadOnlyList<string> Warnings)
{
    /// <summary>Expected duration of the whole sweep [s].</summary>
    public double DurationS => Steps.Sum(step => step.EstimateS);

    /// <summary>Number of measured points.</summary>
    public int Points => Steps.Count(step => step is MeasureStep);
}

/// <summary>One step of a plan.</summary>
public abstract record PlanStep
{
    /// <summary>Position in the plan, from 0.</summary>
    public required int Index { get; init; }

    /// <summary>Number of the leg, from 1; 0 outside legs.</summary>
    public required int Leg { get; init; }

    /// <summary>+1 warming, -1 cooling, 0 neither.</summary>
    public required int Direction { get; init; }

    /// <summary>Expected duration [s].</summary>
    public required double EstimateS { get; init; }
}

/// <summary>What happens when a gate is not met in time.</summary>
public enum TimeOutPolicy
{
    /// <summary>Measure and flag the point.</summary>
    Flag = 0,

    /// <summary>Leave the point out.</summary>
    Skip = 1,

    /// <summary>Hold the temperature and wait for a person (bounded; then make safe and end).</summary>
    Hold = 2,

    /// <summary>Make safe and end the run.</summary>
    End = 3,
}

/// <summary>Drive the stage to a temperature and wait until the stability gate is met.</summary>
public sealed record GoToStep : PlanStep
{
    /// <summary>Target [K].</summary>
    public required double TemperatureK { get; init; }

    /// <summary>Rate of the ramp [K/s].</summary>
    public required double RampKPerS { get; init; }

    /// <summary>The gate that ends the soak.</summary>
    public required StabilityGate Gate { get; init; }
}

/// <summary>The four-part stability gate; the signal's own part stands in the measuring step.</summary>
/// <param name="BandK">Largest distance of the sample sensor's window mean, and of each stage reading, from the target [K].</param>
/// <param name="RateKPerS">Largest least-squares slope of the sample temperature over the window [K/s].</param>
/// <param name="WindowS">Length of the window over which all parts must hold [s].</param>
/// <param name="TimeOutS">Bound on the wait, counted from the end of the ramp [s].</param>
/// <param name="OnTimeOut">What to do then.</param>
/// <param name="Rule">Where the numbers come from: <c>physics, Ea 0.33 eV</c> or <c>explicit</c>.</param>
public sealed record StabilityGate(double BandK, double RateKPerS, double WindowS, double TimeOutS, TimeOutPolicy OnTimeOut, string Rule);

/// <summary>Measure the conductance by reversing the bias, in the dark or under light.</summary>
public sealed record MeasureStep : PlanStep
{
    /// <summary>Temperature of the point [K].</summary>
    public required double TemperatureK { get; init; }

    /// <summary>Light on the sample.</summary>
    public required Records.LightState Light { get; init; }

    /// <summary>Bias magnitude [V].</summary>
    public required double BiasV { get; init; }

    /// <summary>Pairs of polarities.</summary>
    public required int Reversals { get; init; }

    /// <summary>Readings per polarity and pair.</summary>
    public required int Readings { get; init; }

    /// <summary>Integration per reading, power-line cycles.</summary>
    public required double IntegrationCycles { get; init; }

    /// <summary>Expected conductance [S], from which the first range follows; NaN when unknown.</summary>
    public required double ExpectedConductanceS { get; init; }

    /// <summary>Settled-signal test: largest relative change between the means of adjacent windows.</summary>
    public required double SettledRelative { get; init; }

    /// <summary>Readings per window of the settled-signal test, at least 5.</summary>
    public required int SettledWindow { get; init; }

    /// <summary>Bound on the wait for a settled signal [s]; then the point is flagged.</summary>
    public required double SettleTimeOutS { get; init; }

    /// <summary>Wavelength of the light [m]; NaN in the dark.</summary>
    public double WavelengthM { get; init; } = double.NaN;

    /// <summary>Irradiance [W/m2]; NaN in the dark.</summary>
    public double IrradianceWPerM2 { get; init; } = double.NaN;

    /// <summary>For a dark point after light: relative distance to the dark value before at which it counts as recovered; NaN when not asked.</summary>
    public double RecoverRelative { get; init; } = double.NaN;

    /// <summary>Bound on the wait for recovery [s].</summary>
    public double RecoverTimeOutS { get; init; }
}

/// <summary>Bring the bench to its end state: light off, bias 0, heater off, logging on until the end is recorded.</summary>
public sealed record FinishStep : PlanStep;
