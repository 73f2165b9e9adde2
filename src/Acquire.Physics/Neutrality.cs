namespace Acquire.Physics;

/// <summary>A dopant level.</summary>
/// <param name="DensityPerM3">Density [m-3].</param>
/// <param name="DepthEV">Distance from its band [eV]: donors from the conduction band, acceptors from the valence band.</param>
/// <param name="Degeneracy">Degeneracy factor: 2 for simple donors, 4 for simple acceptors.</param>
public readonly record struct Level(double DensityPerM3, double DepthEV, double Degeneracy);

/// <summary>What charge neutrality gives.</summary>
/// <param name="ElectronsPerM3">Free electrons [m-3].</param>
/// <param name="HolesPerM3">Free holes [m-3].</param>
/// <param name="FermiAboveValenceEV">Fermi level above the valence band edge [eV].</param>
public readonly record struct CarrierBalance(double ElectronsPerM3, double HolesPerM3, double FermiAboveValenceEV);

/// <summary>Free carriers from charge neutrality.</summary>
/// <remarks>
/// Model      n + N_A^- = p + N_D^+ with n = Nc F_1/2((EF-Ec)/kT), p = Nv F_1/2((Ev-EF)/kT),
///            N_D^+ = N_D / (1 + g exp((EF-ED)/kT)), N_A^- = N_A / (1 + g exp((EA-EF)/kT))
/// Inputs     densities [m-3], depths [eV], T [K] > 0
/// Result     n, p [m-3], EF above Ev [eV]
/// Numerics   the charge falls strictly with EF, so bisection on a bracket ends after at most 200 halvings; relative 1e-13 in the carriers
/// Source     Blakemore 1962, Semiconductor Statistics, ch. 3; textbook form
/// </remarks>
public static class Neutrality
{
    /// <summary>Solves for the Fermi level and the carriers.</summary>
    public static CarrierBalance Solve(Material material, double temperatureK, IReadOnlyList<Level> donors, IReadOnlyList<Level> acceptors)
    {
        var thermalEV = SI.ThermalEV(temperatureK);
        var gapEV = material.Gap.GapEV(temperatureK);
        var conduction = material.ConductionStatesPerM3.At(temperatureK);
        var valence = material.ValenceStatesPerM3.At(temperatureK);
        var low = -1.0;
        var high = gapEV + 1.0;
        for (var step = 0; step < 200 && high - low > 1e-16 * Math.Max(1, Math.Abs(low)); step++)
        {
            var middle = (low + high) / 2;
            var positive = valence * FermiIntegral.Half(-middle / thermalEV);
            var negative = conduction * FermiIntegral.Half((middle - gapEV) / thermalEV);
            foreach (var donor in donors)
            {
                positive += donor.DensityPerM3 / (1 + (donor.Degeneracy * Math.Exp((middle - gapEV + donor.DepthEV) / thermalEV)));
            }

            foreach (var acceptor in acceptors)
            {
                negative += acceptor.DensityPerM3 / (1 + (acceptor.Degeneracy * Math.Exp((acceptor.DepthEV - middle) / thermalEV)));
            }

            if (positive > negative)
            {
                low = middle;
            }
            else
            {
                high = middle;
            }
        }

        var fermi = (low + high) / 2;
        return new(conduction * FermiIntegral.Half((fermi - gapEV) / thermalEV), valence * FermiIntegral.Half(-fermi / thermalEV), fermi);
    }

    /// <summary>
    /// Carriers of fully ionised doping: n = N/2 + sqrt(N^2/4 + n_i^2), p = n_i^2/n, N = N_D - N_A; written so that the minority carrier keeps its digits.
    /// </summary>
    public static (double ElectronsPerM3, double HolesPerM3) FullyIonised(double intrinsicPerM3, double netDonorsPerM3)
    {
        var half = Math.Abs(netDonorsPerM3) / 2;
        var majority = half + Math.Sqrt((half * half) + (intrinsicPerM3 * intrinsicPerM3));
        var minority = intrinsicPerM3 * intrinsicPerM3 / majority;
        return netDonorsPerM3 >= 0 ? (majority, minority) : (minority, majority);
    }
}
