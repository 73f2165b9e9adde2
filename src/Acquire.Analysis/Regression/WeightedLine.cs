namespace Acquire.Analysis.Regression;

/// <summary>A straight line y = a + b x with its covariance.</summary>
/// <param name="Intercept">a.</param>
/// <param name="Slope">b.</param>
/// <param name="InterceptUncertainty">u(a) from the stated uncertainties alone.</param>
/// <param name="SlopeUncertainty">u(b) from the stated uncertainties alone.</param>
/// <param name="Correlation">Correlation of a and b.</param>
/// <param name="ChiSquare">Sum of squared weighted residuals.</param>
/// <param name="DegreesOfFreedom">n - 2.</param>
public sealed record LineFit(
    double Intercept, double Slope, double InterceptUncertainty, double SlopeUncertainty, double Correlation, double ChiSquare, int DegreesOfFreedom)
{
    /// <summary>sqrt(chi-square / degrees of freedom): the factor that rescales the uncertainties to the scatter.</summary>
    public double Rescaling => Math.Sqrt(ChiSquare / DegreesOfFreedom);

    /// <summary>The line at x.</summary>
    public double At(double x) => Intercept + (Slope * x);
}

/// <summary>Weighted least squares for a straight line.</summary>
/// <remarks>
/// Model      y_i = a + b x_i + e_i
/// Inputs     x, n >= 3, not all equal; y; u > 0: standard uncertainties of y (1 sigma); equal u = 1 gives ordinary least squares
/// Result     a, b, their standard uncertainties from u alone (multiply by <see cref="LineFit.Rescaling"/> for the scatter), correlation
/// Valid      independent errors, x exact
/// Numerics   x centred on its weighted mean before the sums
/// Source     JCGM 100:2008, H.3; Bevington 1969. Checked against NIST StRD Norris and GUM H.3
/// </remarks>
public static class WeightedLine
{
    /// <summary>Fits; null when the line is not identifiable.</summary>
    public static LineFit? Fit(ReadOnlySpan<double> x, ReadOnlySpan<double> y, ReadOnlySpan<double> u)
    {
        if (x.Length < 3 || x.Length != y.Length || x.Length != u.Length)
        {
            return null;
        }

        double w = 0, meanX = 0, meanY = 0;
        for (var i = 0; i < x.Length; i++)
        {
            var weight = 1 / (u[i] * u[i]);
            w += weight;
            meanX += weight * x[i];
            meanY += weight * y[i];
        }

        meanX /= w;
        meanY /= w;
        double sxx = 0, sxy = 0;
        for (var i = 0; i < x.Length; i++)
        {
            var weight = 1 / (u[i] * u[i]);
            sxx += weight * (x[i] - meanX) * (x[i] - meanX);
            sxy += weight * (x[i] - meanX) * (y[i] - meanY);
        }

        if (!(sxx > 0) || !double.IsFinite(sxy))
        {
            return null;
        }

        var slope = sxy / sxx;
        var chi = 0.0;
        for (var i = 0; i < x.Length; i++)
        {
            var residual = (y[i] - meanY - (slope * (x[i] - meanX))) / u[i];
            chi += residual * residual;
        }

        var ua = Math.Sqrt((1 / w) + (meanX * meanX / sxx));
        var ub = 1 / Math.Sqrt(sxx);
        return new(meanY - (slope * meanX), slope, ua, ub, -meanX * ub / ua, chi, x.Length - 2);
    }

    /// <summary>Slope of y = b x through the origin, ordinary least squares: slope, its standard error and the residual standard deviation.</summary>
    public static (double Slope, double StandardError, double ResidualSd) ThroughOrigin(ReadOnlySpan<double> x, ReadOnlySpan<double> y)
    {
        double sxx = 0, sxy = 0;
        for (var i = 0; i < x.Length; i++)
        {
            sxx += x[i] * x[i];
            sxy += x[i] * y[i];
        }

        var slope = sxy / sxx;
        var rss = 0.0;
        for (var i = 0; i < x.Length; i++)
        {
            rss += (y[i] - (slope * x[i])) * (y[i] - (slope * x[i]));
        }

        var sd = Math.Sqrt(rss / (x.Length - 1));
        return (slope, sd / Math.Sqrt(sxx), sd);
    }
}
