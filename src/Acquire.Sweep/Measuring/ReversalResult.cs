using Acquire.Bench.Readings;

namespace Acquire.Sweep.Measuring;

/// <summary>What a bias reversal gave.</summary>
/// <remarks>
/// Half-difference I = (I+ - I-)/2 removes a constant EMF or background; half-sum (I+ + I-)/2 is that background, kept as an early warning.
/// G = (I+ - I-) / (V+ - V-); u(G) from the variances of both means. Two-step current reversal, common practice.
/// </remarks>
public sealed record ReversalResult(PolaritySeries Plus, PolaritySeries Minus, double RangeA, double SettleS, bool Settled)
{
    /// <summary>Bias magnitude as measured [V].</summary>
    public double BiasV => (Plus.VoltageV - Minus.VoltageV) / 2;

    /// <summary>Conductance [S].</summary>
    public double ConductanceS => (Plus.CurrentA - Minus.CurrentA) / (Plus.VoltageV - Minus.VoltageV);

    /// <summary>Standard uncertainty of the conductance from the scatter [S].</summary>
    public double ConductanceUncertaintyS => Math.Sqrt(Plus.VarianceOfMeanA2 + Minus.VarianceOfMeanA2) / Math.Abs(Plus.VoltageV - Minus.VoltageV);

    /// <summary>Background current [A].</summary>
    public double HalfSumA => (Plus.CurrentA + Minus.CurrentA) / 2;

    /// <summary>What speaks against the result.</summary>
    public Quality Quality => Plus.Faults | Minus.Faults | (Settled ? Quality.Good : Quality.Unsettled)
        | (double.IsFinite(ConductanceS) ? Quality.Good : Quality.Implausible);
}
