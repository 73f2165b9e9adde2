using Acquire.Bench.Text;

namespace Acquire.Bench.Files;

/// <summary>One instrument of a bench.</summary>
/// <param name="Name">The name that the wiring uses.</param>
/// <param name="Driver">Name of the driver file, without its ending.</param>
/// <param name="Address">Address in VISA resource syntax.</param>
/// <param name="TimeOutS">Longest wait for an answer [s], real time.</param>
/// <param name="Serial">Framing of a serial line.</param>
/// <param name="At">Where it stands in the file.</param>
public sealed record InstrumentEntry(string Name, string Driver, string Address, double TimeOutS, SerialEntry Serial, Position At);

/// <summary>Framing of a serial line.</summary>
public sealed record SerialEntry(int Baud, string Parity, int DataBits, int StopBits);

/// <summary>Who controls the temperature.</summary>
/// <param name="Instrument">Name of the instrument.</param>
/// <param name="StageUncertaintyK">Standard uncertainty common to all stage readings [K].</param>
/// <param name="SampleUncertaintyK">Standard uncertainty common to all sample readings [K].</param>
/// <param name="SensorFromK">Lowest reading that can be true [K].</param>
/// <param name="SensorToK">Highest reading that can be true [K].</param>
public sealed record LoopWiring(string Instrument, double StageUncertaintyK, double SampleUncertaintyK, double SensorFromK, double SensorToK);

/// <summary>Who applies the bias and reads the current.</summary>
public sealed record MeterWiring(string Instrument, string Connection);

/// <summary>Who lights the sample.</summary>
/// <param name="Instrument">Name of the instrument.</param>
/// <param name="WavelengthM">Wavelength [m].</param>
/// <param name="RatedDriveA">Rated drive current [A].</param>
/// <param name="IrradianceAtRatedWPerM2">Irradiance on the sample at the rated drive [W/m2].</param>
/// <param name="At">Where it stands in the file.</param>
public sealed record LampWiring(string Instrument, double WavelengthM, double RatedDriveA, double IrradianceAtRatedWPerM2, Position At);

/// <summary>Who plays which role.</summary>
public sealed record Wiring(LoopWiring Loop, MeterWiring Meter, LampWiring? Lamp);

/// <summary>What the bench may be asked for; SI.</summary>
public sealed record BenchLimits
{
    /// <summary>Coldest set point [K].</summary>
    public required double TemperatureFromK { get; init; }

    /// <summary>Hottest set point [K].</summary>
    public required double TemperatureToK { get; init; }

    /// <summary>Stage or sample above this trips [K].</summary>
    public required double OverTemperatureK { get; init; }

    /// <summary>Fastest ramp [K/s].</summary>
    public required double RampKPerS { get; init; }

    /// <summary>Heater rating [W].</summary>
    public required double HeaterPowerW { get; init; }

    /// <summary>Largest bias magnitude [V].</summary>
    public required double BiasV { get; init; }

    /// <summary>Current limit of the source [A].</summary>
    public required double CurrentA { get; init; }

    /// <summary>Largest irradiance [W/m2].</summary>
    public required double IrradianceWPerM2 { get; init; }

    /// <summary>Where each limit stands, by its key in the file.</summary>
    public required IReadOnlyDictionary<string, Position> At { get; init; }
}

/// <summary>A protection in hardware, and when it was last tested.</summary>
public sealed record Protection(string What, DateOnly LastTest);

/// <summary>A bench: instruments, wiring, limits, protections.</summary>
public sealed record BenchFile
{
    /// <summary>The bench's name.</summary>
    public required string Title { get; init; }

    /// <summary>The file and its exact text.</summary>
    public required SourceText Source { get; init; }

    /// <summary>The twin file, relative to the bench file, or null.</summary>
    public required string? TwinFile { get; init; }

    /// <summary>True when our own simulator serves the addresses; never real hardware then.</summary>
    public required bool Simulated { get; init; }

    /// <summary>How many times faster than life a simulated bench runs, 1 to 60.</summary>
    public required double Pace { get; init; }

    /// <summary>Laboratory, in words.</summary>
    public required string Laboratory { get; init; }

    /// <summary>Line frequency [Hz].</summary>
    public required double LineFrequencyHz { get; init; }

    /// <summary>Time zone of the site, an IANA name.</summary>
    public required string TimeZone { get; init; }

    /// <summary>Period of the monitor loop [s].</summary>
    public required double MonitorPeriodS { get; init; }

    /// <summary>Instruments in the order written.</summary>
    public required IReadOnlyList<InstrumentEntry> Instruments { get; init; }

    /// <summary>Who plays which role.</summary>
    public required Wiring Wiring { get; init; }

    /// <summary>What the bench may be asked for.</summary>
    public required BenchLimits Limits { get; init; }

    /// <summary>Protections declared in hardware.</summary>
    public required IReadOnlyList<Protection> Protections { get; init; }

    /// <summary>The part that the interlocks judge, or null.</summary>
    public required YamlNode? Interlocks { get; init; }

    /// <summary>Reads a bench file.</summary>
    public static Parsed<BenchFile> Read(string path)
    {
        var source = SourceText.Read(path);
        return source.Value is null ? Parsed.Bad<BenchFile>(source.Diagnostics) : Parse(source.Value);
    }

    /// <summary>Parses the text of a bench file.</summary>
    public static Parsed<BenchFile> Parse(SourceText source)
    {
        var document = YamlDocument.Parse(source);
        if (document.Value is null)
        {
            return Parsed.Bad<BenchFile>(document.Diagnostics);
        }

        var report = new ShapeReport(source.File);
        BenchFileShape.Shape.Check(document.Value, report);
        if (report.Diagnostics.Count > 0)
        {
            return Parsed.Bad<BenchFile>(report.Diagnostics);
        }

        var bench = BenchFileReading.Model(source, (YamlMap)document.Value);
        BenchFileReading.CrossCheck(bench, (YamlMap)document.Value, report);
        return report.Diagnostics.Count > 0 ? Parsed.Bad<BenchFile>(report.Diagnostics) : Parsed.Good(bench);
    }
}
