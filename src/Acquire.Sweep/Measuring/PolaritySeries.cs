using Acquire.Bench.Readings;
using Acquire.Bench.Roles;

namespace Acquire.Sweep.Measuring;

/// <summary>Good readings of one polarity. Nothing that is not good ever enters a mean; what was not good is remembered.</summary>
public sealed class PolaritySeries
{
    private readonly List<double> _currentsA = [];
    private readonly List<double> _voltagesV = [];

    /// <summary>Good readings.</summary>
    public int Count => _currentsA.Count;

    /// <summary>What spoke against the readings that were not good.</summary>
    public Quality Faults { get; private set; }

    /// <summary>Mean current [A]; NaN without readings.</summary>
    public double CurrentA => Mean(_currentsA);

    /// <summary>Mean voltage [V]; NaN without readings.</summary>
    public double VoltageV => Mean(_voltagesV);

    /// <summary>Variance of the mean current [A^2]; NaN with fewer than two readings.</summary>
    public double VarianceOfMeanA2
    {
        get
        {
            if (Count < 2)
            {
                return double.NaN;
            }

            var mean = CurrentA;
            return _currentsA.Sum(value => (value - mean) * (value - mean)) / (Count - 1) / Count;
        }
    }

    /// <summary>Takes a reading.</summary>
    public void Add(in SourceReading reading)
    {
        if (reading.CurrentA.IsGood && reading.VoltageV.IsGood)
        {
            _currentsA.Add(reading.CurrentA.Value);
            _voltagesV.Add(reading.VoltageV.Value);
        }
        else
        {
            Faults |= reading.CurrentA.Quality | reading.VoltageV.Quality;
        }
    }

    private static double Mean(List<double> values) => values.Count == 0 ? double.NaN : values.Average();
}
