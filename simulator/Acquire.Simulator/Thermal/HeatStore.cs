namespace Acquire.Simulator.Thermal;

/// <summary>Something that stores heat; its heat capacity falls towards the cold as in a solid.</summary>
/// <remarks>
/// Model      C(T) = C300 E(theta/T) / E(theta/300 K), E(x) = x^2 e^x / (e^x - 1)^2
/// Inputs     C300 [J/K], the heat capacity at 300 K; theta [K], Einstein temperature, 0 for a constant heat capacity
/// Source     A. Einstein, Ann. Phys. 327, 180 (1907), 10.1002/andp.19063270110
/// </remarks>
/// <param name="At300JPerK">Heat capacity at 300 K [J/K].</param>
/// <param name="EinsteinK">Einstein temperature [K]; 0 keeps the heat capacity constant.</param>
public sealed record HeatStore(double At300JPerK, double EinsteinK)
{
    private readonly double _highTemperatureJPerK = At300JPerK / Shape(EinsteinK / 300);

    /// <summary>Heat capacity [J/K] at a temperature [K].</summary>
    public double CapacityJPerK(double temperatureK) => _highTemperatureJPerK * Shape(EinsteinK / temperatureK);

    /// <summary>Heat stored between absolute zero and a temperature [J]; the integral of the heat capacity in closed form.</summary>
    public double HeatJ(double temperatureK) => EinsteinK == 0
        ? _highTemperatureJPerK * temperatureK
        : _highTemperatureJPerK * EinsteinK * Math.Exp(-EinsteinK / temperatureK) / Relaxation.Gone(EinsteinK / temperatureK);

    private static double Shape(double x)
    {
        if (x == 0) return 1;
        // The same function, written so that it keeps its digits for small x.
        var root = x / 2 / Math.Sinh(x / 2);
        return root * root;
    }
}
