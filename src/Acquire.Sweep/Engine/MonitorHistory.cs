namespace Acquire.Sweep.Engine;

/// <summary>Temperatures over an interval.</summary>
/// <param name="StageK">Mean stage temperature [K].</param>
/// <param name="SampleK">Mean sample temperature [K].</param>
/// <param name="SampleSpreadK">Standard deviation of the sample temperature [K].</param>
/// <param name="MonitorA">Mean light monitor current [A]; NaN without a lamp.</param>
/// <param name="Count">Ticks in the interval.</param>
public readonly record struct IntervalMeans(double StageK, double SampleK, double SampleSpreadK, double MonitorA, int Count);

/// <summary>The last monitor ticks, so that temperatures are averaged over the very interval of the current.</summary>
public sealed class MonitorHistory
{
    private const int Capacity = 16_384;
    private readonly (double AtS, double StageK, double SampleK, double MonitorA)[] _ring = new (double, double, double, double)[Capacity];
    private long _count;

    /// <summary>Adds a tick.</summary>
    public void Add(double atS, double stageK, double sampleK, double monitorA) => _ring[_count++ % Capacity] = (atS, stageK, sampleK, monitorA);

    /// <summary>Means over the good ticks from one moment to another [s].</summary>
    public IntervalMeans Over(double fromS, double toS)
    {
        double stage = 0, sample = 0, squares = 0, monitor = 0, reference = double.NaN;
        var count = 0;
        for (var i = _count - 1; i >= Math.Max(0, _count - Capacity) && _ring[i % Capacity].AtS >= fromS; i--)
        {
            var tick = _ring[i % Capacity];
            if (tick.AtS > toS || !double.IsFinite(tick.SampleK) || !double.IsFinite(tick.StageK))
            {
                continue;
            }

            reference = double.IsNaN(reference) ? tick.SampleK : reference; // sums near zero keep their digits
            count++;
            stage += tick.StageK;
            sample += tick.SampleK - reference;
            squares += (tick.SampleK - reference) * (tick.SampleK - reference);
            monitor += tick.MonitorA;
        }

        if (count == 0)
        {
            return new(double.NaN, double.NaN, double.NaN, double.NaN, 0);
        }

        var mean = sample / count;
        var spread = count > 1 ? Math.Sqrt(Math.Max(0, (squares - (count * mean * mean)) / (count - 1))) : double.NaN;
        return new(stage / count, reference + mean, spread, monitor / count, count);
    }
}
