namespace Acquire.Analysis.Dark;

/// <summary>What a dark fit found; everything the report and the JSON show.</summary>
public sealed record FitResult
{
    /// <summary>Points given.</summary>
    public required int Total { get; init; }

    /// <summary>Indices of the points in the chosen window; empty when refused.</summary>
    public required IReadOnlyList<int> Used { get; init; }

    /// <summary>Points left out before any window was looked for, with the reason.</summary>
    public required IReadOnlyList<ExcludedPoint> Excluded { get; init; }

    /// <summary>The chosen window; null when refused.</summary>
    public FitWindow? Window { get; init; }

    /// <summary>Slope energy -d ln G/d(1/kT) [eV]; null when refused.</summary>
    public FittedEnergy? ActivationEnergy { get; init; }

    /// <summary>Prefactor of the straight line; null when refused.</summary>
    public FittedPrefactor? Prefactor { get; init; }

    /// <summary>Twice the slope energy after both prefactors are removed, against the linear gap; null when refused or without a material.</summary>
    public CorrectedEnergy? Corrected { get; init; }

    /// <summary>Contributions to the uncertainty of the activation energy.</summary>
    public IReadOnlyList<BudgetLine> Budget { get; init; } = [];

    /// <summary>How well the line fits; null when refused.</summary>
    public Goodness? Goodness { get; init; }

    /// <summary>Other laws on the same points.</summary>
    public IReadOnlyList<AlternativeLaw> Alternatives { get; init; } = [];

    /// <summary>Whether the sample behaves as intrinsic.</summary>
    public required IntrinsicVerdict Intrinsic { get; init; }

    /// <summary>Local slope energies, for the plot.</summary>
    public IReadOnlyList<LocalEnergyPoint> LocalEnergies { get; init; } = [];

    /// <summary>What a careful reader should know.</summary>
    public IReadOnlyList<string> Warnings { get; init; } = [];
}

/// <summary>A point that was left out.</summary>
public sealed record ExcludedPoint(int Index, string Reason);

/// <summary>The window of a fit.</summary>
/// <param name="FromK">Coldest point used [K].</param>
/// <param name="ToK">Hottest point used [K].</param>
/// <param name="Rule">By which rule it was chosen.</param>
/// <param name="Rejected">How many candidate windows were rejected.</param>
public sealed record FitWindow(double FromK, double ToK, string Rule, int Rejected);

/// <summary>An energy with its uncertainty.</summary>
/// <param name="ValueEV">Value [eV].</param>
/// <param name="StandardUncertaintyEV">Combined standard uncertainty [eV].</param>
/// <param name="Low95EV">Lower end of the 95 % interval [eV].</param>
/// <param name="High95EV">Upper end of the 95 % interval [eV].</param>
public sealed record FittedEnergy(double ValueEV, double StandardUncertaintyEV, double Low95EV, double High95EV);

/// <summary>The prefactor exp(intercept).</summary>
/// <param name="Value">Value, in the unit of the conductance.</param>
/// <param name="Unit">That unit.</param>
/// <param name="LogStandardUncertainty">Standard uncertainty of its natural logarithm.</param>
/// <param name="Correlation">Correlation of intercept and slope energy.</param>
public sealed record FittedPrefactor(double Value, string Unit, double LogStandardUncertainty, double Correlation);

/// <summary>Twice the corrected slope energy.</summary>
/// <param name="TwiceEV">Value [eV].</param>
/// <param name="StandardUncertaintyEV">Combined standard uncertainty [eV].</param>
/// <param name="DensityExponent">Exponent of the density prefactor that was removed.</param>
/// <param name="MobilityExponent">Exponent of the mobility that was removed.</param>
/// <param name="ExpectedLinearGapEV">Eg - T dEg/dT at the middle of the window [eV].</param>
/// <param name="ExpectedSource">Where that comes from.</param>
public sealed record CorrectedEnergy(
    double TwiceEV, double StandardUncertaintyEV, double DensityExponent, double MobilityExponent, double ExpectedLinearGapEV, string ExpectedSource);

/// <summary>One line of the uncertainty budget.</summary>
/// <param name="Name">Component.</param>
/// <param name="Type">A or B (JCGM 100).</param>
/// <param name="ContributionEV">Standard uncertainty it contributes to the activation energy [eV].</param>
public sealed record BudgetLine(string Name, string Type, double ContributionEV);

/// <summary>How well the line fits.</summary>
/// <param name="ReducedChiSquare">chi-square over degrees of freedom with the stated uncertainties; NaN when none were stated.</param>
/// <param name="RunsTestP">Probability of so few or so many runs of the residuals' signs.</param>
/// <param name="QuadraticTermP">Probability of so large a quadratic term if there were none.</param>
public sealed record Goodness(double ReducedChiSquare, double RunsTestP, double QuadraticTermP);

/// <summary>Another law on the same points.</summary>
/// <param name="Law">The law in words.</param>
/// <param name="DeltaBic">BIC of that law less BIC of the activated one; positive: the activated law is better.</param>
/// <param name="Comparable">False when range or noise do not allow the comparison.</param>
public sealed record AlternativeLaw(string Law, double DeltaBic, bool Comparable);

/// <summary>The verdict on intrinsic behaviour.</summary>
/// <param name="Verdict">pass, fail, inconclusive or refused.</param>
/// <param name="Reasons">Why.</param>
/// <param name="NTypeBoundPerCm3">Upper bound on net donors [cm-3] that would still agree; NaN when none can be given.</param>
/// <param name="PTypeBoundPerCm3">Upper bound on net acceptors [cm-3]; NaN when none can be given.</param>
/// <param name="Constants">The named set of constants.</param>
public sealed record IntrinsicVerdict(string Verdict, IReadOnlyList<string> Reasons, double NTypeBoundPerCm3, double PTypeBoundPerCm3, string Constants);

/// <summary>A local slope energy.</summary>
/// <param name="TemperatureK">Middle of the sliding window [K].</param>
/// <param name="EnergyEV">Slope energy there [eV].</param>
/// <param name="StandardUncertaintyEV">Its standard uncertainty [eV].</param>
/// <param name="Leg">Leg of the points.</param>
public sealed record LocalEnergyPoint(double TemperatureK, double EnergyEV, double StandardUncertaintyEV, int Leg);
