namespace Acquire.Analysis.Regression;

/// <summary>A straight line with errors in both variables.</summary>
/// <remarks>
/// Model      true points lie on y = a + b x; x_i, y_i carry independent errors of standard deviation ux_i, uy_i
/// Inputs     x, y, ux >= 0, uy > 0; n >= 3
/// Result     a, b; u(a), u(b) from adjusted points, not rescaled; S = sum W (y - a - b x)^2 as chi-square
/// Fails      no convergence within 200 steps, or x without spread: null
/// Source     York, Evensen, Lopez Martinez, De Basabe Delgado 2004, Am. J. Phys. 72, 367, eqs. (13); checked on Pearson's data with York's weights
/// </remarks>
public static class YorkLine
{
    private const int MostSteps = 200;

    /// <summary>Fits; null when it does not converge.</summary>
    public static LineFit? Fit(ReadOnlySpan<double> x, ReadOnlySpan<double> y, ReadOnlySpan<double> ux, ReadOnlySpan<double> uy)
    {
        if (WeightedLine.Fit(x, y, uy) is not { } start)
        {
            return null;
        }

        var slope = start.Slope;
        var state = default(Step);
        for (var step = 0; step < MostSteps; step++)
        {
            state = Step.At(slope, x, y, ux, uy);
            var change = Math.Abs(state.Slope - slope);
            slope = state.Slope;
            if (!double.IsFinite(slope))
            {
                return null;
            }

            if (change <= 1e-15 * Math.Abs(slope))
            {
                break;
            }
        }

        return Covariance(slope, state, x, y, ux, uy);
    }

    private static LineFit Covariance(double slope, Step state, ReadOnlySpan<double> x, ReadOnlySpan<double> y, ReadOnlySpan<double> ux, ReadOnlySpan<double> uy)
    {
        var intercept = state.MeanY - (slope * state.MeanX);
        double w = 0, adjusted = 0, chi = 0;
        for (var i = 0; i < x.Length; i++)
        {
            var (weight, beta) = state.Point(slope, i, x, y, ux, uy);
            w += weight;
            adjusted += weight * (state.MeanX + beta);
            var residual = y[i] - intercept - (slope * x[i]);
            chi += weight * residual * residual;
        }

        adjusted /= w;
        var sxx = 0.0;
        for (var i = 0; i < x.Length; i++)
        {
            var (weight, beta) = state.Point(slope, i, x, y, ux, uy);
            sxx += weight * (state.MeanX + beta - adjusted) * (state.MeanX + beta - adjusted);
        }

        var ub = 1 / Math.Sqrt(sxx);
        var ua = Math.Sqrt((1 / w) + (adjusted * adjusted * ub * ub));
        return new(intercept, slope, ua, ub, -adjusted * ub / ua, chi, x.Length - 2);
    }

    private readonly record struct Step(double Slope, double MeanX, double MeanY)
    {
        public static Step At(double slope, ReadOnlySpan<double> x, ReadOnlySpan<double> y, ReadOnlySpan<double> ux, ReadOnlySpan<double> uy)
        {
            double w = 0, meanX = 0, meanY = 0;
            for (var i = 0; i < x.Length; i++)
            {
                var weight = 1 / ((uy[i] * uy[i]) + (slope * slope * ux[i] * ux[i]));
                w += weight;
                meanX += weight * x[i];
                meanY += weight * y[i];
            }

            var means = new Step(slope, meanX / w, meanY / w);
            double above = 0, below = 0;
            for (var i = 0; i < x.Length; i++)
            {
                var (weight, beta) = means.Point(slope, i, x, y, ux, uy);
                above += weight * beta * (y[i] - means.MeanY);
                below += weight * beta * (x[i] - means.MeanX);
            }

            return means with { Slope = above / below };
        }

        /// <summary>Weight W_i and beta_i of York's equations; written without dividing by ux, which may be zero.</summary>
        public (double Weight, double Beta) Point(double slope, int i, ReadOnlySpan<double> x, ReadOnlySpan<double> y, ReadOnlySpan<double> ux, ReadOnlySpan<double> uy)
        {
            var weight = 1 / ((uy[i] * uy[i]) + (slope * slope * ux[i] * ux[i]));
            return (weight, weight * (((x[i] - MeanX) * uy[i] * uy[i]) + (slope * (y[i] - MeanY) * ux[i] * ux[i])));
        }
    }
}
