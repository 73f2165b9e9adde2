using MathNet.Numerics.Distributions;
using MathNet.Numerics.LinearAlgebra;

namespace Acquire.Analysis.Regression;

/// <summary>Tests of what a straight line leaves over. R^2 is none of them.</summary>
public static class ResidualTests
{
    /// <summary>Runs test on the signs of the residuals: Z and its two-sided probability in the normal approximation (Wald and Wolfowitz 1940, Ann. Math. Stat. 11, 147).</summary>
    public static (double Z, double P) Runs(ReadOnlySpan<double> residuals)
    {
        int plus = 0, minus = 0, runs = 0, last = 0;
        foreach (var residual in residuals)
        {
            var sign = residual >= 0 ? 1 : -1;
            plus += sign > 0 ? 1 : 0;
            minus += sign < 0 ? 1 : 0;
            runs += sign != last ? 1 : 0;
            last = sign;
        }

        double n = plus + minus;
        if (plus == 0 || minus == 0)
        {
            return (double.NegativeInfinity, 0);
        }

        var mean = 1 + (2.0 * plus * minus / n);
        var variance = (mean - 1) * (mean - 2) / (n - 1);
        var z = variance > 0 ? (runs - mean) / Math.Sqrt(variance) : 0;
        return (z, 2 * Normal.CDF(0, 1, -Math.Abs(z)));
    }

    /// <summary>
    /// Quadratic term: F test of y = a + b x + c x^2 against the line (JCGM-style nested F test), with c itself.
    /// x is centred and scaled before the normal equations.
    /// </summary>
    public static (double Curvature, double P) Quadratic(ReadOnlySpan<double> x, ReadOnlySpan<double> y, ReadOnlySpan<double> u)
    {
        var n = x.Length;
        if (n < 5 || WeightedLine.Fit(x, y, u) is not { } line)
        {
            return (0, 1);
        }

        var mean = 0.0;
        var scale = 0.0;
        for (var i = 0; i < n; i++)
        {
            mean += x[i] / n;
        }

        for (var i = 0; i < n; i++)
        {
            scale = Math.Max(scale, Math.Abs(x[i] - mean));
        }

        var design = Matrix<double>.Build.Dense(n, 3);
        var right = Vector<double>.Build.Dense(n);
        for (var i = 0; i < n; i++)
        {
            var t = (x[i] - mean) / scale;
            design.SetRow(i, [1 / u[i], t / u[i], t * t / u[i]]);
            right[i] = y[i] / u[i];
        }

        var solution = design.QR().Solve(right);
        var rest = (design * solution) - right;
        var chi = rest * rest;
        if (!(chi > 0))
        {
            return (solution[2] / (scale * scale), line.ChiSquare > 0 ? 0 : 1);
        }

        var f = Math.Max(0, (line.ChiSquare - chi) / (chi / (n - 3)));
        return (solution[2] / (scale * scale), 1 - FisherSnedecor.CDF(1, n - 3, f));
    }
}
