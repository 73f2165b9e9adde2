namespace Acquire.Physics;

/// <summary>A quantity that follows a power of temperature: value(T) = value(300 K) * (T / 300 K)^exponent.</summary>
/// <param name="At300K">Value at 300 K, in the SI unit of the quantity.</param>
/// <param name="Exponent">The exponent; negative for lattice mobilities.</param>
public readonly record struct PowerLaw(double At300K, double Exponent)
{
    /// <summary>The value at a temperature [K].</summary>
    public double At(double temperatureK) => At300K * Math.Pow(temperatureK / 300, Exponent);
}
