using Acquire.Runs.Records;

namespace Acquire.Runs.Writing;

/// <summary>Writes on the caller's own thread; for virtual time, where nothing may depend on the speed of a disk.</summary>
internal sealed class InlineRecorder(RunStore store, TimeProvider clock) : IRunRecorder
{
    private const int ReadingsPerCommit = 1000;
    private long _appended;
    private long _committed;
    private string? _failure;

    /// <inheritdoc/>
    public RecorderHealth Health => new(_appended, _committed, _failure);

    /// <inheritdoc/>
    public void Append(in Reading reading)
    {
        if (_failure is not null)
        {
            return;
        }

        try
        {
            store.Insert(reading);
            if (++_appended - _committed >= ReadingsPerCommit)
            {
                Commit();
            }
        }
        catch (Microsoft.Data.Sqlite.SqliteException problem)
        {
            Fail(problem);
        }
    }

    /// <inheritdoc/>
    public void Append(RunEvent record) => Write(() => store.Insert(record));

    /// <inheritdoc/>
    public void Append(PointRecord point) => Write(() => store.Insert(point));

    /// <inheritdoc/>
    public ValueTask CommitAsync(CancellationToken cancellation)
    {
        Write(Commit);
        return ValueTask.CompletedTask;
    }

    /// <inheritdoc/>
    public async ValueTask SealAsync(string endState, CancellationToken cancellation)
    {
        Write(() => store.End(endState));
        _committed = _appended;
        await Sealing.TryAsync(store, clock, cancellation);
    }

    /// <inheritdoc/>
    public ValueTask DisposeAsync()
    {
        store.Dispose();
        return ValueTask.CompletedTask;
    }

    private void Write(Action action)
    {
        if (_failure is not null)
        {
            return;
        }

        try
        {
            action();
        }
        catch (Microsoft.Data.Sqlite.SqliteException problem)
        {
            Fail(problem);
        }
    }

    private void Commit()
    {
        store.Commit();
        _committed = _appended;
    }

    private void Fail(Exception problem) => _failure = WriteFailure.Sentence(store.Path, problem);
}
