namespace Acquire.Physics;

/// <summary>The shipped sets. Mobilities, exponents and permittivities are handbook values from memory, uncertain by 5-10 %.</summary>
internal static class Materials
{
    public static Material Ge { get; } = new()
    {
        Symbol = "Ge",
        Set = "Ge, set 1",
        Source = "gap: Thurmond 1975, J. Electrochem. Soc. 122, 1133; Nc, Nv at 300 K: Sze, Physics of Semiconductor Devices; mobilities: handbook values, from memory",
        Gap = new(0.7437, 4.774e-4, 235),
        ConductionStatesPerM3 = new(1.04e25, 1.5),
        ValenceStatesPerM3 = new(6.0e24, 1.5),
        ElectronMobilityM2PerVs = new(0.3900, -1.66),
        HoleMobilityM2PerVs = new(0.1900, -2.33),
        RelativePermittivity = 16.2,
    };

    public static Material Si { get; } = new()
    {
        Symbol = "Si",
        Set = "Si, set 1",
        Source = "gap: Thurmond 1975, J. Electrochem. Soc. 122, 1133; Nc, Nv at 300 K: Green 1990, J. Appl. Phys. 67, 2944; mobilities: handbook values, from memory",
        Gap = new(1.170, 4.73e-4, 636),
        ConductionStatesPerM3 = new(2.86e25, 1.5),
        ValenceStatesPerM3 = new(3.10e25, 1.5),
        ElectronMobilityM2PerVs = new(0.1430, -2.42),
        HoleMobilityM2PerVs = new(0.0480, -2.20),
        RelativePermittivity = 11.7,
    };

    public static Material GaAs { get; } = new()
    {
        Symbol = "GaAs",
        Set = "GaAs, set 1",
        Source = "gap: Blakemore 1982, J. Appl. Phys. 53, R123; Nc, Nv at 300 K: handbook values, from memory; mobilities: handbook values, from memory; the electron exponent is source-dependent (1.0 to 2.2)",
        Gap = new(1.519, 5.405e-4, 204),
        ConductionStatesPerM3 = new(4.7e23, 1.5),
        ValenceStatesPerM3 = new(9.0e24, 1.5),
        ElectronMobilityM2PerVs = new(0.8500, -1.0),
        HoleMobilityM2PerVs = new(0.0400, -2.1),
        RelativePermittivity = 12.9,
    };
}
