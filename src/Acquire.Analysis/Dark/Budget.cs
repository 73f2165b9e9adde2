namespace Acquire.Analysis.Dark;

/// <summary>The uncertainty budget of the activation energy, after JCGM 100:2008. Common thermometer errors do not shrink with the number of points.</summary>
/// <remarks>Offset d: u = Ea 2 d / T_mid. Gain (the error changes across the window): u = Ea 2 d / (T_hot - T_cold). Both from the first order of 1/kT.</remarks>
internal static class Budget
{
    public static IReadOnlyList<BudgetLine> Of(FitContext context)
    {
        var common = context.Settings.CommonTemperatureUncertaintyK;
        var (fromK, toK) = context.Temperatures;
        var lines = new List<BudgetLine>
        {
            new("scatter of the points", "A", context.Window.Line.SlopeUncertainty * context.Rescaling),
            new("window choice", "B", WindowSpread(context)),
        };
        if (common > 0)
        {
            lines.Add(new("thermometer offset, common to all points", "B", context.EnergyEV * 2 * common / context.MiddleK));
            lines.Add(new("thermometer gain, error changing across the window", "B", context.EnergyEV * 2 * common / (toK - fromK)));
        }

        return lines;
    }

    /// <summary>Half the range of slope energies over the admissible windows of at least 70 % of the chosen length, taken as rectangular.</summary>
    private static double WindowSpread(FitContext context)
    {
        var energies = context.Admissible.Where(window => window.Count >= 0.7 * context.Window.Count).Select(window => -window.Line.Slope).ToList();
        return (energies.Max() - energies.Min()) / 2 / Math.Sqrt(3);
    }
}

/// <summary>What a careful reader should know.</summary>
internal static class Warnings
{
    public static IReadOnlyList<string> Of(FitContext context)
    {
        var warnings = new List<string>();
        var span = context.Search.Span(context.Window);
        if (span < WindowSearch.WantedSpan)
        {
            warnings.Add(FormattableString.Invariant($"the window spans a factor {Math.Exp(span):F1} in conductance; a factor 10 makes an activation energy safer"));
        }

        if (context.Settings.CommonTemperatureUncertaintyK == 0)
        {
            warnings.Add("no common thermometer uncertainty was given: the stated uncertainty holds the scatter and the window only, and is flattering");
        }

        if (context.Settings.Material is null)
        {
            warnings.Add("no material was named: no correction of the slope and no comparison with a gap");
        }

        return warnings;
    }
}
