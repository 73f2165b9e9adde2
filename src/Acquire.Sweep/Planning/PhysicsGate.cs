using Acquire.Physics;
using Acquire.Runs.Plans;
using Acquire.Sweep.Protocols;

namespace Acquire.Sweep.Planning;

/// <summary>Stability criteria from how strongly the conductance answers to temperature.</summary>
/// <remarks>
/// Band       max(0.05 K, 0.0005 T): a recommended default of the field, marked as such
/// Drift      rate with rate * t_measure * Ea/(k T^2) = 0.2 %: what drifts away during one measurement stays below two parts in a thousand
/// Inputs     T [K], Ea [eV], t_measure [s]
/// Source     d ln sigma/dT = Ea/(k T^2) from the Arrhenius law; thresholds are common practice
/// </remarks>
public static class PhysicsGate
{
    private const double AllowedRelative = 0.002;

    /// <summary>Activation energy assumed when the material is unknown [eV]; common practice for a first survey.</summary>
    public const double DefaultEnergyEV = 0.5;

    /// <summary>Band [K].</summary>
    public static double BandK(double temperatureK) => Math.Max(0.05, 0.0005 * temperatureK);

    /// <summary>Largest drift [K/s].</summary>
    public static double DriftKPerS(double temperatureK, double activationEV, double measureS) =>
        AllowedRelative / (measureS * TemperatureSensitivity.PerKelvin(activationEV, temperatureK));

    /// <summary>The gate of one temperature.</summary>
    public static StabilityGate At(double temperatureK, double activationEV, double measureS, ProtocolSettling settling)
    {
        var band = double.IsNaN(settling.BandK) ? BandK(temperatureK) : settling.BandK;
        var drift = double.IsNaN(settling.DriftKPerS) ? DriftKPerS(temperatureK, activationEV, measureS) : settling.DriftKPerS;
        var rule = double.IsNaN(settling.DriftKPerS) ? FormattableString.Invariant($"physics, Ea {activationEV:F3} eV, {measureS:F1} s a measurement") : "explicit";
        return new(band, drift, settling.WindowS, settling.TimeOutS, settling.OnTimeOut, rule);
    }
}
