namespace Acquire.Analysis.Dark;

/// <summary>One point of a dark curve.</summary>
/// <param name="Index">Number in its run.</param>
/// <param name="TemperatureK">Sample temperature [K].</param>
/// <param name="TemperatureUncertaintyK">Random standard uncertainty of it [K]; zero when unknown.</param>
/// <param name="ConductanceS">Conductance [S], or conductivity [S/m]: a factor does not matter to an energy.</param>
/// <param name="ConductanceUncertaintyS">Standard uncertainty in the same unit; zero when unknown.</param>
/// <param name="Leg">Number of the leg, from 1.</param>
/// <param name="ExcludedReason">Why the point is not used; null when it is.</param>
public sealed record ConductancePoint(
    int Index, double TemperatureK, double TemperatureUncertaintyK, double ConductanceS, double ConductanceUncertaintyS, int Leg, string? ExcludedReason);
