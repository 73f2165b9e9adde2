using Acquire.Bench.Readings;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;

namespace Acquire.Benchmarks;

/// <summary>How old a reading is when it is on disk, at 100 readings a second.</summary>
internal static class CommitAge
{
    public static Figure Measure()
    {
        using var scratch = new ScratchFolder();
        var ages = new List<double>();
        MeasureAsync(scratch["age.run"], ages).GetAwaiter().GetResult();
        return new("age of a reading at its commit, 95th percentile", Series.Quantile(ages, 0.95), "ms", 300, 250, Series.Words(ages, "ms"));
    }

    private static async Task MeasureAsync(string path, List<double> ages)
    {
        var clock = TimeProvider.System;
        await using var recorder = RunWriter.Create(path, ScratchFolder.Header, [new Channel(1, "a", "K", "a")], new WriterOptions(true, clock, clock.GetTimestamp()));
        var sent = new Queue<(long Number, long At)>();
        for (var i = 1; i <= 400; i++)
        {
            recorder.Append(new Reading(1, i, 1, Quality.Good, null));
            sent.Enqueue((i, clock.GetTimestamp()));
            await Task.Delay(TimeSpan.FromMilliseconds(10), clock);
            var committed = recorder.Health.Committed;
            while (sent.TryPeek(out var oldest) && oldest.Number <= committed)
            {
                ages.Add(clock.GetElapsedTime(sent.Dequeue().At).TotalMilliseconds);
            }
        }

        await recorder.SealAsync("completed", CancellationToken.None);
    }
}
