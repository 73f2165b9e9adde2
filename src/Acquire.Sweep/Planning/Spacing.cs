namespace Acquire.Sweep.Planning;

/// <summary>The temperatures of a leg.</summary>
/// <remarks>
/// Equal steps in 1/T (or in T) from one end to the other, both ends included; then every step longer than the cap is divided evenly
/// and points closer than the floor to their neighbour are left out. Common practice: floor 1 K, cap 10 K.
/// </remarks>
public static class Spacing
{
    /// <summary>Temperatures [K] in the order of the leg, strictly monotonic, ends exact.</summary>
    public static IReadOnlyList<double> Temperatures(double fromK, double toK, int points, bool reciprocal, (double LeastK, double LargestK) step)
    {
        var even = new double[points];
        for (var i = 0; i < points; i++)
        {
            var fraction = (double)i / (points - 1);
            even[i] = reciprocal ? 1 / ((1 / fromK) + (fraction * ((1 / toK) - (1 / fromK)))) : fromK + (fraction * (toK - fromK));
        }

        even[0] = fromK;
        even[^1] = toK;
        return WithFloor(WithCap(even, step.LargestK), step.LeastK);
    }

    private static List<double> WithCap(double[] temperatures, double largestK)
    {
        var result = new List<double> { temperatures[0] };
        for (var i = 1; i < temperatures.Length; i++)
        {
            var gap = temperatures[i] - temperatures[i - 1];
            var parts = (int)Math.Max(1, Math.Ceiling((Math.Abs(gap) / largestK) - 1e-9));
            for (var part = 1; part < parts; part++)
            {
                result.Add(temperatures[i - 1] + (gap * part / parts));
            }

            result.Add(temperatures[i]);
        }

        return result;
    }

    private static List<double> WithFloor(List<double> temperatures, double leastK)
    {
        var last = temperatures[^1];
        var result = new List<double> { temperatures[0] };
        foreach (var temperature in temperatures.Skip(1).SkipLast(1))
        {
            if (Math.Abs(temperature - result[^1]) >= leastK - 1e-9 && Math.Abs(last - temperature) >= leastK - 1e-9)
            {
                result.Add(temperature);
            }
        }

        result.Add(last);
        return result;
    }
}
