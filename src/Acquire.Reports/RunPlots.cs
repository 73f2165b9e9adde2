using System.Globalization;
using Acquire.Analysis.Dark;
using Acquire.Bench.Readings;
using Acquire.Runs.Files;
using Acquire.Runs.Records;
using ScottPlot;

namespace Acquire.Reports;

/// <summary>One plot of the report.</summary>
/// <param name="Name">File name without ending.</param>
/// <param name="Title">Heading above it.</param>
/// <param name="Alternative">What it shows, for those who cannot see it.</param>
/// <param name="Plot">The plot; null when there is nothing to draw.</param>
internal sealed record ReportPlot(string Name, string Title, string Alternative, Plot? Plot);

/// <summary>Draws the plots of a run.</summary>
internal static class RunPlots
{
    private const double InverseBoltzmann = 1 / Physics.SI.BoltzmannEVPerK;
    private const int MostTimePoints = 4000;

    public static IReadOnlyList<ReportPlot> Draw(RunReader run, IReadOnlyList<PointRecord> points, FitResult? fit)
    {
        var dark = RunPoints.Dark(run);
        return
        [
            new("arrhenius", "Dark curve", "Logarithm of the dark conductance against 1000/T with error bars, legs by marker shape, the fitted line over its window.", Arrhenius(dark, fit)),
            new("residuals", "What the line leaves over", "Residuals of the fit in per cent against temperature, with the zero line.", Residuals(dark, fit)),
            new("legs", "Both legs and the light", "Conductance against temperature for each leg, in the dark and under light.", Legs(points)),
            new("local-energy", "Local activation energy", "Slope energy from five neighbouring points against temperature, with half the expected linear gap after the prefactors.", Local(fit)),
            new("temperature", "Temperature against time", "Stage, sample and set point temperature against time.", Temperature(run)),
            new("current", "Current against time", "Logarithm of the magnitude of the current against time.", Current(run)),
        ];
    }

    private static Plot? Arrhenius(IReadOnlyList<ConductancePoint> dark, FitResult? fit)
    {
        var usable = dark.Where(point => point.ConductanceS > 0 && point.TemperatureK > 0).ToList();
        if (usable.Count == 0)
        {
            return null;
        }

        var plot = PlotStyle.New("1000 K / T", "log10 (conductance / S)");
        foreach (var leg in usable.Where(point => point.ExcludedReason is null).GroupBy(point => point.Leg).OrderBy(leg => leg.Key))
        {
            PlotStyle.Points(plot, [.. leg.Select(point => 1000 / point.TemperatureK)], [.. leg.Select(point => Math.Log10(point.ConductanceS))],
                [.. leg.Select(point => point.ConductanceUncertaintyS / point.ConductanceS / Math.Log(10))], (leg.Key, Invariant($"leg {leg.Key}")));
        }

        var excluded = usable.Where(point => point.ExcludedReason is not null).ToList();
        PlotStyle.Excluded(plot, [.. excluded.Select(point => 1000 / point.TemperatureK)], [.. excluded.Select(point => Math.Log10(point.ConductanceS))], "flagged, not used");
        if (fit is { ActivationEnergy: { } energy, Prefactor: { } prefactor, Window: { } window })
        {
            double[] x = [1000 / window.FromK, 1000 / window.ToK];
            PlotStyle.Line(plot, x, [.. x.Select(value => Math.Log10(prefactor.Value) - (energy.ValueEV * InverseBoltzmann * value / 1000 / Math.Log(10)))],
                (Invariant($"fit, {energy.ValueEV:F4} eV"), LinePattern.Solid, "#b00020"));
        }

        PlotStyle.Finish(plot, Alignment.UpperRight);
        TemperatureAxis(plot, usable.Min(point => point.TemperatureK), usable.Max(point => point.TemperatureK));
        return plot;
    }

    /// <summary>Temperatures in kelvin on the top axis, at round values.</summary>
    private static void TemperatureAxis(Plot plot, double fromK, double toK)
    {
        var step = new double[] { 5, 10, 20, 50, 100, 200 }.First(candidate => (toK - fromK) / candidate <= 9 || candidate == 200);
        var ticks = new ScottPlot.TickGenerators.NumericManual();
        for (var temperatureK = Math.Ceiling(fromK / step) * step; temperatureK <= toK + 1e-9; temperatureK += step)
        {
            ticks.AddMajor(1000 / temperatureK, temperatureK.ToString("F0", CultureInfo.InvariantCulture) + " K");
        }

        plot.Axes.Top.TickGenerator = ticks;
        plot.Axes.Top.TickLabelStyle.FontSize = 13;
        // The top axis has limits of its own: they follow the bottom's, so that kelvin stand above their reciprocals.
        plot.Axes.Top.Min = plot.Axes.Bottom.Min;
        plot.Axes.Top.Max = plot.Axes.Bottom.Max;
    }

