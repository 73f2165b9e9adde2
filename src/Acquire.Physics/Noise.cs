namespace Acquire.Physics;

/// <summary>Noise that no instrument avoids, per root hertz.</summary>
public static class Noise
{
    /// <summary>Johnson current noise sqrt(4 k T G) [A/rtHz] of a conductance [S] at a temperature [K]. Johnson 1928, Nyquist 1928, Phys. Rev. 32, 97 and 110.</summary>
    public static double JohnsonCurrentAPerRootHz(double temperatureK, double conductanceS) =>
        Math.Sqrt(4 * SI.BoltzmannJPerK * temperatureK * conductanceS);

    /// <summary>Johnson voltage noise sqrt(4 k T R) [V/rtHz] of a resistance [ohm] at a temperature [K].</summary>
    public static double JohnsonVoltageVPerRootHz(double temperatureK, double resistanceOhm) =>
        Math.Sqrt(4 * SI.BoltzmannJPerK * temperatureK * resistanceOhm);

    /// <summary>Shot noise sqrt(2 e I) [A/rtHz] of a current [A]. Schottky 1918, Ann. Phys. 362, 541.</summary>
    public static double ShotCurrentAPerRootHz(double currentA) => Math.Sqrt(2 * SI.ElementaryChargeC * Math.Abs(currentA));
}
