namespace Acquire.Simulator.Instruments;

/// <summary>The constants of a simulated light source.</summary>
public sealed record LampModel
{
    /// <summary>Wavelength [m].</summary>
    public required double WavelengthM { get; init; }

    /// <summary>Drive current at which the irradiance is given [A].</summary>
    public required double RatedDriveA { get; init; }

    /// <summary>Largest drive current that is taken [A].</summary>
    public required double MostDriveA { get; init; }

    /// <summary>Irradiance on the sample at the rated drive, cold [W/m2].</summary>
    public required double IrradianceAtRatedWPerM2 { get; init; }

    /// <summary>Power of the drive current that the light follows.</summary>
    public required double DriveExponent { get; init; }

    /// <summary>Part of the light that is lost when warm at the rated drive.</summary>
    public required double WarmUpLoss { get; init; }

    /// <summary>Time constant of warming up and cooling down [s].</summary>
    public required double WarmUpTimeS { get; init; }

    /// <summary>Relative standard deviation of the slow drift.</summary>
    public required double Drift { get; init; }

    /// <summary>Correlation time of the slow drift [s].</summary>
    public required double DriftTimeS { get; init; }

    /// <summary>Current of the monitor detector at the rated irradiance [A].</summary>
    public required double MonitorAtRatedA { get; init; }

    /// <summary>Noise of the monitor detector [A].</summary>
    public required double MonitorNoiseA { get; init; }
}
