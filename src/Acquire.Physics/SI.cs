namespace Acquire.Physics;

/// <summary>Constants in SI. Those of the 2019 SI are exact; the others are CODATA 2018 (Tiesinga et al. 2021, Rev. Mod. Phys. 93, 025010).</summary>
public static class SI
{
    /// <summary>Planck constant [J s], exact.</summary>
    public const double PlanckJS = 6.62607015e-34;

    /// <summary>Elementary charge [C], exact.</summary>
    public const double ElementaryChargeC = 1.602176634e-19;

    /// <summary>Boltzmann constant [J/K], exact.</summary>
    public const double BoltzmannJPerK = 1.380649e-23;

    /// <summary>Speed of light [m/s], exact.</summary>
    public const double SpeedOfLightMPerS = 299792458;

    /// <summary>Electric constant [F/m], CODATA 2018.</summary>
    public const double ElectricConstantFPerM = 8.8541878128e-12;

    /// <summary>Electron mass [kg], CODATA 2018.</summary>
    public const double ElectronMassKg = 9.1093837015e-31;

    /// <summary>Boltzmann constant [eV/K].</summary>
    public const double BoltzmannEVPerK = BoltzmannJPerK / ElementaryChargeC;

    /// <summary>Thermal energy kT [eV] at a temperature [K].</summary>
    public static double ThermalEV(double temperatureK) => BoltzmannEVPerK * temperatureK;

    /// <summary>Energy of a photon [eV] of a wavelength [m].</summary>
    public static double PhotonEV(double wavelengthM) => PlanckJS * SpeedOfLightMPerS / (wavelengthM * ElementaryChargeC);

    /// <summary>Photons in one joule of light of a wavelength [m].</summary>
    public static double PhotonsPerJoule(double wavelengthM) => wavelengthM / (PlanckJS * SpeedOfLightMPerS);
}
