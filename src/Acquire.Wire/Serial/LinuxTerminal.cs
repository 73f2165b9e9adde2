using System.Runtime.InteropServices;
using Microsoft.Win32.SafeHandles;

namespace Acquire.Wire;

/// <summary>The calls of the Linux kernel's terminal interface that a serial line needs (x64 and arm64 share these numbers).</summary>
internal static partial class LinuxTerminal
{
    public const int OpenReadWrite = 0x2, OpenNoTerminal = 0x100, OpenNonBlocking = 0x800, OpenCloseOnExec = 0x80000;
    public const int LockExclusiveNow = 2 | 4;
    public const short PollIn = 1, PollOut = 4, PollError = 8, PollHangUp = 16, PollInvalid = 32;
    public const int ErrorInterrupted = 4, ErrorIo = 5, ErrorTryAgain = 11;
    public const nuint GetTermios2 = 0x802C542A, SetTermios2 = 0x402C542B, FlushBuffers = 0x540B;
    public const int FlushInput = 0, FlushBoth = 2;

    [LibraryImport("libc", EntryPoint = "open", SetLastError = true, StringMarshalling = StringMarshalling.Utf8)]
    public static partial SafeFileHandle Open(string path, int flags);

    [LibraryImport("libc", EntryPoint = "flock", SetLastError = true)]
    public static partial int Lock(SafeFileHandle file, int operation);

    [LibraryImport("libc", EntryPoint = "ioctl", SetLastError = true)]
    public static partial int Control(SafeFileHandle file, nuint request, ref Termios2 settings);

    [LibraryImport("libc", EntryPoint = "ioctl", SetLastError = true)]
    public static partial int Control(SafeFileHandle file, nuint request, nint argument);

    [LibraryImport("libc", EntryPoint = "read", SetLastError = true)]
    public static partial nint Read(SafeFileHandle file, ref byte buffer, nint length);

    [LibraryImport("libc", EntryPoint = "write", SetLastError = true)]
    public static partial nint Write(SafeFileHandle file, ref byte buffer, nint length);

    [LibraryImport("libc", EntryPoint = "poll", SetLastError = true)]
    public static partial int Poll(ref PollEntry entries, nuint count, int timeOutMs);

    [LibraryImport("libc", EntryPoint = "eventfd", SetLastError = true)]
    public static partial SafeFileHandle EventCounter(uint initial, int flags);

    [StructLayout(LayoutKind.Sequential)]
    public struct PollEntry
    {
        public int Descriptor;
        public short Wanted;
        public short Seen;
    }

    /// <summary>The kernel's <c>struct termios2</c>, 44 bytes: with it any speed can be asked for (BOTHER).</summary>
    [StructLayout(LayoutKind.Sequential)]
    public struct Termios2
    {
        public uint Input;
        public uint Output;
        public uint Control;
        public uint Local;
        public byte Discipline;
        public ControlCharacters Characters;
        public uint InputSpeed;
        public uint OutputSpeed;
    }

    [System.Runtime.CompilerServices.InlineArray(19)]
    public struct ControlCharacters
    {
        private byte _first;
    }
}
