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

    /// <summary>How the writing goes.</summary>
    public RecorderHealth Health => recorder.Health;

    /// <summary>Records a reading taken between two moments [us].</summary>
    public void Reading(int channel, long fromUs, long toUs, in Measured measured) =>
        recorder.Append(new Reading(channel, fromUs + ((toUs - fromUs) / 2), measured.Value, measured.Quality, measured.Raw));

    /// <summary>Records an event now.</summary>
    public void Event(string kind, Severity severity, string source, string text, string? dataJson = null)
    {
        recorder.Append(new RunEvent(NowUs, kind, severity, source, text, dataJson));
        log.Log(severity switch { Severity.Note => LogLevel.Information, Severity.Warning => LogLevel.Warning, _ => LogLevel.Error }, "{Kind} {Source}: {Text}", kind, source, text);
    }

    /// <summary>Records a point.</summary>
    public void Point(PointRecord point) => recorder.Append(point);
}
