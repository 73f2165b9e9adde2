namespace Acquire.Simulator.Noise;

/// <summary>A value that wanders about zero with standard deviation 1 and forgets itself over a correlation time.</summary>
/// <remarks>
/// Model      Ornstein-Uhlenbeck process, autocorrelation exp(-t/tau); the step is exact for any interval, so that the
///            statistics do not depend on how often somebody asks.
/// Source     D. T. Gillespie, Phys. Rev. E 54, 2084 (1996), 10.1103/PhysRevE.54.2084, eq. 3.1.
/// </remarks>
public sealed class RelaxingNoise(SeededNoise noise, double correlationTimeS)
{
    private double _value = noise.NextNormal();
    private double _atS;

    /// <summary>The value at a time [s] that never goes back.</summary>
    public double At(double timeS)
    {
        var elapsedS = timeS - _atS;
        if (elapsedS <= 0) return _value;
        _atS = timeS;
        var kept = Math.Exp(-elapsedS / correlationTimeS);
        _value = (_value * kept) + (Math.Sqrt(1 - (kept * kept)) * noise.NextNormal());
        return _value;
    }
}

/// <summary>Noise with a spectrum close to 1/f between two correlation times, standard deviation 1.</summary>
/// <remarks>
/// Model      equal parts of relaxing noises whose correlation times are spaced by a factor of 10.
/// Source     A. van der Ziel, Physica 16, 359 (1950), 10.1016/0031-8914(50)90078-4.
/// </remarks>
public sealed class FlickerNoise
{
    private readonly RelaxingNoise[] _parts;

    /// <summary>Builds the parts from <paramref name="shortestS"/> to <paramref name="longestS"/>, one a decade.</summary>
    public FlickerNoise(SeededNoise noise, double shortestS, double longestS)
    {
        var decades = Math.Max(1, (int)Math.Round(Math.Log10(longestS / shortestS)) + 1);
        _parts = new RelaxingNoise[decades];
        for (var i = 0; i < decades; i++) _parts[i] = new RelaxingNoise(noise, shortestS * Math.Pow(10, i));
    }

    /// <summary>The value at a time [s] that never goes back.</summary>
    public double At(double timeS)
    {
        var sum = 0.0;
        foreach (var part in _parts) sum += part.At(timeS);
        return sum / Math.Sqrt(_parts.Length);
    }
}
