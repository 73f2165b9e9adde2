namespace Acquire.Physics;

/// <summary>A named set of constants of one semiconductor, with its sources. Sets are never mixed.</summary>
/// <remarks>
/// Densities of states and mobilities follow powers of temperature; n_i = sqrt(Nc Nv) exp(-Eg/2kT); sigma_i = q n_i (mu_n + mu_p).
/// Expect 5-10 % between published sets in n_i and in each mobility: every result names the set it used.
/// </remarks>
public sealed record Material
{
    /// <summary>Chemical symbol: <c>Ge</c>.</summary>
    public required string Symbol { get; init; }

    /// <summary>Name and version of the set, printed with every result.</summary>
    public required string Set { get; init; }

    /// <summary>Where the numbers come from.</summary>
    public required string Source { get; init; }

    /// <summary>The gap.</summary>
    public required VarshniGap Gap { get; init; }

    /// <summary>Effective density of states of the conduction band [m-3].</summary>
    public required PowerLaw ConductionStatesPerM3 { get; init; }

    /// <summary>Effective density of states of the valence band [m-3].</summary>
    public required PowerLaw ValenceStatesPerM3 { get; init; }

    /// <summary>Electron lattice mobility [m2/Vs].</summary>
    public required PowerLaw ElectronMobilityM2PerVs { get; init; }

    /// <summary>Hole lattice mobility [m2/Vs].</summary>
    public required PowerLaw HoleMobilityM2PerVs { get; init; }

    /// <summary>Relative permittivity.</summary>
    public required double RelativePermittivity { get; init; }

    /// <summary>Germanium.</summary>
    public static Material Ge => Materials.Ge;

    /// <summary>Silicon.</summary>
    public static Material Si => Materials.Si;

    /// <summary>Gallium arsenide.</summary>
    public static Material GaAs => Materials.GaAs;

    /// <summary>All sets that ship.</summary>
    public static IReadOnlyList<Material> All => [Ge, Si, GaAs];

    /// <summary>The set of a symbol, letter case aside; null when there is none.</summary>
    public static Material? Find(string symbol) =>
        All.FirstOrDefault(material => material.Symbol.Equals(symbol, StringComparison.OrdinalIgnoreCase));

    /// <summary>Intrinsic carrier density n_i [m-3].</summary>
    public double IntrinsicDensityPerM3(double temperatureK) =>
        Math.Sqrt(ConductionStatesPerM3.At(temperatureK) * ValenceStatesPerM3.At(temperatureK))
        * Math.Exp(-Gap.GapEV(temperatureK) / (2 * SI.ThermalEV(temperatureK)));

    /// <summary>Intrinsic conductivity [S/m].</summary>
    public double IntrinsicConductivitySPerM(double temperatureK) =>
        SI.ElementaryChargeC * IntrinsicDensityPerM3(temperatureK)
        * (ElectronMobilityM2PerVs.At(temperatureK) + HoleMobilityM2PerVs.At(temperatureK));

    /// <summary>Conductivity [S/m] of given electron and hole densities [m-3].</summary>
    public double ConductivitySPerM(double temperatureK, double electronsPerM3, double holesPerM3) =>
        SI.ElementaryChargeC * ((electronsPerM3 * ElectronMobilityM2PerVs.At(temperatureK)) + (holesPerM3 * HoleMobilityM2PerVs.At(temperatureK)));

    /// <summary>
    /// The exponent p of the prefactor of sigma_i: d ln[sqrt(Nc Nv) (mu_n + mu_p)] / d ln T, so that the slope energy
    /// -d ln sigma_i / d(1/kT) = Eg*(T)/2 + p kT.
    /// </summary>
    public double PrefactorExponent(double temperatureK) => DensityExponent - MobilityExponent(temperatureK);

    /// <summary>d ln sqrt(Nc Nv) / d ln T; 1.5 for parabolic bands.</summary>
    public double DensityExponent => (ConductionStatesPerM3.Exponent + ValenceStatesPerM3.Exponent) / 2;

    /// <summary>-d ln(mu_n + mu_p) / d ln T: the effective exponent by which the mobility falls.</summary>
    public double MobilityExponent(double temperatureK)
    {
        var electrons = ElectronMobilityM2PerVs.At(temperatureK);
        var holes = HoleMobilityM2PerVs.At(temperatureK);
        return -((ElectronMobilityM2PerVs.Exponent * electrons) + (HoleMobilityM2PerVs.Exponent * holes)) / (electrons + holes);
    }
}
