using Acquire.Analysis.Regression;
using Xunit;

namespace Acquire.Analysis.Tests.Regression;

/// <summary>Regression against certified and published cases.</summary>
public sealed class PublishedFitTests
{
    /// <summary>NIST/ITL Statistical Reference Datasets, Norris.dat (J. Norris, Calibration of Ozone Monitors): certified values.</summary>
    [Fact]
    public void WeightedLine_OnNorris_ReachesTheCertifiedValues()
    {
        double[] y = [0.1, 338.8, 118.1, 888.0, 9.2, 228.1, 668.5, 998.5, 449.1, 778.9, 559.2, 0.3, 0.1, 778.1, 668.8, 339.3, 448.9, 10.8, 557.7, 228.3, 998.0, 888.8, 119.6, 0.3, 0.6, 557.6, 339.3, 888.0, 998.5, 778.9, 10.2, 117.6, 228.9, 668.4, 449.2, 0.2];
        double[] x = [0.2, 337.4, 118.2, 884.6, 10.1, 226.5, 666.3, 996.3, 448.6, 777.0, 558.2, 0.4, 0.6, 775.5, 666.9, 338.0, 447.5, 11.6, 556.0, 228.1, 995.8, 887.6, 120.2, 0.3, 0.3, 556.8, 339.1, 887.2, 999.0, 779.0, 11.1, 118.3, 229.2, 669.1, 448.9, 0.5];
        var fit = WeightedLine.Fit(x, y, Ones(y.Length))!;
        Assert.Equal(-0.262323073774029, fit.Intercept, 1e-12);
        Assert.Equal(1.00211681802045, fit.Slope, 1e-13);
        Assert.Equal(0.232818234301152, fit.InterceptUncertainty * fit.Rescaling, 1e-12);
        Assert.Equal(0.429796848199937e-3, fit.SlopeUncertainty * fit.Rescaling, 1e-15);
        Assert.Equal(0.884796396144373, fit.Rescaling, 1e-12);
        Assert.Equal(-0.7738280820878582, fit.Correlation, 1e-12);
    }

    /// <summary>NIST/ITL StRD, NoInt1.dat: certified values.</summary>
    [Fact]
    public void LineThroughOrigin_OnNoInt1_ReachesTheCertifiedValues()
    {
        var x = Enumerable.Range(60, 11).Select(value => (double)value).ToArray();
        var y = Enumerable.Range(130, 11).Select(value => (double)value).ToArray();
        var (slope, error, sd) = WeightedLine.ThroughOrigin(x, y);
        Assert.Equal(2.07438016528926, slope, 1e-13);
        Assert.Equal(0.0165289256198347, error, 1e-14);
        Assert.Equal(3.56753034006338, sd, 1e-12);
    }

    /// <summary>NIST/ITL StRD, Misra1a.dat: certified values, from both starts.</summary>
    [Theory]
    [InlineData(500, 1e-4)]
    [InlineData(250, 5e-4)]
    public void LevenbergMarquardt_OnMisra1a_ReachesTheCertifiedValues(double b1, double b2)
    {
        double[] y = [10.07, 14.73, 17.94, 23.93, 29.61, 35.18, 40.02, 44.82, 50.76, 55.05, 61.01, 66.4, 75.47, 81.78];
        double[] x = [77.6, 114.9, 141.1, 190.8, 239.9, 289, 332.8, 378.4, 434.8, 477.3, 536.8, 593.1, 689.1, 760];
        var fit = LevenbergMarquardt.Fit((at, p) => p[0] * (1 - Math.Exp(-p[1] * at)), x, y, [b1, b2])!;
        Assert.Equal(2.3894212918E+02, fit.Parameters[0], 2.4e-6);
        Assert.Equal(5.5015643181E-04, fit.Parameters[1], 5.5e-12);
        Assert.Equal(2.7070075241E+00, fit.StandardErrors[0], 1e-5);
        Assert.Equal(7.2668688436E-06, fit.StandardErrors[1], 1e-11);
        Assert.Equal(1.2455138894E-01, fit.ResidualSumOfSquares, 1e-9);
    }

    /// <summary>Pearson 1901 data with the weights of York 1966, Can. J. Phys. 44, 1079; equations of York et al. 2004, Am. J. Phys. 72, 367: unscaled errors from adjusted points.</summary>
    [Fact]
    public void YorkLine_OnPearsonsData_ReachesThePublishedValues()
    {
        double[] x = [0.0, 0.9, 1.8, 2.6, 3.3, 4.4, 5.2, 6.1, 6.5, 7.4];
        double[] wx = [1000, 1000, 500, 800, 200, 80, 60, 20, 1.8, 1.0];
        double[] y = [5.9, 5.4, 4.4, 4.6, 3.5, 3.7, 2.8, 2.8, 2.4, 1.5];
        double[] wy = [1.0, 1.8, 4.0, 8.0, 20, 20, 70, 70, 100, 500];
        var fit = YorkLine.Fit(x, y, [.. wx.Select(w => 1 / Math.Sqrt(w))], [.. wy.Select(w => 1 / Math.Sqrt(w))])!;
        Assert.Equal(-0.4805334074462, fit.Slope, 1e-12);
        Assert.Equal(5.4799102240329, fit.Intercept, 1e-11);
        Assert.Equal(11.866353194061, fit.ChiSquare, 1e-9);
        Assert.Equal(0.29497073549311, fit.InterceptUncertainty, 1e-11);
        Assert.Equal(0.057985009000774, fit.SlopeUncertainty, 1e-12);
        Assert.Equal(-0.963088137508, fit.Correlation, 1e-10);
    }

