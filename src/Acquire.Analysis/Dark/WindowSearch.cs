using Acquire.Analysis.Regression;
using Acquire.Physics;

namespace Acquire.Analysis.Dark;

/// <summary>A candidate window and what the line through it leaves.</summary>
internal sealed record CandidateWindow(int From, int To, LineFit Line, double CurvatureEV, double RunsP, double QuadraticP, double ResidualSd)
{
    public int Count => To - From;
}

/// <summary>Looks for the window of a straight line by rule, never by eye.</summary>
/// <remarks>
/// Candidates  every contiguous set of six or more points that ends at the hottest usable point, since the intrinsic side is the hot one
/// Flattened   with a material, ln G less ln sigma_i(T) is tested, so that the known curvature of gap and prefactors does not count;
///             without one, ln G itself
/// Rejected    when the slope energy is not above 3 kT (not activated); when the flattened slope changes across the window by more than 1 % of the energy with
///             p below 1 % (two regimes); when the residuals' runs are improbable (|Z| above 1.96) and larger than 0.5 %; when ln G spans less than 0.8
/// Chosen      the longest that is left. A break point is never used as an edge
/// Source      rules of common practice; runs test Wald and Wolfowitz 1940; nested F test
/// </remarks>
internal sealed class WindowSearch(DarkCurve curve, Material? material)
{
    public const int FewestPoints = 6;
    public const double WantedSpan = 2.3;
    private const double LeastSpan = 0.8;
    private const double MostSlopeChange = 0.01;
    private const double QuadraticLevel = 0.01;
    private const double RunsLimit = 1.96;
    private const double HarmlessResidual = 0.005;

    /// <summary>The admissible windows, longest first, and how many were rejected.</summary>
    public (IReadOnlyList<CandidateWindow> Admissible, int Rejected, bool AnyActivated) Find()
    {
        var admissible = new List<CandidateWindow>();
        var rejected = 0;
        var activated = false;
        for (var from = 0; curve.Count - from >= FewestPoints; from++)
        {
            if (Candidate(from, curve.Count) is not { } window)
            {
                rejected++;
                continue;
            }

            var middleEV = 1 / curve.X[from..].Average();
            var isActivated = -window.Line.Slope > 3 * middleEV;
            activated |= isActivated;
            if (isActivated && IsStraight(window) && Span(window) >= LeastSpan)
            {
                admissible.Add(window);
            }
            else
            {
                rejected++;
            }
        }

        return ([.. admissible.OrderByDescending(window => window.Count)], rejected, activated);
    }

    /// <summary>ln G at the hot end less ln G at the cold end.</summary>
    public double Span(CandidateWindow window) => curve.Y[window.To - 1] - curve.Y[window.From];

    private static bool IsStraight(CandidateWindow window)
    {
        var bent = window.QuadraticP < QuadraticLevel && Math.Abs(window.CurvatureEV) > MostSlopeChange * -window.Line.Slope;
        var z = Math.Abs(MathNet.Numerics.Distributions.Normal.InvCDF(0, 1, Math.Max(window.RunsP / 2, 1e-300)));
        var patterned = z > RunsLimit && window.ResidualSd > HarmlessResidual;
        return !bent && !patterned;
    }

    private CandidateWindow? Candidate(int from, int to)
    {
        var range = from..to;
        var x = curve.X[range];
        var y = curve.Y[range];
        var weights = curve.Uncertainties(0)[range];
        if (WeightedLine.Fit(x, y, weights) is not { } start)
        {
            return null;
        }

        // Stated uncertainties far below the real scatter would let one or two points rule: a floor of the scatter itself evens them out.
        var u = Floored(curve.Uncertainties(-start.Slope)[range], start, x, y);
        if (WeightedLine.Fit(x, y, u) is not { } line)
        {
            return null;
        }

        var flat = Flattened(range, y);
        var (curvature, quadraticP) = ResidualTests.Quadratic(x, flat, u);
        var residuals = Residuals(x, flat, u);
        var sd = Math.Sqrt(residuals.Sum(residual => residual * residual) / (x.Length - 2));
        return new(from, to, line, 2 * curvature * (x[0] - x[^1]), ResidualTests.Runs(residuals).P, quadraticP, sd);
    }

    /// <summary>The uncertainties of a range with a floor of half the scatter.</summary>
    public static double[] Floored(double[] stated, LineFit line, double[] x, double[] y)
    {
        var sum = 0.0;
        for (var i = 0; i < x.Length; i++)
        {
            sum += (y[i] - line.At(x[i])) * (y[i] - line.At(x[i]));
        }

        var floor = 0.5 * Math.Sqrt(sum / (x.Length - 2));
        return [.. stated.Select(value => Math.Max(value, floor))];
    }

    private double[] Flattened(Range range, double[] y) => material is null
        ? y
        : [.. curve.Points.Take(range).Select((point, i) => y[i] - Math.Log(material.IntrinsicConductivitySPerM(point.TemperatureK)))];

    private static double[] Residuals(double[] x, double[] y, double[] u)
    {
        var line = WeightedLine.Fit(x, y, u);
        return [.. x.Select((value, i) => y[i] - (line?.At(value) ?? 0))];
    }
}
