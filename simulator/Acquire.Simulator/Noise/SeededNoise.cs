namespace Acquire.Simulator.Noise;

/// <summary>A source of random numbers whose sequence depends on its seed and on nothing else.</summary>
/// <remarks>
/// Generator  xoshiro256**, its state filled by splitmix64 from the seed; period 2^256 - 1.
/// Normal     Marsaglia's polar method, both halves of a pair used.
/// Source     D. Blackman, S. Vigna, ACM Trans. Math. Softw. 47, 36 (2021), 10.1145/3460772; public-domain reference code.
///            G. Marsaglia, T. A. Bray, SIAM Rev. 6, 260 (1964), 10.1137/1006063.
/// </remarks>
public sealed class SeededNoise
{
    private ulong _s0;
    private ulong _s1;
    private ulong _s2;
    private ulong _s3;
    private double _spare = double.NaN;

    /// <summary>Starts the sequence of a seed.</summary>
    public SeededNoise(ulong seed)
    {
        Seed = seed;
        var state = seed;
        _s0 = SplitMix(ref state);
        _s1 = SplitMix(ref state);
        _s2 = SplitMix(ref state);
        _s3 = SplitMix(ref state);
    }

    /// <summary>The seed this sequence started from.</summary>
    public ulong Seed { get; }

    /// <summary>
    /// An independent sequence for a named part, from this one's seed and the name alone, so that asking one instrument
    /// more often does not change the noise of another.
    /// </summary>
    public SeededNoise For(string name)
    {
        ArgumentNullException.ThrowIfNull(name);
        // FNV-1a, 64 bit; string.GetHashCode differs from process to process.
        var hash = 14695981039346656037UL;
        foreach (var c in name) hash = (hash ^ c) * 1099511628211UL;
        return new SeededNoise(Seed ^ hash);
    }

    /// <summary>The next 64 random bits.</summary>
    public ulong NextBits()
    {
        var result = ulong.RotateLeft(_s1 * 5, 7) * 9;
        var t = _s1 << 17;
        _s2 ^= _s0;
        _s3 ^= _s1;
        _s1 ^= _s2;
        _s0 ^= _s3;
        _s2 ^= t;
        _s3 = ulong.RotateLeft(_s3, 45);
        return result;
    }

    /// <summary>A number from 0 (included) to 1 (excluded), 53 random bits.</summary>
    public double NextUniform() => (NextBits() >> 11) * (1.0 / (1UL << 53));

    /// <summary>A number from the normal distribution with mean 0 and standard deviation 1.</summary>
    public double NextNormal()
    {
        if (!double.IsNaN(_spare))
        {
            var kept = _spare;
            _spare = double.NaN;
            return kept;
        }
        double u, v, s;
        do
        {
            u = (2 * NextUniform()) - 1;
            v = (2 * NextUniform()) - 1;
            s = (u * u) + (v * v);
        }
        while (s is >= 1 or 0);
        var scale = Math.Sqrt(-2 * Math.Log(s) / s);
        _spare = v * scale;
        return u * scale;
    }

    private static ulong SplitMix(ref ulong state)
    {
        state += 0x9E3779B97F4A7C15UL;
        var z = state;
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
        return z ^ (z >> 31);
    }
}
