using System.ComponentModel;
using System.Runtime.InteropServices;
using System.Text;
using Acquire.Wire;

namespace Acquire.Simulator.Serving;

/// <summary>A pair of pseudo-terminals: we hold the master, a client opens the slave by its path.</summary>
/// <remarks>
/// The slave is made raw before any client sees it, because a fresh one echoes and maps line ends; and it is held open by
/// us as well, because the master fails with an I/O error whenever nobody has the slave open.
/// </remarks>
internal sealed partial class PseudoTerminal : IDisposable
{
    private const int ReadWrite = 2;
    private const short Readable = 1;
    private const int Interrupted = 4;

    private const int WouldBlock = 11;

    // O_NOCTTY, and on Linux O_CLOEXEC: a child of ours must not keep the line alive.
    private static readonly int NoControllingTerminal = OperatingSystem.IsMacOS() ? 0x20000 : 0x100 | 0x80000;

    // O_NONBLOCK; macOS takes no such flag here, and a write there waits for its reader.
    private static readonly int NeverWait = OperatingSystem.IsMacOS() ? 0 : 0x800;
    private readonly int[] _wake = new int[2];
    private readonly int _master;
    private readonly int _slave;
    private bool _disposed;

    public PseudoTerminal()
    {
        _master = Check(OpenMaster(ReadWrite | NoControllingTerminal | NeverWait), "posix_openpt");
        Check(Grant(_master), "grantpt");
        Check(Unlock(_master), "unlockpt");
        Path = SlavePath(_master);
        _slave = Check(OpenFile(Path, ReadWrite | NoControllingTerminal), "open " + Path);
        MakeRaw(_slave);
        Check(Pipe(_wake), "pipe");
    }

    /// <summary>Path of the slave, which a client opens.</summary>
    public string Path { get; }

    /// <summary>Waits for bytes from the client; 0 when woken by <see cref="Wake"/>, or by nothing.</summary>
    public int Read(byte[] buffer)
    {
        Span<PollEntry> entries = [new PollEntry { File = _master, Wanted = Readable }, new PollEntry { File = _wake[0], Wanted = Readable }];
        while (Poll(ref entries[0], 2, -1) < 0)
        {
            if (Marshal.GetLastPInvokeError() != Interrupted) throw Failed("poll");
        }
        if (entries[1].Found != 0) return 0;
        var count = ReadFile(_master, buffer, buffer.Length);
        if (count < 0 && Marshal.GetLastPInvokeError() is WouldBlock or Interrupted) return 0;
        return count >= 0 ? (int)count : throw Failed("read");
    }

    /// <summary>Writes bytes to the client; like on a wire without handshake, what finds the client's buffer full is lost.</summary>
    public void Write(ReadOnlySpan<byte> bytes)
    {
        while (bytes.Length > 0)
        {
            var count = WriteFile(_master, bytes, bytes.Length);
            var error = count < 0 ? Marshal.GetLastPInvokeError() : 0;
            if (error == Interrupted) continue;
            if (error == WouldBlock) return;
            if (error != 0) throw Failed("write");
            bytes = bytes[(int)count..];
        }
    }

    /// <summary>Ends a <see cref="Read"/> that is waiting.</summary>
    public void Wake()
    {
        ReadOnlySpan<byte> one = [1];
        WriteFile(_wake[1], one, 1);
    }

    public void Dispose()
    {
        if (_disposed) return;
        _disposed = true;
        CloseFile(_slave);
        CloseFile(_master);
        CloseFile(_wake[0]);
        CloseFile(_wake[1]);
    }

    private static string SlavePath(int master)
    {
        var name = new byte[256];
        if (SlaveName(master, name, name.Length) != 0) throw Failed("ptsname_r");
        return Encoding.UTF8.GetString(name.AsSpan(0, Array.IndexOf(name, (byte)0)));
    }

    private static void MakeRaw(int slave)
    {
        // Larger than struct termios on every system we run on; only libc looks inside.
        var settings = new byte[512];
        Check(GetAttributes(slave, settings), "tcgetattr");
        MakeRawAttributes(settings);
        Check(SetAttributes(slave, 0, settings), "tcsetattr");
    }

    private static int Check(int result, string call) => result >= 0 ? result : throw Failed(call);

    private static LinkException Failed(string call)
    {
        var reason = new Win32Exception(Marshal.GetLastPInvokeError());
        return new LinkException($"The pseudo-terminal failed in {call}: {reason.Message}.", reason);
    }

    [StructLayout(LayoutKind.Sequential)]
    private struct PollEntry
    {
        public int File;
        public short Wanted;
        public short Found;
    }

    [LibraryImport("libc", EntryPoint = "posix_openpt", SetLastError = true)]
    private static partial int OpenMaster(int flags);

    [LibraryImport("libc", EntryPoint = "grantpt", SetLastError = true)]
    private static partial int Grant(int master);

    [LibraryImport("libc", EntryPoint = "unlockpt", SetLastError = true)]
    private static partial int Unlock(int master);

    [LibraryImport("libc", EntryPoint = "ptsname_r", SetLastError = true)]
    private static partial int SlaveName(int master, byte[] name, nint length);

    [LibraryImport("libc", EntryPoint = "open", SetLastError = true, StringMarshalling = StringMarshalling.Utf8)]
    private static partial int OpenFile(string path, int flags);

    [LibraryImport("libc", EntryPoint = "pipe", SetLastError = true)]
    private static partial int Pipe([Out] int[] ends);

    [LibraryImport("libc", EntryPoint = "poll", SetLastError = true)]
    private static partial int Poll(ref PollEntry entries, nuint count, int timeOutMs);

    [LibraryImport("libc", EntryPoint = "read", SetLastError = true)]
    private static partial nint ReadFile(int file, [Out] byte[] buffer, nint length);

    [LibraryImport("libc", EntryPoint = "write", SetLastError = true)]
    private static partial nint WriteFile(int file, ReadOnlySpan<byte> bytes, nint length);

    [LibraryImport("libc", EntryPoint = "close", SetLastError = true)]
    private static partial int CloseFile(int file);

    [LibraryImport("libc", EntryPoint = "tcgetattr", SetLastError = true)]
    private static partial int GetAttributes(int file, [Out] byte[] settings);

    [LibraryImport("libc", EntryPoint = "tcsetattr", SetLastError = true)]
    private static partial int SetAttributes(int file, int when, byte[] settings);

    [LibraryImport("libc", EntryPoint = "cfmakeraw")]
    private static partial void MakeRawAttributes([In, Out] byte[] settings);
}
