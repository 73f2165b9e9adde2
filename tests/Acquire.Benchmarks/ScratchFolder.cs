using Acquire.Runs.Records;

namespace Acquire.Benchmarks;

/// <summary>A folder that is gone afterwards.</summary>
internal sealed class ScratchFolder : IDisposable
{
    private static int _count;
    private readonly string _folder = Path.Combine(Path.GetTempPath(), FormattableString.Invariant($"acquire-benchmarks-{Environment.ProcessId}-{Interlocked.Increment(ref _count)}"));

    public ScratchFolder() => Directory.CreateDirectory(_folder);

    /// <summary>A header for runs that only measure.</summary>
    public static RunHeader Header { get; } = new()
    {
        RunId = "benchmark",
        Kind = "run",
        Title = "benchmark",
        Operator = "benchmark",
        SampleId = "none",
        Material = "",
        StartUtc = DateTimeOffset.UnixEpoch,
        Software = "benchmark",
        Simulated = true,
        Texts = [],
    };

    public string this[string name] => Path.Combine(_folder, name);

    public void Dispose() => Directory.Delete(_folder, recursive: true);
}
