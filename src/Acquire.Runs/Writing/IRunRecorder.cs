using Acquire.Runs.Records;

namespace Acquire.Runs.Writing;

/// <summary>The only writer of a run file, as the engine sees it. Appending never waits for a disk.</summary>
public interface IRunRecorder : IAsyncDisposable
{
    /// <summary>How the writing goes.</summary>
    RecorderHealth Health { get; }

    /// <summary>Takes a reading.</summary>
    void Append(in Reading reading);

    /// <summary>Takes an event; it is committed at once.</summary>
    void Append(RunEvent record);

    /// <summary>Takes a point; it is committed at once.</summary>
    void Append(PointRecord point);

    /// <summary>Completes when everything appended so far is on disk, or the writing has failed (then <see cref="Health"/> says so).</summary>
    ValueTask CommitAsync(CancellationToken cancellation);

    /// <summary>Writes the end state and tries, bounded, to seal the file into one plain file.</summary>
    /// <param name="endState"><c>completed</c>, <c>stopped</c>, <c>tripped</c> or <c>failed</c>.</param>
    /// <param name="cancellation">Abandons the sealing, not the end state.</param>
    ValueTask SealAsync(string endState, CancellationToken cancellation);
}

/// <summary>How the writing goes.</summary>
/// <param name="Appended">Readings taken.</param>
/// <param name="Committed">Readings on disk: these are acknowledged.</param>
/// <param name="Failure">Why the writing failed, what to do; null while it goes well.</param>
public readonly record struct RecorderHealth(long Appended, long Committed, string? Failure)
{
    /// <summary>True while everything goes well.</summary>
    public bool IsGood => Failure is null;
}
