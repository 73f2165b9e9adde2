namespace Acquire.Bench.Readings;

/// <summary>One value as an instrument gave it, in SI, with its quality; the raw text is kept when the quality is not good.</summary>
/// <remarks>Invariant: a quality that is good has a finite value; made by <see cref="Good"/> and <see cref="Bad"/> only.</remarks>
public readonly record struct Measured
{
    private Measured(double value, Quality quality, string? raw)
    {
        Value = value;
        Quality = quality;
        Raw = raw;
    }

    /// <summary>The value in SI units; NaN when there is none.</summary>
    public double Value { get; }

    /// <summary>What speaks against the value.</summary>
    public Quality Quality { get; }

    /// <summary>The reply as received, when it could not be used as it was.</summary>
    public string? Raw { get; }

    /// <summary>True when nothing speaks against the value.</summary>
    public bool IsGood => Quality == Quality.Good;

    /// <summary>A usable value; anything not finite becomes implausible, so that a good value is always finite.</summary>
    public static Measured Good(double value) =>
        double.IsFinite(value) ? new(value, Quality.Good, null) : new(double.NaN, Quality.Implausible, null);

    /// <summary>A value that must not be used, with the reply it came from.</summary>
    public static Measured Bad(Quality quality, string? raw = null, double value = double.NaN)
    {
        ArgumentOutOfRangeException.ThrowIfEqual((int)quality, (int)Quality.Good);
        return new(value, quality, raw);
    }
}
