namespace Acquire.Sweep.Measuring;

/// <summary>Which current range suits a signal; chosen before a point and locked for it.</summary>
public static class RangeChoice
{
    /// <summary>Head room over the expected current, so that noise, light and drift do not overrange.</summary>
    public const double HeadRoom = 1.3;

    /// <summary>Index of the smallest range that holds the current with head room; the largest range when none does or nothing is known.</summary>
    public static int For(double currentA, IReadOnlyList<double> rangesA)
    {
        for (var i = 0; i < rangesA.Count; i++)
        {
            if (Math.Abs(currentA) * HeadRoom <= rangesA[i])
            {
                return i;
            }
        }

        return rangesA.Count - 1;
    }
}
