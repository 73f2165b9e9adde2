namespace Acquire.Sweep.Gates;

/// <summary>Whether a signal has settled: the means of two adjacent windows agree, twice in a row.</summary>
/// <remarks>
/// Accepts when |m2 - m1| &lt;= max(2 SEM, relative * |m2|), SEM the standard error of the difference from the scatter inside both windows.
/// Needs at least three windows. A value that is not a number starts it again. A recommended default of the field, common practice.
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
        var sem = Math.Sqrt((s1 + s2) / window);
        _agreements = Math.Abs(m2 - m1) <= Math.Max(2 * sem, relative * Math.Abs(m2)) ? _agreements + 1 : 0;
        if (_values.Count > 8 * window)
        {
            _values.RemoveRange(0, 4 * window);
        }

        return IsSettled;
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
