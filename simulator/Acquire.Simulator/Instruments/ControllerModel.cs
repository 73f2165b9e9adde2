namespace Acquire.Simulator.Instruments;

/// <summary>The constants of a simulated temperature controller.</summary>
public sealed record ControllerModel
{
    /// <summary>Proportional gain [W/K].</summary>
    public required double ProportionalWPerK { get; init; }

    /// <summary>Integral time [s].</summary>
    public required double IntegralTimeS { get; init; }

    /// <summary>Derivative time [s]; acts on the measured temperature.</summary>
    public required double DerivativeTimeS { get; init; }

    /// <summary>Heat capacity that the ramp generator reckons with [J/K]: feed-forward power = this times the ramp.</summary>
    public required double FeedForwardJPerK { get; init; }

    /// <summary>Largest heater power [W].</summary>
    public required double MostPowerW { get; init; }

    /// <summary>Lowest set point that is taken [K].</summary>
    public required double SetFromK { get; init; }

    /// <summary>Highest set point that is taken [K].</summary>
    public required double SetToK { get; init; }

    /// <summary>Fastest ramp that is taken [K/s].</summary>
    public required double MostRampKPerS { get; init; }

    /// <summary>Standard deviation of one reading of a sensor [K].</summary>
    public required double SensorNoiseK { get; init; }

    /// <summary>Smallest step of a displayed temperature [K].</summary>
    public required double ResolutionK { get; init; }

    /// <summary>By how much the stage sensor reads high, the same for all readings [K].</summary>
    public required double StageOffsetK { get; init; }

    /// <summary>By how much the sample sensor reads high, the same for all readings [K].</summary>
    public required double SampleOffsetK { get; init; }
}
