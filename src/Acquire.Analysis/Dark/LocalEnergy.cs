using Acquire.Analysis.Regression;
using Acquire.Physics;

namespace Acquire.Analysis.Dark;

/// <summary>The local slope energy of a dark curve.</summary>
/// <remarks>
/// Model      Ea(T) = -d ln G / d(1/kT) from straight lines over five neighbouring points of one leg
/// Result     eV, with a standard uncertainty from the scatter inside the five points
/// Source     common practice: the most informative plot of an activated conductance
/// </remarks>
public static class LocalEnergy
{
    private const int Window = 5;

    /// <summary>Slope energies, leg by leg, cold to hot.</summary>
    public static IReadOnlyList<LocalEnergyPoint> Of(IReadOnlyList<ConductancePoint> points)
    {
        var (all, _) = DarkCurve.From(points);
        var result = new List<LocalEnergyPoint>();
        foreach (var leg in all.Points.GroupBy(point => point.Leg).OrderBy(leg => leg.Key))
        {
            var (curve, _) = DarkCurve.From([.. leg]);
            for (var from = 0; from + Window <= curve.Count; from++)
            {
                var range = from..(from + Window);
                var unit = Enumerable.Repeat(1.0, Window).ToArray();
                if (WeightedLine.Fit(curve.X[range], curve.Y[range], unit) is { } line)
                {
                    var middle = 1 / (curve.X[range].Average() * SI.BoltzmannEVPerK);
                    result.Add(new(middle, -line.Slope, line.SlopeUncertainty * line.Rescaling, leg.Key));
                }
            }
        }

        return result;
    }
}
