namespace Acquire.Simulator.Samples;

/// <summary>The true parameters of an invented sample.</summary>
public sealed record SampleModel
{
    /// <summary>Name of the material set, such as Ge.</summary>
    public required string Material { get; init; }

    /// <summary>Shallow donors [m-3].</summary>
    public required double DonorsPerM3 { get; init; }

    /// <summary>Shallow acceptors [m-3].</summary>
    public required double AcceptorsPerM3 { get; init; }

    /// <summary>Depth of the donors below the conduction band [eV].</summary>
    public required double DonorEV { get; init; }

    /// <summary>Height of the acceptors above the valence band [eV].</summary>
    public required double AcceptorEV { get; init; }

    /// <summary>A level deep in the gap, or none.</summary>
    public required DeepLevelModel? Deep { get; init; }

    /// <summary>Bar or film between its contacts.</summary>
    public required BarModel Bar { get; init; }

    /// <summary>Resistance of both contacts together [ohm].</summary>
    public required double ContactOhm { get; init; }

    /// <summary>Leakage beside the bulk, over the surface or the holder, at 300 K [S].</summary>
    public required double LeakageAt300S { get; init; }

    /// <summary>Activation energy of that leakage [eV].</summary>
    public required double LeakageEV { get; init; }

    /// <summary>Constant EMF of the contacts [V].</summary>
    public required double ContactEmfV { get; init; }

    /// <summary>EMF per kelvin between stage and sample [V/K].</summary>
    public required double ThermoelectricVPerK { get; init; }

    /// <summary>What light does.</summary>
    public required PhotoModel Photo { get; init; }
}

/// <summary>A bar: current flows along its length.</summary>
public sealed record BarModel(double LengthM, double WidthM, double ThicknessM)
{
    /// <summary>Conductance of the bar over its conductivity [m].</summary>
    public double FactorM => WidthM * ThicknessM / LengthM;
}

/// <summary>A deep level.</summary>
/// <param name="IsDonor">True for a donor, false for an acceptor.</param>
/// <param name="DensityPerM3">Its density [m-3].</param>
/// <param name="BelowConductionEV">Its depth below the conduction band [eV].</param>
public sealed record DeepLevelModel(bool IsDonor, double DensityPerM3, double BelowConductionEV);

/// <summary>What light does to the sample.</summary>
public sealed record PhotoModel
{
    /// <summary>Part of the light that is reflected.</summary>
    public required double Reflectance { get; init; }

    /// <summary>Depth at which the light has fallen to 1/e [m].</summary>
    public required double AbsorptionLengthM { get; init; }

    /// <summary>Lifetime of excess carriers at 300 K and at the reference density [s].</summary>
    public required double LifetimeAt300S { get; init; }

    /// <summary>Power of temperature that the lifetime follows.</summary>
    public required double LifetimeExponent { get; init; }

    /// <summary>Power of the intensity that the photoconductance follows.</summary>
    public required double IntensityExponent { get; init; }

    /// <summary>Density of excess carriers at which the lifetime is given [m-3].</summary>
    public required double ReferencePerM3 { get; init; }

    /// <summary>Traps for the minority carrier [m-3].</summary>
    public required double TrapsPerM3 { get; init; }

    /// <summary>Depth of the traps [eV].</summary>
    public required double TrapEV { get; init; }

    /// <summary>Attempt frequency of the emission from traps [1/s].</summary>
    public required double AttemptHz { get; init; }

    /// <summary>Density of excess carriers at which an empty trap fills within one second [m-3].</summary>
    public required double CapturePerM3 { get; init; }
}
