using Acquire.Analysis.Regression;
using Acquire.Physics;

namespace Acquire.Analysis.Dark;

/// <summary>Other laws on the points of the window, by BIC = n ln(RSS/n) + 2 ln n (Schwarz 1978, Ann. Stat. 6, 461).</summary>
/// <remarks>Two parameters each. Comparable only over a decade of conductance and a factor two in temperature with scatter below 2 %: common practice.</remarks>
internal static class AlternativeLaws
{
    private const double Decade = 2.302585;

    public static IReadOnlyList<AlternativeLaw> Compare(FitContext context)
    {
        var range = context.Window.From..context.Window.To;
        var y = context.Curve.Y[range];
        var temperatures = context.Curve.X[range].Select(x => 1 / (x * SI.BoltzmannEVPerK)).ToArray();
        var (fromK, toK) = context.Temperatures;
        var comparable = context.Search.Span(context.Window) >= Decade && toK >= 2 * fromK && context.Window.ResidualSd <= 0.02;
        var activated = Bic([.. context.Curve.X[range]], y);
        return
        [
            new("hopping, exponent 1/4", Bic([.. temperatures.Select(value => Math.Pow(value, -0.25))], y) - activated, comparable),
            new("hopping, exponent 1/2", Bic([.. temperatures.Select(value => Math.Pow(value, -0.5))], y) - activated, comparable),
            new("power of temperature", Bic([.. temperatures.Select(value => Math.Log(value))], y) - activated, comparable),
        ];
    }

    private static double Bic(double[] x, double[] y)
    {
        var unit = Enumerable.Repeat(1.0, x.Length).ToArray();
        var line = WeightedLine.Fit(x, y, unit);
        return line is null ? double.PositiveInfinity : (x.Length * Math.Log(Math.Max(line.ChiSquare, 1e-300) / x.Length)) + (2 * Math.Log(x.Length));
    }
}
