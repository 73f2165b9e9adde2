namespace Acquire.Runs.Writing;

/// <summary>A file of a few megabytes beside the run, given up when the disk fills, so that the end can still be written.</summary>
internal sealed class Ballast(string runPath) : IDisposable
{
    private const int Bytes = 4 * 1024 * 1024;
    private readonly string _path = runPath + ".ballast";

    /// <summary>Reserves the space; a disk too full for it says so by throwing <see cref="IOException"/>.</summary>
    public void Reserve()
    {
        using var file = new FileStream(_path, FileMode.Create, FileAccess.Write, FileShare.None);
        var block = new byte[64 * 1024];
        block.AsSpan().Fill(0xA5); // written, not sparse: the blocks must be ours
        for (var written = 0; written < Bytes; written += block.Length)
        {
            file.Write(block);
        }

        file.Flush(flushToDisk: true);
    }

    /// <summary>Gives the space back.</summary>
    public void Dispose() => File.Delete(_path);
}
