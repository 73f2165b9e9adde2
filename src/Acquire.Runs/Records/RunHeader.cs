using System.Security.Cryptography;
using System.Text;

namespace Acquire.Runs.Records;

/// <summary>One text that a run was made from, kept whole. One row of the table <c>text</c>.</summary>
/// <param name="Role">What it is: <c>bench</c>, <c>protocol</c>, <c>twin</c>, <c>driver</c>, <c>table</c>.</param>
/// <param name="Name">The file's name as the user gave it.</param>
/// <param name="Text">Its exact text.</param>
public sealed record RunText(string Role, string Name, string Text)
{
    /// <summary>SHA-256 of the UTF-8 text, hex.</summary>
    public string Sha256 => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(Text)));
}

/// <summary>One instrument as it identified itself. One row of the table <c>instrument</c>.</summary>
public sealed record RunInstrument(string Name, string Driver, string Address, string Identity);

/// <summary>What a run is and what it was made from; written once, at the start.</summary>
public sealed record RunHeader
{
    /// <summary>Identifier, from seed and clock.</summary>
    public required string RunId { get; init; }

    /// <summary><c>run</c>, <c>rehearsal</c> or <c>import</c>.</summary>
    public required string Kind { get; init; }

    /// <summary>The protocol's title.</summary>
    public required string Title { get; init; }

    /// <summary>Who runs it.</summary>
    public required string Operator { get; init; }

    /// <summary>Sample identifier.</summary>
    public required string SampleId { get; init; }

    /// <summary>Material symbol, or empty.</summary>
    public required string Material { get; init; }

    /// <summary>Conductivity over conductance [1/m] from the geometry; NaN when unknown.</summary>
    public double GeometryPerM { get; init; } = double.NaN;

    /// <summary>Standard uncertainty common to all sample temperatures [K].</summary>
    public double TemperatureUncertaintyK { get; init; }

    /// <summary>Start, UTC.</summary>
    public required DateTimeOffset StartUtc { get; init; }

    /// <summary>Version of this software.</summary>
    public required string Software { get; init; }

    /// <summary>Seed of a rehearsal or simulated run.</summary>
    public ulong Seed { get; init; }

    /// <summary>True when the bench was simulated.</summary>
    public required bool Simulated { get; init; }

    /// <summary>How many times faster than life.</summary>
    public double Pace { get; init; } = 1;

    /// <summary>The plan, JSON.</summary>
    public string PlanJson { get; init; } = "null";

    /// <summary>Name of the set of constants.</summary>
    public string ConstantSet { get; init; } = "";

    /// <summary>Texts that the run was made from.</summary>
    public required IReadOnlyList<RunText> Texts { get; init; }

    /// <summary>Instruments as they identified themselves.</summary>
    public IReadOnlyList<RunInstrument> Instruments { get; init; } = [];
}
