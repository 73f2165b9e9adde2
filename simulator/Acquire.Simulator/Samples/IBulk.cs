namespace Acquire.Simulator.Samples;

/// <summary>Carriers of the bulk in the dark.</summary>
internal interface IBulk
{
    /// <summary>Densities and mobilities at a temperature [K].</summary>
    BulkCarriers At(double temperatureK);
}

/// <summary>Densities [m-3] and mobilities [m2/(V s)] of both carriers.</summary>
internal readonly record struct BulkCarriers(
    double ElectronsPerM3, double HolesPerM3, double ElectronMobilityM2PerVS, double HoleMobilityM2PerVS);