    [Fact]
    public void YorkLine_WithoutErrorsInX_IsWeightedLeastSquares()
    {
        double[] x = [1, 2, 3, 4, 5];
        double[] y = [1.1, 1.9, 3.2, 3.9, 5.1];
        double[] u = [0.1, 0.2, 0.1, 0.3, 0.1];
        var york = YorkLine.Fit(x, y, new double[5], u)!;
        var line = WeightedLine.Fit(x, y, u)!;
        Assert.Equal(line.Slope, york.Slope, 1e-13);
        Assert.Equal(line.SlopeUncertainty, york.SlopeUncertainty, 1e-13);
    }

    /// <summary>JCGM 100:2008 (GUM), H.3: calibration of a thermometer, t0 = 20 degC; published 3 to 4 digits, recomputed to all.</summary>
    [Fact]
    public void WeightedLine_OnTheGumThermometer_ReachesThePublishedValues()
    {
        double[] t = [21.521, 22.012, 22.512, 23.003, 23.507, 23.999, 24.513, 25.002, 25.503, 26.010, 26.511];
        double[] b = [-0.171, -0.169, -0.166, -0.159, -0.164, -0.165, -0.156, -0.157, -0.159, -0.161, -0.160];
        var x = t.Select(value => value - 20).ToArray();
        var fit = WeightedLine.Fit(x, b, Ones(b.Length))!;
        Assert.Equal(-0.17120379013135, fit.Intercept, 1e-12);
        Assert.Equal(0.00287759783516, fit.InterceptUncertainty * fit.Rescaling, 1e-12);
        Assert.Equal(0.0021826977398873, fit.Slope, 1e-13);
        Assert.Equal(0.00066793877322783, fit.SlopeUncertainty * fit.Rescaling, 1e-13);
        Assert.Equal(-0.93042960309345, fit.Correlation, 1e-11);
        // b(30 degC) with the covariance of both parameters.
        Assert.Equal(-0.14937681273248, fit.At(10), 1e-12);
        var (ua, ub) = (fit.InterceptUncertainty * fit.Rescaling, fit.SlopeUncertainty * fit.Rescaling);
        Assert.Equal(0.0041385957528549, Math.Sqrt((ua * ua) + (100 * ub * ub) + (20 * fit.Correlation * ua * ub)), 1e-12);
    }

    /// <summary>NIST StRD Norris: nested F test of the quadratic term, F(1, 33) = 1.730489867, p = 0.197415268763 (recomputed independently).</summary>
    [Fact]
    public void QuadraticTerm_OnNorris_IsNotSignificant()
    {
        double[] y = [0.1, 338.8, 118.1, 888.0, 9.2, 228.1, 668.5, 998.5, 449.1, 778.9, 559.2, 0.3, 0.1, 778.1, 668.8, 339.3, 448.9, 10.8, 557.7, 228.3, 998.0, 888.8, 119.6, 0.3, 0.6, 557.6, 339.3, 888.0, 998.5, 778.9, 10.2, 117.6, 228.9, 668.4, 449.2, 0.2];
        double[] x = [0.2, 337.4, 118.2, 884.6, 10.1, 226.5, 666.3, 996.3, 448.6, 777.0, 558.2, 0.4, 0.6, 775.5, 666.9, 338.0, 447.5, 11.6, 556.0, 228.1, 995.8, 887.6, 120.2, 0.3, 0.3, 556.8, 339.1, 887.2, 999.0, 779.0, 11.1, 118.3, 229.2, 669.1, 448.9, 0.5];
        Assert.Equal(0.197415268763, ResidualTests.Quadratic(x, y, Ones(y.Length)).P, 1e-9);
    }

    [Fact]
    public void RunsTest_OnAlternatingAndOnOneChange_SeesBoth()
    {
        var alternating = Enumerable.Range(0, 30).Select(i => i % 2 == 0 ? 1.0 : -1).ToArray();
        var split = Enumerable.Range(0, 30).Select(i => i < 15 ? 1.0 : -1).ToArray();
        Assert.True(ResidualTests.Runs(alternating).Z > 4);
        Assert.True(ResidualTests.Runs(split).Z < -4);
    }

    private static double[] Ones(int count) => [.. Enumerable.Repeat(1.0, count)];
}
