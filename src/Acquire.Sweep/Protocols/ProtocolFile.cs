using Acquire.Bench.Text;
using Acquire.Runs.Plans;

namespace Acquire.Sweep.Protocols;

/// <summary>The sample on the holder.</summary>
/// <param name="Id">Identifier of the sample.</param>
/// <param name="Material">Material symbol, or null.</param>
/// <param name="GeometryPerM">Conductivity over conductance [1/m], L/(w t) for a bar; NaN when unknown.</param>
/// <param name="NetDopingPerM3">Net donors expected [m-3], negative for acceptors; zero when nothing is expected.</param>
/// <param name="At">Where it stands in the file.</param>
public sealed record ProtocolSample(string Id, string? Material, double GeometryPerM, double NetDopingPerM3, Position At);

/// <summary>How a conductance is measured.</summary>
/// <param name="BiasV">Bias magnitude [V].</param>
/// <param name="Reversals">Pairs of polarities.</param>
/// <param name="Readings">Readings per polarity and pair.</param>
/// <param name="IntegrationCycles">Integration per reading, power-line cycles.</param>
/// <param name="SettledRelative">Largest relative change between adjacent windows.</param>
/// <param name="SettleTimeOutS">Bound on the wait for a settled signal [s].</param>
/// <param name="At">Where it stands in the file.</param>
public sealed record ProtocolMeasurement(
    double BiasV, int Reversals, int Readings, double IntegrationCycles, double SettledRelative, double SettleTimeOutS, Position At);

/// <summary>The light of a lit measurement.</summary>
/// <param name="WavelengthM">Wavelength [m].</param>
/// <param name="IrradianceWPerM2">Irradiance [W/m2].</param>
/// <param name="RecoverRelative">Distance to the dark value before at which the sample counts as recovered; NaN when not asked.</param>
/// <param name="RecoverTimeOutS">Bound on the wait for recovery [s].</param>
/// <param name="At">Where it stands in the file.</param>
public sealed record ProtocolLight(double WavelengthM, double IrradianceWPerM2, double RecoverRelative, double RecoverTimeOutS, Position At);

/// <summary>How a temperature settles.</summary>
/// <param name="WindowS">Window over which the gate must hold [s].</param>
/// <param name="BandK">Band [K]; NaN: from the temperature.</param>
/// <param name="DriftKPerS">Drift [K/s]; NaN: from the physics.</param>
/// <param name="TimeOutS">Bound on the wait [s].</param>
/// <param name="OnTimeOut">What to do then.</param>
public sealed record ProtocolSettling(double WindowS, double BandK, double DriftKPerS, double TimeOutS, TimeOutPolicy OnTimeOut);

/// <summary>One leg of the sweep.</summary>
/// <param name="FromK">First temperature [K].</param>
/// <param name="ToK">Last temperature [K].</param>
/// <param name="Points">Number of temperatures before floor and cap act.</param>
/// <param name="Reciprocal">True: equal steps in 1/T.</param>
/// <param name="LeastStepK">Floor on the step [K].</param>
/// <param name="LargestStepK">Cap on the step [K].</param>
/// <param name="RampKPerS">Ramp between temperatures [K/s].</param>
/// <param name="Lit">True: dark, lit and dark again at each temperature; false: dark only.</param>
/// <param name="At">Where it stands in the file.</param>
public sealed record ProtocolLeg(
    double FromK, double ToK, int Points, bool Reciprocal, double LeastStepK, double LargestStepK, double RampKPerS, bool Lit, YamlMap At);

/// <summary>A scripted sweep.</summary>
public sealed record ProtocolFile
{
    /// <summary>The protocol's title.</summary>
    public required string Title { get; init; }

    /// <summary>The file and its exact text.</summary>
    public required SourceText Source { get; init; }

    /// <summary>What the sweep is for.</summary>
    public required string Purpose { get; init; }

    /// <summary>The sample.</summary>
    public required ProtocolSample Sample { get; init; }

    /// <summary>The dark measurement.</summary>
    public required ProtocolMeasurement Dark { get; init; }

    /// <summary>The lit measurement; null when the sweep stays dark.</summary>
    public required ProtocolMeasurement? Lit { get; init; }

    /// <summary>Its light; null when the sweep stays dark.</summary>
    public required ProtocolLight? Light { get; init; }

    /// <summary>How temperatures settle.</summary>
    public required ProtocolSettling Settling { get; init; }

    /// <summary>The legs in order.</summary>
    public required IReadOnlyList<ProtocolLeg> Legs { get; init; }

    /// <summary>Reads a protocol file.</summary>
    public static Parsed<ProtocolFile> Read(string path)
    {
        var source = SourceText.Read(path);
        return source.Value is null ? Parsed.Bad<ProtocolFile>(source.Diagnostics) : Parse(source.Value);
    }

    /// <summary>Parses the text of a protocol file.</summary>
    public static Parsed<ProtocolFile> Parse(SourceText source)
    {
        var document = YamlDocument.Parse(source);
        if (document.Value is null)
        {
            return Parsed.Bad<ProtocolFile>(document.Diagnostics);
        }

        var report = new ShapeReport(source.File);
        ProtocolFileShape.Shape.Check(document.Value, report);
        if (report.Diagnostics.Count > 0)
        {
            return Parsed.Bad<ProtocolFile>(report.Diagnostics);
        }

        var protocol = ProtocolReading.Model(source, (YamlMap)document.Value, report);
        return report.Diagnostics.Count > 0 ? Parsed.Bad<ProtocolFile>(report.Diagnostics) : Parsed.Good(protocol);
    }
}
