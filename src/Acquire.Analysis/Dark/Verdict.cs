using Acquire.Physics;

namespace Acquire.Analysis.Dark;

/// <summary>A cautious verdict: pass, fail or inconclusive, with reasons. Inconclusive is normal.</summary>
/// <remarks>
/// sigma/sigma_i = sqrt(1 + y^2/4) +- c y/2 with y = |N|/n_i, c = (b - 1)/(b + 1), b = mu_n/mu_p, + for n-type; solved for y at the measured excess plus
/// two standard uncertainties, which gives a bound on the net active doping for both signs. n_i and mobilities are taken as uncertain by 10 %.
/// Conductivity sees net active doping only: compensation can hide more.
/// </remarks>
internal static class Verdict
{
    private const double SetUncertainty = 0.10;
    private const double WidestUseful = 0.05;
    private const double LeastFailure = 0.03;
    private const double LegTolerance = 0.02;

    public static IntrinsicVerdict Of(FitContext context, CorrectedEnergy? corrected)
    {
        if (context.Settings.Material is not { } material || corrected is null)
        {
            return new("inconclusive", ["no material was named, so there is no expected gap to compare with"], double.NaN, double.NaN, "none");
        }

        var reasons = new List<string>();
        var difference = corrected.TwiceEV - corrected.ExpectedLinearGapEV;
        var inUnits = Math.Abs(difference) / corrected.StandardUncertaintyEV;
        reasons.Add(FormattableString.Invariant($"twice the corrected slope differs from the expected linear gap by {1000 * difference:F1} meV, {inUnits:F1} standard uncertainties"));
        var agrees = inUnits <= 2 && corrected.StandardUncertaintyEV <= WidestUseful;
        var contradicts = inUnits > 3 && Math.Abs(difference) > LeastFailure;
        if (corrected.StandardUncertaintyEV > WidestUseful)
        {
            reasons.Add(FormattableString.Invariant($"the uncertainty of {1000 * corrected.StandardUncertaintyEV:F0} meV is too wide for a pass (50 meV)"));
        }

        agrees &= LegsAgree(context, reasons);
        var (nType, pType) = (double.NaN, double.NaN);
        if (double.IsFinite(context.Settings.GeometryPerM))
        {
            (var level, nType, pType) = Level(context, material, reasons);
            agrees &= level;
        }
        else
        {
            agrees = false;
            reasons.Add("the geometry is unknown, so the conductivity itself was not compared, and no pass is given");
        }

        reasons.Add("conductivity sees net active doping only; compensation can hide more");
        return new(contradicts ? "fail" : agrees ? "pass" : "inconclusive", reasons, nType, pType, material.Set);
    }

    private static bool LegsAgree(FitContext context, List<string> reasons)
    {
        var byLeg = Enumerable.Range(context.Window.From, context.Window.Count).GroupBy(i => context.Curve.Points[i].Leg)
            .Where(leg => leg.Count() >= 3)
            .Select(leg => leg.Average(i => context.Curve.Y[i] - context.Window.Line.At(context.Curve.X[i]))).ToList();
        if (byLeg.Count < 2)
        {
            reasons.Add("one leg only: hysteresis was not tested, so no pass");
            return false;
        }

        var apart = byLeg.Max() - byLeg.Min();
        var agree = apart <= LegTolerance;
        reasons.Add(FormattableString.Invariant($"the legs {(agree ? "agree" : "differ")}: {100 * apart:F2} % apart on average (2 % allowed)"));
        return agree;
    }

    /// <summary>sigma against sigma_i at the cold end, middle and hot end of the window, and the bounds from its cold end, where doping shows most.</summary>
    private static (bool Agrees, double NTypePerCm3, double PTypePerCm3) Level(FitContext context, Material material, List<string> reasons)
    {
        var points = context.Curve.Points.Skip(context.Window.From).Take(context.Window.Count).ToList();
        var ratios = new[] { points[0], points[points.Count / 2], points[^1] }
            .Select(point => point.ConductanceS * context.Settings.GeometryPerM / material.IntrinsicConductivitySPerM(point.TemperatureK)).ToList();
        var agrees = ratios.TrueForAll(ratio => ratio is > 0.8 and < 1.3);
        reasons.Add(FormattableString.Invariant($"sigma/sigma_i is {ratios[0]:F2}, {ratios[1]:F2}, {ratios[2]:F2} at the cold end, middle and hot end of the window{(agrees ? "" : ": outside 0.8 to 1.3")}"));
        var cold = points[0].TemperatureK;
        var intrinsic = material.IntrinsicDensityPerM3(cold) / 1e6;
        var mobilityRatio = material.ElectronMobilityM2PerVs.At(cold) / material.HoleMobilityM2PerVs.At(cold);
        var c = (mobilityRatio - 1) / (mobilityRatio + 1);
        var most = ratios[0] * (1 + (2 * SetUncertainty));
        return (agrees, intrinsic * Bound(most, c), intrinsic * Bound(most, -c));
    }

    /// <summary>The larger y with sqrt(1 + y^2/4) + c y/2 = ratio; zero when the ratio excludes every y.</summary>
    private static double Bound(double ratio, double c)
    {
        // (ratio - c y/2)^2 = 1 + y^2/4 is a quadratic in y: y^2 (1 - c^2)/4 + ratio c y + 1 - ratio^2 = 0.
        var a = (1 - (c * c)) / 4;
        var discriminant = (ratio * ratio * c * c) - (4 * a * (1 - (ratio * ratio)));
        return discriminant < 0 ? 0 : Math.Max(0, ((-ratio * c) + Math.Sqrt(discriminant)) / (2 * a));
    }
}
