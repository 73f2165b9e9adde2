using Acquire.Runs.Records;

namespace Acquire.Runs.Writing;

/// <summary>Creates run files.</summary>
public static class RunWriter
{
    /// <summary>
    /// Creates the file and its recorder: behind a writer thread when durable, so that a stalled disk never stalls the engine;
    /// inline for rehearsals under virtual time. Throws <see cref="RunFileException"/> when the file cannot be made.
    /// </summary>
    public static IRunRecorder Create(string path, RunHeader header, IReadOnlyList<Channel> channels, WriterOptions options)
    {
        var store = RunStore.Create(path, header, channels, options);
        return options.Durable ? new ThreadedRecorder(store, options.Clock) : new InlineRecorder(store, options.Clock);
    }
}
