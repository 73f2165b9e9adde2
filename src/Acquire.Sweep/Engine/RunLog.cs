using Acquire.Bench.Readings;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;
using Microsoft.Extensions.Logging;

namespace Acquire.Sweep.Engine;

/// <summary>The engine's clock and its way into the record.</summary>
public sealed class RunLog(IRunRecorder recorder, TimeProvider clock, long originTimestamp, ILogger log)
{
    /// <summary>Seconds since the start of the run, monotonic.</summary>
    public double NowS => clock.GetElapsedTime(originTimestamp).TotalSeconds;

    /// <summary>Microseconds since the start of the run, monotonic.</summary>
    public long NowUs => clock.GetElapsedTime(originTimestamp).Ticks / 10;

    private string? _thrown;

    /// <summary>How the writing goes. A recorder that throws has failed as one that says so: the interlocks act on it, nobody else stumbles over it.</summary>
    public RecorderHealth Health => _thrown is null ? recorder.Health : recorder.Health with { Failure = _thrown };

    /// <summary>Records a reading taken between two moments [us].</summary>
    public void Reading(int channel, long fromUs, long toUs, in Measured measured) =>
        Guarded(new Reading(channel, fromUs + ((toUs - fromUs) / 2), measured.Value, measured.Quality, measured.Raw));

    /// <summary>Records an event now.</summary>
    public void Event(string kind, Severity severity, string source, string text, string? dataJson = null)
    {
        Guarded(new RunEvent(NowUs, kind, severity, source, text, dataJson));
        log.Log(severity switch { Severity.Note => LogLevel.Information, Severity.Warning => LogLevel.Warning, _ => LogLevel.Error }, "{Kind} {Source}: {Text}", kind, source, text);
    }

    /// <summary>Records a point.</summary>
    public void Point(PointRecord point)
    {
        try
        {
            recorder.Append(point);
        }
        catch (Exception fault)
        {
            Failed(fault);
        }
    }

    private void Guarded(in Reading reading)
    {
        try
        {
            recorder.Append(reading);
        }
        catch (Exception fault)
        {
            Failed(fault);
        }
    }

    private void Guarded(RunEvent record)
    {
        try
        {
            recorder.Append(record);
        }
        catch (Exception fault)
        {
            Failed(fault);
        }
    }

    private void Failed(Exception fault)
    {
        _thrown ??= $"the recorder failed: {fault.Message}";
        log.LogError(fault, "The recorder failed.");
    }
}
