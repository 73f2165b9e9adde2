using System.Globalization;

namespace Acquire.Benchmarks;

/// <summary>One line of the table.</summary>
/// <param name="Name">What was measured.</param>
/// <param name="Value">The figure.</param>
/// <param name="Unit">Its unit; <c>x</c> for a ratio.</param>
/// <param name="Limit">What it must not exceed.</param>
/// <param name="Goal">What we aim at; NaN when nothing beyond the limit.</param>
/// <param name="Detail">Medians and spread behind it.</param>
internal sealed record Figure(string Name, double Value, string Unit, double Limit, double Goal, string Detail);

/// <summary>Statistics of a series that one slow scheduling cannot move.</summary>
internal static class Series
{
    /// <summary>The p-quantile, 0 to 1, by nearest rank.</summary>
    public static double Quantile(IEnumerable<double> values, double p)
    {
        var sorted = values.Order().ToArray();
        return sorted[(int)Math.Round((sorted.Length - 1) * p)];
    }

    /// <summary>The median.</summary>
    public static double Median(IEnumerable<double> values) => Quantile(values, 0.5);

    /// <summary>Median and spread in words.</summary>
    public static string Words(IReadOnlyCollection<double> values, string unit) =>
        string.Create(CultureInfo.InvariantCulture, $"median {Median(values):G4} {unit}, p10 {Quantile(values, 0.1):G4}, p90 {Quantile(values, 0.9):G4}, n {values.Count}");
}
