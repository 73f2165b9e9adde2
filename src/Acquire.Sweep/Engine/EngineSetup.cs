using Acquire.Bench.Files;
using Acquire.Bench.Roles;
using Acquire.Bench.Time;
using Acquire.Interlocks;
using Acquire.Runs.Plans;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;
using Microsoft.Extensions.Logging;

namespace Acquire.Sweep.Engine;

/// <summary>Everything an engine is made of.</summary>
public sealed record EngineSetup
{
    /// <summary>The opened instruments.</summary>
    public required BenchInstruments Instruments { get; init; }

    /// <summary>The bench.</summary>
    public required BenchFile Bench { get; init; }

    /// <summary>What to do.</summary>
    public required Plan Plan { get; init; }

    /// <summary>The interlock table of the bench.</summary>
    public required InterlockTable Interlocks { get; init; }

    /// <summary>The only writer of the run file.</summary>
    public required IRunRecorder Recorder { get; init; }

    /// <summary>The loop everything runs on; its clock is bench time.</summary>
    public required EngineLoop Loop { get; init; }

    /// <summary>The clock's timestamp at t_us = 0.</summary>
    public required long OriginTimestamp { get; init; }

    /// <summary>The clock of link time-outs: real time on real links, the loop's own in a rehearsal.</summary>
    public required TimeProvider LinkClock { get; init; }

    /// <summary>Diagnostics.</summary>
    public required ILogger Log { get; init; }
}

/// <summary>The channels of every run, in the order of their identifiers.</summary>
public static class EngineChannels
{
    public const int Stage = 1;
    public const int Sample = 2;
    public const int SetPoint = 3;
    public const int Heater = 4;
    public const int LampDrive = 5;
    public const int LampMonitor = 6;
    public const int Current = 7;
    public const int Voltage = 8;

    /// <summary>The channels of a bench.</summary>
    public static IReadOnlyList<Channel> Of(BenchFile bench)
    {
        var loop = bench.Wiring.Loop.Instrument;
        var meter = bench.Wiring.Meter.Instrument;
        var channels = new List<Channel>
        {
            new(Stage, "stage temperature", "K", loop), new(Sample, "sample temperature", "K", loop),
            new(SetPoint, "set point", "K", loop), new(Heater, "heater power", "W", loop),
            new(Current, "current", "A", meter), new(Voltage, "voltage", "V", meter),
        };
        if (bench.Wiring.Lamp is { } lamp)
        {
            channels.Add(new(LampDrive, "lamp drive", "A", lamp.Instrument));
            channels.Add(new(LampMonitor, "light monitor", "A", lamp.Instrument));
        }

        return channels;
    }
}

/// <summary>How a run ended.</summary>
/// <param name="State"><c>completed</c>, <c>stopped</c>, <c>tripped</c> or <c>failed</c>.</param>
/// <param name="Reason">Why, in words.</param>
public sealed record RunOutcome(string State, string Reason);

/// <summary>A snapshot of a running engine.</summary>
public sealed record EngineStatus
{
    /// <summary><c>starting</c>, <c>running</c>, <c>holding</c>, <c>ending</c>, or <c>ended: ...</c>.</summary>
    public required string State { get; init; }

    /// <summary><c>ramp</c>, <c>soak</c>, <c>dark</c>, <c>lit</c>, <c>dark after light</c>, <c>safe</c>.</summary>
    public required string Phase { get; init; }

    /// <summary>Leg under way, from 1.</summary>
    public required int Leg { get; init; }

    /// <summary>Legs in the plan.</summary>
    public required int Legs { get; init; }

    /// <summary>Points finished.</summary>
    public required int Point { get; init; }

    /// <summary>Points in the plan.</summary>
    public required int Points { get; init; }

    /// <summary>Stage temperature [K].</summary>
    public required double StageK { get; init; }

    /// <summary>Sample temperature [K].</summary>
    public required double SampleK { get; init; }

    /// <summary>Target [K].</summary>
    public required double TargetK { get; init; }

    /// <summary>Expected time to the end [s], bench time.</summary>
    public required double TimeLeftS { get; init; }

    /// <summary>Readings on disk.</summary>
    public required long Committed { get; init; }

    /// <summary>What is being waited for; empty when nothing is.</summary>
    public required string Waiting { get; init; }
}
