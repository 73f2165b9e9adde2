namespace Acquire.Simulator.Thermal;

/// <summary>A thermal link whose conductance follows a power of the mean temperature of its ends.</summary>
/// <param name="At300WPerK">Conductance at 300 K [W/K].</param>
/// <param name="Exponent">Power of temperature; 0 keeps it constant.</param>
public sealed record HeatLink(double At300WPerK, double Exponent)
{
    /// <summary>Conductance [W/K] between ends at two temperatures [K].</summary>
    public double ConductanceWPerK(double oneK, double otherK) =>
        Exponent == 0 ? At300WPerK : At300WPerK * Math.Pow((oneK + otherK) / 600, Exponent);

    /// <summary>Heat flow from one end to the other [W].</summary>
    public double FlowW(double fromK, double toK) => ConductanceWPerK(fromK, toK) * (fromK - toK);
}
