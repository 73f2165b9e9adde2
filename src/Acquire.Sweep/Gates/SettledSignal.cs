namespace Acquire.Sweep.Gates;

/// <summary>Whether a signal has settled: the means of two adjacent windows agree, twice in a row.</summary>
/// <remarks>
/// Accepts when |m2 - m1| &lt;= max(2 SEM, relative * |m2|), SEM the standard error of the difference from the scatter inside both windows,
/// and when what an exponential through the last three means would still bring is at most the relative bound too. Needs three windows.
/// A value that is not a number starts it again. Window test: common practice; extrapolation: Aitken 1926, Proc. R. Soc. Edinburgh 46, 289.
/// </remarks>
public sealed class SettledSignal(int window, double relative)
{
    private readonly List<double> _values = [];
    private int _agreements;

    /// <summary>True once the signal has settled.</summary>
    public bool IsSettled => _agreements >= 2;

    /// <summary>Adds a value; true once the signal has settled.</summary>
    public bool Add(double value)
    {
        if (!double.IsFinite(value))
        {
            _values.Clear();
            _agreements = 0;
            return false;
        }

        _values.Add(value);
        if (_values.Count % window != 0 || _values.Count < 2 * window)
        {
            return IsSettled;
        }

        var (m1, s1) = Mean(_values.Count - (2 * window));
        var (m2, s2) = Mean(_values.Count - window);
        var noise = 2 * Math.Sqrt((s1 + s2) / window);
        var agrees = Math.Abs(m2 - m1) <= Math.Max(noise, relative * Math.Abs(m2))
            && (_values.Count < 3 * window || Rest(m1, m2, noise) <= relative * Math.Abs(m2));
        _agreements = agrees ? _agreements + 1 : 0;
        if (_values.Count > 8 * window)
        {
            _values.RemoveRange(0, 4 * window);
        }

        return IsSettled;
    }

    /// <summary>
    /// What is still to come if the last three windows lie on one exponential (Aitken's extrapolation); zero when their steps drown in the noise.
    /// Two windows that are short against the time constant agree long before the signal has arrived.
    /// </summary>
    private double Rest(double m1, double m2, double noise)
    {
        var before = m1 - Mean(_values.Count - (3 * window)).Mean;
        var last = m2 - m1;
        if (Math.Abs(last) <= noise || before * last <= 0)
        {
            return 0;
        }

        return Math.Abs(last) < Math.Abs(before) ? last * last / Math.Abs(before - last) : double.PositiveInfinity;
    }

    private (double Mean, double Variance) Mean(int from)
    {
        var mean = 0.0;
        for (var i = from; i < from + window; i++)
        {
            mean += _values[i];
        }

        mean /= window;
        var sum = 0.0;
        for (var i = from; i < from + window; i++)
        {
            sum += (_values[i] - mean) * (_values[i] - mean);
        }

        return (mean, sum / (window - 1));
    }
}
