namespace Acquire.Simulator.Thermal;

/// <summary>First-order relaxation: what is gone of a difference after a time.</summary>
internal static class Relaxation
{
    /// <summary>1 - exp(-x) for a time of x time constants, without loss of digits for small x.</summary>
    /// <remarks>double.ExpM1 of the runtime is Math.Exp(x) - 1 and loses them; the hyperbolic sine does not.</remarks>
    public static double Gone(double timeConstants) =>
        timeConstants > 1 ? 1 - Math.Exp(-timeConstants) : 2 * Math.Sinh(timeConstants / 2) * Math.Exp(-timeConstants / 2);
}
