namespace Acquire.Runs.Writing;

/// <summary>The right to write one run file: a lock file beside it, held by one process, free again when that process ends in whatever way.</summary>
public sealed class RunLock : IDisposable
{
    private readonly FileStream _file;

    private RunLock(FileStream file) => _file = file;

    /// <summary>Takes the lock; null when another process holds it.</summary>
    public static RunLock? TryTake(string runPath)
    {
        try
        {
            return new(new FileStream(PathOf(runPath), FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None, 1, FileOptions.DeleteOnClose));
        }
        catch (IOException)
        {
            return null;
        }
    }

    /// <summary>True when a process holds the lock now.</summary>
    public static bool IsHeld(string runPath)
    {
        if (!File.Exists(PathOf(runPath)))
        {
            return false;
        }

        try
        {
            using var probe = new FileStream(PathOf(runPath), FileMode.Open, FileAccess.ReadWrite, FileShare.None);
            return false;
        }
        catch (FileNotFoundException)
        {
            return false;
        }
        catch (IOException)
        {
            return true;
        }
        catch (UnauthorizedAccessException)
        {
            return false; // a read-only folder: nobody can be writing there for us
        }
    }

    /// <inheritdoc/>
    public void Dispose() => _file.Dispose();

    private static string PathOf(string runPath) => runPath + ".lock";
}
