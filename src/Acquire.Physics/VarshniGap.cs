namespace Acquire.Physics;

/// <summary>The energy gap against temperature.</summary>
/// <remarks>
/// Model      Eg(T) = E0 - a T^2 / (T + b)
/// Inputs     E0 [eV], a [eV/K], b [K]; T [K] >= 0
/// Result     Eg [eV], dEg/dT [eV/K]
/// Linear gap Eg*(T) = Eg - T dEg/dT = E0 + a b T^2 / (T + b)^2: the tangent at T extrapolated to 0 K, which is what the slope of
///            ln(n_i T^-1.5) against 1/T measures
/// Valid      empirical; other forms differ by a few meV below 100 K
/// Source     Varshni 1967, Physica 34, 149, eq. (1)
/// </remarks>
/// <param name="ZeroKelvinEV">E0 [eV].</param>
/// <param name="AlphaEVPerK">a [eV/K].</param>
/// <param name="BetaK">b [K].</param>
public sealed record VarshniGap(double ZeroKelvinEV, double AlphaEVPerK, double BetaK)
{
    /// <summary>Eg(T) [eV].</summary>
    public double GapEV(double temperatureK) => ZeroKelvinEV - (AlphaEVPerK * temperatureK * temperatureK / (temperatureK + BetaK));

    /// <summary>dEg/dT [eV/K].</summary>
    public double SlopeEVPerK(double temperatureK)
    {
        var sum = temperatureK + BetaK;
        return -AlphaEVPerK * temperatureK * (temperatureK + (2 * BetaK)) / (sum * sum);
    }

    /// <summary>Eg*(T) = Eg - T dEg/dT [eV].</summary>
    public double LinearGapEV(double temperatureK)
    {
        var ratio = temperatureK / (temperatureK + BetaK);
        return ZeroKelvinEV + (AlphaEVPerK * BetaK * ratio * ratio);
    }
}
