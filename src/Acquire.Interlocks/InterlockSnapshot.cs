using Acquire.Bench.Readings;

namespace Acquire.Interlocks;

/// <summary>The last answer of a sensor, and when its last good value came.</summary>
/// <param name="Last">The last answer.</param>
/// <param name="LastGood">The last good value; NaN before the first.</param>
/// <param name="LastGoodS">When it came [s], monotonic.</param>
public readonly record struct SensorState(Measured Last, double LastGood, double LastGoodS)
{
    /// <summary>Nothing heard yet; as old as the given moment.</summary>
    public static SensorState NotYet(double nowS) => new(Measured.Bad(Quality.Stale), double.NaN, nowS);

    /// <summary>The state after one more poll; an unanswered poll leaves the last answer standing and ageing.</summary>
    public SensorState After(Measured poll, double nowS)
    {
        if ((poll.Quality & (Quality.TimedOut | Quality.LinkFailed)) != 0)
        {
            return this;
        }

        return poll.IsGood ? new(poll, poll.Value, nowS) : this with { Last = poll };
    }
}

/// <summary>Everything the interlocks judge, at one moment.</summary>
/// <param name="Stage">Stage sensor.</param>
/// <param name="Sample">Sample sensor.</param>
/// <param name="ControllerAnsweredS">When the controller last answered [s], monotonic.</param>
/// <param name="MeterAnsweredS">When the source-meter last answered [s].</param>
/// <param name="LampAnsweredS">When the lamp last answered [s].</param>
/// <param name="RecordFailure">Why the run file is not being written; null while it is.</param>
public readonly record struct InterlockSnapshot(
    SensorState Stage, SensorState Sample, double ControllerAnsweredS, double MeterAnsweredS, double LampAnsweredS, string? RecordFailure);
