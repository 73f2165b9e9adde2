using MathNet.Numerics.LinearAlgebra;

namespace Acquire.Analysis.Regression;

/// <summary>What a non-linear least-squares fit gave.</summary>
/// <param name="Parameters">The parameters.</param>
/// <param name="StandardErrors">Their standard errors, rescaled to the scatter.</param>
/// <param name="ResidualSumOfSquares">The sum of squares left.</param>
public sealed record NonLinearFit(IReadOnlyList<double> Parameters, IReadOnlyList<double> StandardErrors, double ResidualSumOfSquares);

/// <summary>Unweighted non-linear least squares.</summary>
/// <remarks>
/// Model      y_i = f(x_i; p) + e_i
/// Inputs     x, y of equal length n > m; start values; f smooth near the solution
/// Result     p and its standard errors s sqrt((J^T J)^-1), s^2 = RSS/(n - m)
/// Numerics   Jacobian by central differences; damping scaled by the diagonal (Marquardt); at most 500 steps
/// Source     Marquardt 1963, J. SIAM 11, 431. Checked against NIST StRD Misra1a from both starts
/// </remarks>
public static class LevenbergMarquardt
{
    private const int MostSteps = 500;

    /// <summary>Fits; null when it does not converge.</summary>
    public static NonLinearFit? Fit(Func<double, IReadOnlyList<double>, double> model, IReadOnlyList<double> x, IReadOnlyList<double> y, IReadOnlyList<double> start)
    {
        var p = Vector<double>.Build.DenseOfEnumerable(start);
        var damping = 1e-3;
        var rss = Residuals(model, x, y, p) is { } first ? first * first : double.NaN;
        for (var step = 0; step < MostSteps; step++)
        {
            var residuals = Residuals(model, x, y, p);
            var jacobian = Jacobian(model, x, p);
            var normal = jacobian.TransposeThisAndMultiply(jacobian);
            var gradient = jacobian.TransposeThisAndMultiply(residuals);
            var damped = normal.Clone();
            damped.SetDiagonal(normal.Diagonal() * (1 + damping));
            var change = damped.Solve(gradient);
            var next = p + change;
            var nextResiduals = Residuals(model, x, y, next);
            var nextRss = nextResiduals * nextResiduals;
            if (!(nextRss <= rss))
            {
                damping = Math.Min(damping * 8, 1e12);
                if (damping >= 1e12)
                {
                    break;
                }

                continue;
            }

            var done = change.PointwiseDivide(p.PointwiseAbs().Add(1e-300)).InfinityNorm() < 1e-12;
            (p, rss, damping) = (next, nextRss, Math.Max(damping / 10, 1e-12));
            if (done)
            {
                break;
            }
        }

        return double.IsFinite(rss) ? Result(model, x, p, rss) : null;
    }

    private static NonLinearFit Result(Func<double, IReadOnlyList<double>, double> model, IReadOnlyList<double> x, Vector<double> p, double rss)
    {
        var jacobian = Jacobian(model, x, p);
        // Columns are scaled before the inversion: parameters may differ by many powers of ten.
        var scales = Vector<double>.Build.Dense(p.Count, column => jacobian.Column(column).L2Norm());
        var scaled = jacobian.Clone();
        for (var column = 0; column < p.Count; column++)
        {
            scaled.SetColumn(column, jacobian.Column(column) / scales[column]);
        }

        var covariance = scaled.TransposeThisAndMultiply(scaled).Inverse();
        var variance = rss / (x.Count - p.Count);
        return new([.. p], [.. Enumerable.Range(0, p.Count).Select(i => Math.Sqrt(variance * covariance[i, i]) / scales[i])], rss);
    }

    private static Vector<double> Residuals(Func<double, IReadOnlyList<double>, double> model, IReadOnlyList<double> x, IReadOnlyList<double> y, Vector<double> p) =>
        Vector<double>.Build.Dense(x.Count, i => y[i] - model(x[i], p.AsArray()));

    private static Matrix<double> Jacobian(Func<double, IReadOnlyList<double>, double> model, IReadOnlyList<double> x, Vector<double> p)
    {
        var jacobian = Matrix<double>.Build.Dense(x.Count, p.Count);
        for (var column = 0; column < p.Count; column++)
        {
            var step = 6e-6 * Math.Max(Math.Abs(p[column]), 1e-12);
            var (above, below) = (p.Clone(), p.Clone());
            above[column] += step;
            below[column] -= step;
            for (var row = 0; row < x.Count; row++)
            {
                jacobian[row, column] = (model(x[row], above.AsArray()) - model(x[row], below.AsArray())) / (2 * step);
            }
        }

        return jacobian;
    }
}
