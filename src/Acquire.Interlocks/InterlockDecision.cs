using System.Collections.Immutable;
using System.Globalization;
using System.Numerics;

namespace Acquire.Interlocks;

/// <summary>The decision core: a pure function of table, memory, snapshot and time.</summary>
public static class InterlockDecision
{
    /// <summary>
    /// Judges every row. The result is the new memory and the trips that are new with this evaluation; make the bench safe when there is one.
    /// The same object comes back when nothing changed, so that a quiet tick allocates nothing.
    /// </summary>
    /// <param name="table">The rows.</param>
    /// <param name="state">What was remembered.</param>
    /// <param name="snapshot">What is known now.</param>
    /// <param name="nowS">Now [s], monotonic.</param>
    /// <param name="newSample">
    /// True when the sensors were polled since the last evaluation: rows that need confirmation count samples, not evaluations, so that judging
    /// a command twice confirms nothing. They trip on the given number out of the last three samples.
    /// </param>
    public static (InterlockState State, ImmutableArray<Trip> New) Decide(
        InterlockTable table, InterlockState state, in InterlockSnapshot snapshot, double nowS, bool newSample = true)
    {
        ImmutableArray<int>.Builder? counts = null;
        ImmutableArray<Trip>.Builder? trips = null;
        for (var i = 0; i < table.Rows.Count; i++)
        {
            var row = table.Rows[i];
            var samples = Samples(row, state.Unhealthy[i], IsHealthy(table, row, snapshot, nowS), newSample);
            if (samples != state.Unhealthy[i])
            {
                counts ??= state.Unhealthy.ToBuilder();
                counts[i] = samples;
            }

            if (BitOperations.PopCount((uint)samples) >= row.Confirmations && !HasTripped(state, row))
            {
                trips ??= ImmutableArray.CreateBuilder<Trip>();
                trips.Add(new(row.Id, nowS, Sentence(row, snapshot, nowS)));
            }
        }

        if (counts is null && trips is null)
        {
            return (state, []);
        }

        var fresh = trips?.ToImmutable() ?? [];
        return (new(counts?.ToImmutable() ?? state.Unhealthy, state.Trips.AddRange(fresh)), fresh);
    }

    /// <summary>The last three samples of a row as bits, unhealthy ones set; a row without confirmation has one bit, judged every time.</summary>
    private static int Samples(InterlockRow row, int before, bool healthy, bool newSample)
    {
        var now = healthy ? 0 : 1;
        return row.Confirmations == 1 ? now : newSample ? ((before << 1) | now) & 0b111 : before;
    }

    private static bool HasTripped(InterlockState state, InterlockRow row)
    {
        foreach (var trip in state.Trips)
        {
            if (trip.RowId == row.Id)
            {
                return true;
            }
        }

        return false;
    }

    private static bool IsHealthy(InterlockTable table, InterlockRow row, in InterlockSnapshot snapshot, double nowS) => row.Condition switch
    {
        InterlockCondition.Valid => Sensor(row, snapshot).Last is { IsGood: true, Value: var value } && value >= table.SensorFromK && value <= table.SensorToK,
        InterlockCondition.AtMost => Sensor(row, snapshot).LastGood <= row.Threshold,
        InterlockCondition.Fresh => nowS - Sensor(row, snapshot).LastGoodS <= row.Threshold,
        InterlockCondition.Answering => nowS - AnsweredS(row, snapshot) <= row.Threshold,
        InterlockCondition.Writing => snapshot.RecordFailure is null,
        _ => false,
    };

    private static SensorState Sensor(InterlockRow row, in InterlockSnapshot snapshot) => row.Input == InterlockInput.Stage ? snapshot.Stage : snapshot.Sample;

    private static double AnsweredS(InterlockRow row, in InterlockSnapshot snapshot) => row.Input switch
    {
        InterlockInput.Controller => snapshot.ControllerAnsweredS,
        InterlockInput.Meter => snapshot.MeterAnsweredS,
        InterlockInput.Lamp => snapshot.LampAnsweredS,
        _ => double.NaN,
    };

    private static string Sentence(InterlockRow row, in InterlockSnapshot snapshot, double nowS)
    {
        var found = row.Condition switch
        {
            InterlockCondition.Valid => Found(Sensor(row, snapshot)),
            InterlockCondition.AtMost => Sensor(row, snapshot).LastGood.ToString("F2", CultureInfo.InvariantCulture),
            InterlockCondition.Fresh => (nowS - Sensor(row, snapshot).LastGoodS).ToString("F1", CultureInfo.InvariantCulture),
            InterlockCondition.Answering => (nowS - AnsweredS(row, snapshot)).ToString("F1", CultureInfo.InvariantCulture),
            _ => snapshot.RecordFailure ?? "",
        };
        return string.Format(CultureInfo.InvariantCulture, row.Text, found, row.Threshold.ToString("G6", CultureInfo.InvariantCulture));
    }

    private static string Found(SensorState sensor) => sensor.Last.IsGood
        ? sensor.Last.Value.ToString("F2", CultureInfo.InvariantCulture) + " K, outside the sensor's range"
        : sensor.Last.Raw is { } raw ? $"reply '{raw}'" : sensor.Last.Quality.ToString();
}