    private static Plot? Residuals(IReadOnlyList<ConductancePoint> dark, FitResult? fit)
    {
        if (fit is not { ActivationEnergy: { } energy, Prefactor: { } prefactor })
        {
            return null;
        }

        var plot = PlotStyle.New("T / K", "residual of the conductance / %");
        var used = fit.Used.ToHashSet();
        foreach (var leg in dark.Where(point => used.Contains(point.Index)).GroupBy(point => point.Leg).OrderBy(leg => leg.Key))
        {
            double Residual(ConductancePoint point) => 100 * (Math.Log(point.ConductanceS / prefactor.Value) + (energy.ValueEV * InverseBoltzmann / point.TemperatureK));
            PlotStyle.Points(plot, [.. leg.Select(point => point.TemperatureK)], [.. leg.Select(Residual)],
                [.. leg.Select(point => 100 * point.ConductanceUncertaintyS / point.ConductanceS)], (leg.Key, Invariant($"leg {leg.Key}")));
        }

        var zero = plot.Add.HorizontalLine(0);
        zero.Color = Colors.Black;
        zero.LineWidth = 1;
        return PlotStyle.Finish(plot, Alignment.UpperRight);
    }

    private static Plot? Legs(IReadOnlyList<PointRecord> points)
    {
        var usable = points.Where(point => point.ConductanceS > 0 && double.IsFinite(point.SampleK)).ToList();
        if (usable.Count == 0)
        {
            return null;
        }

        var plot = PlotStyle.New("T / K", "log10 (conductance / S)");
        var order = 0;
        foreach (var group in usable.GroupBy(point => (point.Leg, point.Light)).OrderBy(group => group.Key.Light).ThenBy(group => group.Key.Leg))
        {
            var direction = group.First().Direction switch { > 0 => "warming", < 0 => "cooling", _ => "" };
            var light = group.Key.Light switch { LightState.Lit => "lit", LightState.DarkAfter => "dark after light", _ => "dark" };
            PlotStyle.Points(plot, [.. group.Select(point => point.SampleK)], [.. group.Select(point => Math.Log10(point.ConductanceS))], [], (++order, Invariant($"leg {group.Key.Leg} {direction}, {light}")));
        }

        return PlotStyle.Finish(plot, Alignment.LowerRight);
    }

    private static Plot? Local(FitResult? fit)
    {
        if (fit is null || fit.LocalEnergies.Count == 0)
        {
            return null;
        }

        var plot = PlotStyle.New("T / K", "slope energy / eV");
        foreach (var leg in fit.LocalEnergies.GroupBy(point => point.Leg).OrderBy(leg => leg.Key))
        {
            PlotStyle.Points(plot, [.. leg.Select(point => point.TemperatureK)], [.. leg.Select(point => point.EnergyEV)], [.. leg.Select(point => point.StandardUncertaintyEV)], (leg.Key, Invariant($"leg {leg.Key}")));
        }

        if (fit is { Corrected: { } corrected, Window: { } window })
        {
            // The raw slope to expect: half the linear gap plus the prefactors' share.
            double[] x = [window.FromK, window.ToK];
            PlotStyle.Line(plot, x, [.. x.Select(value => (corrected.ExpectedLinearGapEV / 2) + ((corrected.DensityExponent - corrected.MobilityExponent) * value / InverseBoltzmann))],
                ("intrinsic: half the linear gap and the prefactors", LinePattern.Dashed, "#b00020"));
        }

        return PlotStyle.Finish(plot, Alignment.LowerRight);
    }

    private static Plot? Temperature(RunReader run)
    {
        var plot = PlotStyle.New("bench time / h", "T / K");
        var drawn = false;
        foreach (var (name, pattern, colour) in new[] { ("set point", LinePattern.Dotted, "#777777"), ("stage temperature", LinePattern.Solid, "#000000"), ("sample temperature", LinePattern.Dashed, "#1f5fa8") })
        {
            var (hours, values) = Series(run, name, value => value);
            PlotStyle.Line(plot, hours, values, (name, pattern, colour));
            drawn |= hours.Length > 1;
        }

        return drawn ? PlotStyle.Finish(plot, Alignment.UpperCenter) : null;
    }

    private static Plot? Current(RunReader run)
    {
        var (hours, values) = Series(run, "current", value => Math.Log10(Math.Max(Math.Abs(value), 1e-16)));
        if (hours.Length < 2)
        {
            return null;
        }

        var plot = PlotStyle.New("bench time / h", "log10 (|current| / A)");
        var markers = plot.Add.Markers(hours, values);
        markers.MarkerShape = MarkerShape.FilledCircle;
        markers.MarkerSize = 3;
        markers.Color = Colors.Black;
        markers.LegendText = "good readings";
        return PlotStyle.Finish(plot, Alignment.UpperCenter);
    }

    /// <summary>Good readings of a channel against hours, thinned evenly so that a plot of a long night stays small.</summary>
    private static (double[] Hours, double[] Values) Series(RunReader run, string channel, Func<double, double> map)
    {
        if (run.Channels.FirstOrDefault(candidate => candidate.Name == channel) is not { } found)
        {
            return ([], []);
        }

        var rows = run.Readings(channel: found.Id).Where(row => row.Reading.Quality == Quality.Good).ToList();
        var stride = Math.Max(1, rows.Count / MostTimePoints);
        var kept = rows.Where((_, index) => index % stride == 0).ToList();
        return ([.. kept.Select(row => row.Reading.TimeUs / 3.6e9)], [.. kept.Select(row => map(row.Reading.Value))]);
    }

    private static string Invariant(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);
}
