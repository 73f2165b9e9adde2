using System.Runtime.InteropServices;
using System.Text;
using Microsoft.Win32.SafeHandles;

namespace Acquire.Testing;

/// <summary>A real pseudo-terminal whose master side a test plays; closing it is what unplugging an adapter is.</summary>
internal sealed partial class PseudoTerminal : IDisposable
{
    private const int ReadWriteNoTerminal = 0x102;
    private readonly SafeFileHandle _master;
    private readonly SafeFileHandle _slave;

    public PseudoTerminal()
    {
        if (!OperatingSystem.IsLinux()) Assert.Skip("Pseudo-terminals are made here by Linux calls only.");
        _master = posix_openpt(ReadWriteNoTerminal);
        if (_master.IsInvalid) Assert.Skip("This system gives no pseudo-terminal: " + Marshal.GetLastPInvokeErrorMessage());
        Assert.Equal(0, grantpt(_master));
        Assert.Equal(0, unlockpt(_master));
        var name = new byte[128];
        Assert.Equal(0, ptsname_r(_master, ref name[0], name.Length));
        Path = Encoding.ASCII.GetString(name.AsSpan(0, Array.IndexOf(name, (byte)0)));
        // Held open and raw: else the master reads an error while nobody is attached, and echoes before somebody is.
        _slave = open(Path, ReadWriteNoTerminal);
        var terminal = new byte[256];
        Assert.Equal(0, tcgetattr(_slave, ref terminal[0]));
        cfmakeraw(ref terminal[0]);
        Assert.Equal(0, tcsetattr(_slave, 0, ref terminal[0]));
    }

    public string Path { get; }

    public string Address => $"ASRL{Path}::INSTR";

    public void Send(string bytes)
    {
        var encoded = Encoding.Latin1.GetBytes(bytes);
        Assert.Equal(encoded.Length, write(_master, ref encoded[0], encoded.Length));
    }

    /// <summary>Blocks until a whole line came from the host; empty at hang-up.</summary>
    public string ReadLine()
    {
        var text = new StringBuilder();
        byte one = 0;
        try
        {
            while (read(_master, ref one, 1) == 1)
            {
                if (one == '\n') return text.ToString();
                text.Append((char)one);
            }
        }
        catch (ObjectDisposedException) { /* Unplugged between two reads. */ }
        return "";
    }

    public void Unplug()
    {
        _slave.Dispose();
        _master.Dispose();
    }

    public void Dispose() => Unplug();

    [LibraryImport("libc", SetLastError = true)]
    private static partial SafeFileHandle posix_openpt(int flags);

    [LibraryImport("libc")]
    private static partial int grantpt(SafeFileHandle master);

    [LibraryImport("libc")]
    private static partial int unlockpt(SafeFileHandle master);

    [LibraryImport("libc")]
    private static partial int ptsname_r(SafeFileHandle master, ref byte name, nint length);

    [LibraryImport("libc", StringMarshalling = StringMarshalling.Utf8)]
    private static partial SafeFileHandle open(string path, int flags);

    [LibraryImport("libc")]
    private static partial int tcgetattr(SafeFileHandle file, ref byte terminal);

    [LibraryImport("libc")]
    private static partial int tcsetattr(SafeFileHandle file, int when, ref byte terminal);

    [LibraryImport("libc")]
    private static partial void cfmakeraw(ref byte terminal);

    [LibraryImport("libc")]
    private static partial nint read(SafeFileHandle file, ref byte buffer, nint length);

    [LibraryImport("libc")]
    private static partial nint write(SafeFileHandle file, ref byte buffer, nint length);
}
