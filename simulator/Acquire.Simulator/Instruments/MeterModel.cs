namespace Acquire.Simulator.Instruments;

/// <summary>The constants of a simulated source-meter.</summary>
public sealed record MeterModel
{
    /// <summary>Largest magnitude of the source voltage [V].</summary>
    public required double MostVoltageV { get; init; }

    /// <summary>Smallest step of a reading, as a part of the range.</summary>
    public required double Resolution { get; init; }

    /// <summary>Zero error, the same for all readings, as a part of the range.</summary>
    public required double Offset { get; init; }

    /// <summary>White noise of the input, as a part of the range in a bandwidth of 1 Hz.</summary>
    public required double WhiteNoise { get; init; }

    /// <summary>Relative standard deviation of the 1/f noise of a current, between 0.1 s and 1000 s.</summary>
    public required double FlickerNoise { get; init; }

    /// <summary>Part of full shot noise that the current carries; 1 is Schottky's value.</summary>
    public required double ShotNoise { get; init; }

    /// <summary>Amplitude of the current picked up from the mains [A].</summary>
    public required double LinePickUpA { get; init; }

    /// <summary>True frequency of the mains [Hz]; the instrument reckons with the nominal one, which null stands for.</summary>
    public required double? LineFrequencyHz { get; init; }

    /// <summary>Capacitance of cable and sample [F]; with the sample's resistance it sets how fast a current settles.</summary>
    public required double CableF { get; init; }

    /// <summary>Fastest settling of the instrument itself [s].</summary>
    public required double SettlingTimeS { get; init; }

    /// <summary>Transient after a change of range, as a part of the new range.</summary>
    public required double RangeGlitch { get; init; }

    /// <summary>Time constant of that transient [s].</summary>
    public required double RangeGlitchTimeS { get; init; }

    /// <summary>Standard deviation of the measured voltage [V].</summary>
    public required double VoltageNoiseV { get; init; }
}
