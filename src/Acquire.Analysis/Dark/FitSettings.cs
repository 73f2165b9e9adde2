using Acquire.Physics;

namespace Acquire.Analysis.Dark;

/// <summary>What a dark fit is told beside the points.</summary>
public sealed record FitSettings
{
    /// <summary>The material whose expected gap and exponents are used; null: no correction and no verdict on purity.</summary>
    public Material? Material { get; init; }

    /// <summary>Standard uncertainty common to all temperatures [K]: an offset of the thermometer; not reduced by the number of points.</summary>
    public double CommonTemperatureUncertaintyK { get; init; }

    /// <summary>Exponent of the density prefactor; NaN: from the material, or 1.5.</summary>
    public double DensityExponent { get; init; } = double.NaN;

    /// <summary>Exponent by which the mobility falls; NaN: from the material.</summary>
    public double MobilityExponent { get; init; } = double.NaN;

    /// <summary>Half-width of what the mobility exponent may be off by (rectangular); field practice: 0.2.</summary>
    public double MobilityExponentHalfWidth { get; init; } = 0.2;

    /// <summary>Conductivity over conductance [1/m]; NaN: geometry unknown, so no statement about sigma against sigma_i.</summary>
    public double GeometryPerM { get; init; } = double.NaN;

    /// <summary>Unit of the conductance column, for the prefactor: <c>S</c> or <c>S/m</c>.</summary>
    public string ConductanceUnit { get; init; } = "S";
}
