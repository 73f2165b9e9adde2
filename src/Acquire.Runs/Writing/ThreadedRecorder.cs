using System.Collections.Concurrent;
using Acquire.Runs.Records;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>
/// A writer thread behind a bounded queue: commits at most 250 ms after the oldest reading, at once after an event or a point, with a flush to disk
/// each time. Appending never waits. A full queue or a failed write becomes <see cref="RecorderHealth.Failure"/>; what is queued is kept and tried again.
/// </summary>
internal sealed class ThreadedRecorder : IRunRecorder
{
    private const int LongestQueue = 200_000;
    private const int FailedTries = 20;
    private static readonly TimeSpan OldestAge = TimeSpan.FromMilliseconds(250);
    private readonly ConcurrentQueue<Item> _queue = new();
    private readonly AutoResetEvent _wake = new(false);
    private readonly RunStore _store;
    private readonly TimeProvider _clock;
    private readonly Ballast _ballast;
    private readonly Thread _thread;
    private long _appended;
    private long _committed;
    private volatile string? _failure;
    private volatile bool _ending;

    public ThreadedRecorder(RunStore store, TimeProvider clock)
    {
        _store = store;
        _clock = clock;
        _ballast = new Ballast(store.Path);
        try
        {
            _ballast.Reserve();
        }
        catch (IOException problem)
        {
            _failure = WriteFailure.Sentence(store.Path, problem);
        }

        _thread = new Thread(Write) { IsBackground = true, Name = "run file" };
        _thread.Start();
    }

    /// <inheritdoc/>
    public RecorderHealth Health => new(Interlocked.Read(ref _appended), Interlocked.Read(ref _committed), _failure);

    /// <inheritdoc/>
    public void Append(in Reading reading)
    {
        if (_queue.Count >= LongestQueue)
        {
            _failure ??= $"{_store.Path}: the disk has not kept up for {LongestQueue} readings; the run is made safe. Check the disk.";
            return;
        }

        Interlocked.Increment(ref _appended);
        _queue.Enqueue(new Item(reading, null, null));
    }

    /// <inheritdoc/>
    public void Append(RunEvent record) => Add(new Item(default, record, null));

    /// <inheritdoc/>
    public void Append(PointRecord point) => Add(new Item(default, point, null));

    /// <inheritdoc/>
    public async ValueTask CommitAsync(CancellationToken cancellation)
    {
        var done = new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        Add(new Item(default, null, done));
        await done.Task.WaitAsync(cancellation);
    }

    /// <inheritdoc/>
    public async ValueTask SealAsync(string endState, CancellationToken cancellation)
    {
        var done = new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        Add(new Item(default, endState, done));
        await done.Task;
        await Sealing.TryAsync(_store, TimeProvider.System, cancellation); // the thread has ended: the store is ours now
    }

    /// <inheritdoc/>
    public ValueTask DisposeAsync()
    {
        _ending = true;
        _wake.Set();
        _thread.Join();
        _store.Dispose();
        _ballast.Dispose();
        _wake.Dispose();
        return ValueTask.CompletedTask;
    }

    private void Add(Item item)
    {
        _queue.Enqueue(item);
        _wake.Set();
    }

    private void Write()
    {
        var batch = new List<Item>();
        var ended = false;
        while (!ended)
        {
            _wake.WaitOne(OldestAge);
            while (_queue.TryDequeue(out var item))
            {
                batch.Add(item);
            }

            if (batch.Count == 0)
            {
                ended = _ending;
                continue;
            }

            ended = TryWrite(batch) || _ending;
            batch.Clear();
        }
    }

    /// <summary>Writes a batch in one transaction; true when it held the end of the run.</summary>
    private bool TryWrite(List<Item> batch)
    {
        for (var attempt = 0; ; attempt++)
        {
            try
            {
                var ended = WriteAll(batch);
                Interlocked.Add(ref _committed, batch.Count(item => item.IsReading));
                Complete(batch);
                return ended;
            }
            catch (SqliteException problem)
            {
                _failure ??= WriteFailure.Sentence(_store.Path, problem);
                _store.RollBack();
                _ballast.Dispose();
                if (attempt >= FailedTries)
                {
                    Complete(batch); // nobody waits for ever; Health says that it failed
                    return batch.Exists(item => item.Record is string);
                }

                _wake.WaitOne(OldestAge);
            }
        }
    }

    private bool WriteAll(List<Item> batch)
    {
        string? endState = null;
        foreach (var item in batch)
        {
            switch (item.Record)
            {
                case RunEvent record:
                    _store.Insert(record);
                    break;
                case PointRecord point:
                    _store.Insert(point);
                    break;
                case string state:
                    endState = state;
                    break;
                case null when item.IsReading:
                    _store.Insert(item.Reading);
                    break;
                default:
                    break;
            }
        }

        if (endState is not null)
        {
            _store.End(endState);
        }

        _store.Commit();
        return endState is not null;
    }

    private static void Complete(List<Item> batch)
    {
        foreach (var item in batch)
        {
            item.Done?.TrySetResult();
        }
    }

    /// <summary>A reading (channel above 0), an event, a point, an end state, or a wait for everything before it.</summary>
    private readonly record struct Item(Reading Reading, object? Record, TaskCompletionSource? Done)
    {
        public bool IsReading => Reading.Channel > 0;
    }
}
