using System.Globalization;
using Acquire.Analysis.Dark;
using Acquire.App.CommandLine;
using Spectre.Console;

namespace Acquire.App.Fitting;

/// <summary>A fit as a table for people; every number with its unit and uncertainty.</summary>
internal static class FitTable
{
    /// <summary>Prints it.</summary>
    public static void Print(Terminal terminal, FitResult fit, string title)
    {
        var table = new Table().Border(TableBorder.Simple).Title(Markup.Escape(title)).HideHeaders();
        table.AddColumn("what");
        table.AddColumn("value");
        void Row(string what, string value) => table.AddRow(Markup.Escape(what), Markup.Escape(value));
        Row("points", Text($"{fit.Used.Count} used of {fit.Total}, {fit.Excluded.Count} excluded"));
        if (fit.ActivationEnergy is { } energy && fit.Window is { } window)
        {
            Row("window", Text($"{window.FromK:F1} K to {window.ToK:F1} K ({window.Rule}; {window.Rejected} candidates rejected)"));
            Row("activation energy (raw slope)", Text($"{energy.ValueEV:F4} eV, u = {energy.StandardUncertaintyEV:F4} eV, 95 % {energy.Low95EV:F4} to {energy.High95EV:F4} eV"));
            Row("twice the raw slope", Text($"{2 * energy.ValueEV:F4} eV (never to be compared with a gap)"));
        }

        if (fit.Corrected is { } corrected)
        {
            Row("twice the corrected slope", Text($"{corrected.TwiceEV:F4} eV, u = {corrected.StandardUncertaintyEV:F4} eV (removed: T^{corrected.DensityExponent:F2} of the densities of states, T^-{corrected.MobilityExponent:F2} of the mobility)"));
            Row("expected linear gap", Text($"{corrected.ExpectedLinearGapEV:F4} eV ({corrected.ExpectedSource})"));
            Row("difference", Text($"{1000 * (corrected.TwiceEV - corrected.ExpectedLinearGapEV):+0.0;-0.0} meV, {Math.Abs(corrected.TwiceEV - corrected.ExpectedLinearGapEV) / corrected.StandardUncertaintyEV:F1} standard uncertainties"));
        }

        foreach (var line in fit.Budget)
        {
            Row("budget: " + line.Name, Text($"{1000 * line.ContributionEV:F2} meV (type {line.Type})"));
        }

        Row("intrinsic behaviour", fit.Intrinsic.Verdict);
        foreach (var reason in fit.Intrinsic.Reasons)
        {
            Row("", reason);
        }

        if (double.IsFinite(fit.Intrinsic.NTypeBoundPerCm3))
        {
            Row("net active doping still possible", Text($"n-type below {fit.Intrinsic.NTypeBoundPerCm3:G2} cm-3, p-type below {fit.Intrinsic.PTypeBoundPerCm3:G2} cm-3"));
        }

        Row("constants", fit.Intrinsic.Constants);
        foreach (var warning in fit.Warnings)
        {
            Row("warning", warning);
        }

        terminal.Console.Write(table);
    }

    private static string Text(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);
}
