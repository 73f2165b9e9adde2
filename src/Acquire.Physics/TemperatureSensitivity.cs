namespace Acquire.Physics;

/// <summary>How strongly an activated conductance answers to temperature.</summary>
public static class TemperatureSensitivity
{
    /// <summary>d ln sigma / dT = Ea / (k T^2) [1/K] for an activation energy [eV].</summary>
    public static double PerKelvin(double activationEV, double temperatureK) => activationEV / (SI.BoltzmannEVPerK * temperatureK * temperatureK);
}
