using Acquire.Physics;

namespace Acquire.Analysis.Dark;

/// <summary>The usable points of a dark curve, cold to hot, in the coordinates of the Arrhenius plot.</summary>
/// <remarks>Invariants: T rises; x = 1/kT [1/eV] falls; y = ln G; all finite.</remarks>
internal sealed class DarkCurve
{
    private DarkCurve(List<ConductancePoint> points)
    {
        Points = points;
        X = [.. points.Select(point => 1 / SI.ThermalEV(point.TemperatureK))];
        Y = [.. points.Select(point => Math.Log(point.ConductanceS))];
    }

    public IReadOnlyList<ConductancePoint> Points { get; }

    public double[] X { get; }

    public double[] Y { get; }

    public int Count => Points.Count;

    /// <summary>Keeps what can be used and says why the rest cannot.</summary>
    public static (DarkCurve Curve, List<ExcludedPoint> Excluded) From(IReadOnlyList<ConductancePoint> points)
    {
        var excluded = new List<ExcludedPoint>();
        var usable = new List<ConductancePoint>();
        foreach (var point in points)
        {
            var reason = point.ExcludedReason
                ?? (!double.IsFinite(point.TemperatureK) || point.TemperatureK <= 0 ? "no temperature"
                : !double.IsFinite(point.ConductanceS) ? "no conductance"
                : point.ConductanceS <= 0 ? "conductance zero or negative" : null);
            if (reason is null)
            {
                usable.Add(point);
            }
            else
            {
                excluded.Add(new(point.Index, reason));
            }
        }

        return (new([.. usable.OrderBy(point => point.TemperatureK).ThenBy(point => point.Index)]), excluded);
    }

    /// <summary>
    /// Standard uncertainties of y for a slope energy [eV], after the effective variance: u(ln G)^2 = (u(G)/G)^2 + (Ea u(T)/(k T^2))^2;
    /// one part in a million where none was stated, so that the scatter decides.
    /// </summary>
    public double[] Uncertainties(double energyEV) =>
        [.. Points.Select(point =>
        {
            var relative = point.ConductanceUncertaintyS / point.ConductanceS;
            var thermal = energyEV * point.TemperatureUncertaintyK * TemperatureSensitivity.PerKelvin(1, point.TemperatureK);
            var sum = Math.Sqrt(((double.IsFinite(relative) ? relative * relative : 0)) + (double.IsFinite(thermal) ? thermal * thermal : 0));
            return Math.Max(sum, 1e-6);
        })];

    /// <summary>True when uncertainties were stated.</summary>
    public bool HasUncertainties => Points.Any(point => point.ConductanceUncertaintyS > 0);
}
