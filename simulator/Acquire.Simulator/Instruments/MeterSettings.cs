namespace Acquire.Simulator.Instruments;

/// <summary>What a source-meter has been told.</summary>
internal sealed class MeterSettings
{
    /// <summary>Full scales of the current ranges, ascending [A].</summary>
    public static readonly double[] RangesA = [1e-9, 1e-8, 1e-7, 1e-6, 1e-5, 1e-4, 1e-3, 1e-2];

    /// <summary>Ranges carry 5 % more than their name before they overload.</summary>
    public const double Headroom = 1.05;

    public double VoltageV { get; set; }

    public bool IsOn { get; set; }

    public double RangeA { get; set; }

    public bool IsAutomatic { get; set; }

    public double LimitA { get; set; }

    public double LineCycles { get; set; }

    public double AppliedV => IsOn ? VoltageV : 0;

    public void Reset() => (VoltageV, IsOn, RangeA, IsAutomatic, LimitA, LineCycles) = (0, false, 1e-4, true, 1e-3, 1);

    /// <summary>The smallest range that carries a current [A].</summary>
    public static double RangeFor(double currentA)
    {
        foreach (var range in RangesA)
            if (Math.Abs(currentA) <= range) return range;
        return RangesA[^1];
    }
}
