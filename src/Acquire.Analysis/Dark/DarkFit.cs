using Acquire.Physics;

namespace Acquire.Analysis.Dark;

/// <summary>The dark analysis: which points count, the activation energy with its uncertainty, and what it means.</summary>
/// <remarks>
/// Model      ln G = ln G0 - Ea x, x = 1/kT [1/eV]; corrected: twice (Ea - (d - m) kT_mid), d the exponent of sqrt(Nc Nv), m the exponent by which
///            mu_n + mu_p falls; compared with Eg*(T_mid) = Eg - T dEg/dT, T_mid the harmonic mean. T^1.5 is never divided out alone
/// Inputs     conductance points [K, S]; common thermometer uncertainty [K]
/// Result     Ea [eV] with a budget; common errors are not reduced by the number of points
/// Refused    fewer than six usable points, no activated region, sign changes: no number then
/// Source     JCGM 100:2008; tangent intercept of the Varshni law; rules of common practice. R^2 is not used
/// </remarks>
public static class DarkFit
{
    private const double Coverage = 2;

    /// <summary>Fits.</summary>
    public static FitResult Fit(IReadOnlyList<ConductancePoint> points, FitSettings settings)
    {
        var (curve, excluded) = DarkCurve.From(points);
        var constants = settings.Material?.Set ?? "none";
        FitResult Refused(params string[] reasons) => new()
        {
            Total = points.Count,
            Used = [],
            Excluded = excluded,
            Intrinsic = new("refused", reasons, double.NaN, double.NaN, constants),
            LocalEnergies = LocalEnergy.Of(points),
        };

        var negative = excluded.Count(point => point.Reason == "conductance zero or negative");
        if (negative > 0 && negative >= curve.Count / 3.0)
        {
            return Refused($"{negative} points have a conductance of zero or less: the signal changes sign, an offset or leakage of unknown origin");
        }

        if (curve.Count < WindowSearch.FewestPoints)
        {
            return Refused($"only {curve.Count} usable points; {WindowSearch.FewestPoints} are needed");
        }

        if (curve.Points[^1].TemperatureK - curve.Points[0].TemperatureK < 2)
        {
            return Refused("all points lie within 2 K: one temperature has no slope");
        }

        var search = new WindowSearch(curve, settings.Material);
        var (admissible, rejected, activated) = search.Find();
        if (admissible.Count == 0)
        {
            return Refused(activated
                ? FormattableString.Invariant($"no straight window: each of the {rejected} candidate windows that end at the hottest point bends, spans too little or leaves a pattern")
                : "the conductance is not activated at the hot end: it does not rise with temperature as exp(-Ea/kT) with Ea above 3 kT (metal-like, saturation or freeze-out region)");
        }

        var window = admissible[0];
        return Accepted(points.Count, excluded, new FitContext(curve, settings, search, window, admissible, rejected)) with { LocalEnergies = LocalEnergy.Of(points) };
    }

    private static FitResult Accepted(int total, List<ExcludedPoint> excluded, FitContext context)
    {
        var budget = Budget.Of(context);
        var energy = context.EnergyEV;
        var u = Math.Sqrt(budget.Sum(line => line.ContributionEV * line.ContributionEV));
        var corrected = Correct(context, u);
        var line = context.Window.Line;
        var inside = context.Curve.Points.Skip(context.Window.From).Take(context.Window.Count).ToList();
        var warnings = Warnings.Of(context);
        return new()
        {
            Total = total,
            Used = [.. inside.Select(point => point.Index)],
            Excluded = excluded,
            Window = new(inside[0].TemperatureK, inside[^1].TemperatureK, "the longest straight window that ends at the hottest usable point", context.Rejected),
            ActivationEnergy = new(energy, u, energy - (Coverage * u), energy + (Coverage * u)),
            Prefactor = new(Math.Exp(line.Intercept), context.Settings.ConductanceUnit, line.InterceptUncertainty * context.Rescaling, -line.Correlation),
            Corrected = corrected,
            Budget = budget,
            Goodness = new(context.Curve.HasUncertainties ? line.ChiSquare / line.DegreesOfFreedom : double.NaN, context.Window.RunsP, context.Window.QuadraticP),
            Alternatives = AlternativeLaws.Compare(context),
            Intrinsic = Verdict.Of(context, corrected),
            Warnings = warnings,
        };
    }

    private static CorrectedEnergy? Correct(FitContext context, double u)
    {
        if (context.Settings.Material is not { } material)
        {
            return null;
        }

        var middleK = context.MiddleK;
        var density = double.IsNaN(context.Settings.DensityExponent) ? material.DensityExponent : context.Settings.DensityExponent;
        var mobility = double.IsNaN(context.Settings.MobilityExponent) ? material.MobilityExponent(middleK) : context.Settings.MobilityExponent;
        var kT = SI.ThermalEV(middleK);
        var exponent = 2 * context.Settings.MobilityExponentHalfWidth / Math.Sqrt(3) * kT;
        return new(2 * (context.EnergyEV - ((density - mobility) * kT)), Math.Sqrt((4 * u * u) + (exponent * exponent)), density, mobility, material.Gap.LinearGapEV(middleK),
            FormattableString.Invariant($"Eg - T dEg/dT at {middleK:F1} K, {material.Set}: {material.Source}"));
    }
}

/// <summary>Everything the parts of a fit look at.</summary>
internal sealed record FitContext(
    DarkCurve Curve, FitSettings Settings, WindowSearch Search, CandidateWindow Window, IReadOnlyList<CandidateWindow> Admissible, int Rejected)
{
    /// <summary>Slope energy [eV].</summary>
    public double EnergyEV => -Window.Line.Slope;

    /// <summary>Harmonic mean temperature of the window [K].</summary>
    public double MiddleK => 1 / (Curve.X[Window.From..Window.To].Average() * SI.BoltzmannEVPerK);

    /// <summary>Scatter over stated uncertainty, never below one.</summary>
    public double Rescaling => Math.Max(1, Window.Line.Rescaling);

    /// <summary>Coldest and hottest temperature of the window [K].</summary>
    public (double FromK, double ToK) Temperatures => (Curve.Points[Window.From].TemperatureK, Curve.Points[Window.To - 1].TemperatureK);
}
