using Acquire.Bench.Readings;

namespace Acquire.Drivers.Replies;

/// <summary>A number that stands for the absence of one.</summary>
/// <param name="Value">The number, before scaling.</param>
/// <param name="Means">What it says about the reading.</param>
public sealed record OverloadMarker(double Value, Quality Means)
{
    // Some instruments round through single precision, and 9.9E37 and 9.91E37 differ by 1e-3: hence this tolerance.
    private const double RelativeTolerance = 1e-4;

    /// <summary>Plus and minus infinity and not-a-number as SCPI-1999, volume 1, 7.2.1 writes them.</summary>
    public static IReadOnlyList<OverloadMarker> Scpi { get; } =
        [new(9.9E37, Quality.Overrange), new(-9.9E37, Quality.Overrange), new(9.91E37, Quality.Overrange)];

    /// <summary>True when a number read from the instrument is this marker.</summary>
    public bool Matches(double number) => Math.Abs(number - Value) <= RelativeTolerance * Math.Abs(Value);
}
