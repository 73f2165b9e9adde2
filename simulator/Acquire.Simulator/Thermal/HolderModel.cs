namespace Acquire.Simulator.Thermal;

/// <summary>What a sample holder is made of: a heated stage on a cold end, or in a room, with a sample on it.</summary>
public sealed record HolderModel
{
    /// <summary>The stage.</summary>
    public required HeatStore Stage { get; init; }

    /// <summary>The sample and what moves with it.</summary>
    public required HeatStore Sample { get; init; }

    /// <summary>From the stage to the cold end.</summary>
    public required HeatLink ToColdEnd { get; init; }

    /// <summary>From the stage to the sample.</summary>
    public required HeatLink ToSample { get; init; }

    /// <summary>Temperature of the cold end, or of the room when there is none [K].</summary>
    public required double ColdEndK { get; init; }

    /// <summary>Temperature of what the stage radiates to [K].</summary>
    public required double SurroundingsK { get; init; }

    /// <summary>Emissivity times area of the stage [m2].</summary>
    public required double RadiatingAreaM2 { get; init; }

    /// <summary>Temperature of stage and sample when the bench is switched on [K].</summary>
    public required double StartK { get; init; }
}
