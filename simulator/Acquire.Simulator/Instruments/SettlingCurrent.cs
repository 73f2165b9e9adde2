using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Instruments;

/// <summary>A current on its way to a steady value, first order and exact for any interval.</summary>
internal sealed class SettlingCurrent
{
    private double _valueA;
    private double _atS;

    /// <summary>Lets time pass up to <paramref name="nowS"/> with a constant steady value.</summary>
    public void MoveTo(double nowS, double steadyA, double timeConstantS)
    {
        if (nowS <= _atS) return;
        _valueA = steadyA + ((_valueA - steadyA) * Math.Exp(-(nowS - _atS) / timeConstantS));
        _atS = nowS;
    }

    /// <summary>The mean over the coming interval [A].</summary>
    public double MeanOver(double intervalS, double steadyA, double timeConstantS) =>
        steadyA + ((_valueA - steadyA) * timeConstantS / intervalS * Relaxation.Gone(intervalS / timeConstantS));
}
