namespace Acquire.Simulator.Instruments;

/// <summary>Standard deviations of a current averaged over an integration time.</summary>
/// <remarks>
/// Model      u^2 = S T^-1 / 2: the mean over a time T passes white noise of one-sided density S in a bandwidth 1/(2T)
/// Inputs     temperature [K], conductance [S], current [A], integration time [s]
/// Result     [A]
/// Source     H. Nyquist, Phys. Rev. 32, 110 (1928), 10.1103/PhysRev.32.110: S = 4 k T G;
///            W. Schottky, Ann. Phys. 362, 541 (1918), 10.1002/andp.19183622304: S = 2 e I. k and e exact (SI 2019).
/// </remarks>
public static class CurrentNoise
{
    private const double BoltzmannJPerK = 1.380649e-23;
    private const double ElementaryChargeC = 1.602176634e-19;

    /// <summary>Thermal noise of a conductance.</summary>
    public static double JohnsonA(double temperatureK, double conductanceS, double integrationS) =>
        Math.Sqrt(2 * BoltzmannJPerK * temperatureK * conductanceS / integrationS);

    /// <summary>Full shot noise of a current.</summary>
    public static double ShotA(double currentA, double integrationS) =>
        Math.Sqrt(ElementaryChargeC * Math.Abs(currentA) / integrationS);

    /// <summary>White noise given by its density [A in 1 Hz].</summary>
    public static double WhiteA(double densityAPerRootHz, double integrationS) =>
        densityAPerRootHz / Math.Sqrt(2 * integrationS);
}
