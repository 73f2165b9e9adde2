using Acquire.Bench.Readings;

namespace Acquire.Runs.Records;

/// <summary>One row of the table <c>reading</c>.</summary>
/// <param name="Channel">Identifier of the channel.</param>
/// <param name="TimeUs">Microseconds since the start of the run, monotonic: the midpoint of the exchange.</param>
/// <param name="Value">Value in the channel's SI unit; NaN when there is none (stored as NULL).</param>
/// <param name="Quality">What speaks against it.</param>
/// <param name="Raw">The reply as received, kept only when the quality is not good.</param>
public readonly record struct Reading(int Channel, long TimeUs, double Value, Quality Quality, string? Raw);

/// <summary>One row of the table <c>channel</c>.</summary>
/// <param name="Id">Identifier, from 1.</param>
/// <param name="Name">What is measured where, in words: <c>stage temperature</c>.</param>
/// <param name="Unit">UCUM code of the SI unit: <c>K</c>, <c>A</c>, <c>V</c>, <c>W</c>.</param>
/// <param name="Instrument">Name of the instrument in the bench file.</param>
public sealed record Channel(int Id, string Name, string Unit, string Instrument);
