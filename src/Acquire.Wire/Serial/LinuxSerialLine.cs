using System.Runtime.InteropServices;
using Microsoft.Win32.SafeHandles;

namespace Acquire.Wire;

/// <summary>A serial port through the kernel's terminal interface, with one thread that waits for bytes.</summary>
/// <remarks>
/// The thread sleeps in one poll on the line and on a counter that wakes it, so close, room to write and unplug are all
/// noticed at once and an idle port costs nothing. The port is held by flock: unlike TIOCEXCL it is released by the
/// kernel when the holder is killed, so that the guard can open the port.
/// </remarks>
internal sealed class LinuxSerialLine : ISerialLine
{
    private readonly SerialAddress _address;
    private readonly SafeFileHandle _line;
    private readonly SafeFileHandle _wake;
    private readonly ReceiveBuffer _received;
    private readonly Thread _reader;
    private readonly Lock _gate = new();
    private TaskCompletionSource? _room;
    private volatile bool _closing;

    private LinuxSerialLine(SerialAddress address, SafeFileHandle line, SafeFileHandle wake, ReceiveBuffer received)
    {
        (_address, _line, _wake, _received) = (address, line, wake, received);
        _reader = new Thread(Receive) { IsBackground = true, Name = $"serial {address.Path}" };
    }

    public string? Warning { get; private init; }

    public static LinuxSerialLine Open(SerialAddress address, SerialSettings settings, ReceiveBuffer received)
    {
        var file = LinuxTerminal.Open(address.Path, LinuxTerminal.OpenReadWrite | LinuxTerminal.OpenNoTerminal | LinuxTerminal.OpenNonBlocking | LinuxTerminal.OpenCloseOnExec);
        try
        {
            if (file.IsInvalid) throw Refused(address, LastError(), "Check the path, the adapter and your rights to the port (often the group dialout)");
            if (LinuxTerminal.Lock(file, LinuxTerminal.LockExclusiveNow) != 0)
                throw Refused(address, "another program holds the port", "Close that program");
            var warning = Configure(address, settings, file);
            var wake = LinuxTerminal.EventCounter(0, LinuxTerminal.OpenNonBlocking | LinuxTerminal.OpenCloseOnExec);
            if (wake.IsInvalid) throw Refused(address, LastError(), "Close programs that hold many files");
            var line = new LinuxSerialLine(address, file, wake, received) { Warning = warning };
            line._reader.Start();
            return line;
        }
        catch
        {
            file.Dispose();
            throw;
        }
    }

    public ValueTask WriteAsync(ReadOnlyMemory<byte> message, CancellationToken cancellation)
    {
        var sent = WriteSome(message.Span);
        return sent == message.Length ? ValueTask.CompletedTask : FinishWriteAsync(message[sent..], cancellation);
    }

    public void DropInput() => _ = LinuxTerminal.Control(_line, LinuxTerminal.FlushBuffers, LinuxTerminal.FlushInput);

    public void Dispose()
    {
        if (_closing) return;
        _closing = true;
        // What is queued for sending would make close wait for a line that may be stopped.
        _ = LinuxTerminal.Control(_line, LinuxTerminal.FlushBuffers, LinuxTerminal.FlushBoth);
        Wake();
        _reader.Join();
        _line.Dispose();
        _wake.Dispose();
    }

    private static string? Configure(SerialAddress address, SerialSettings settings, SafeFileHandle file)
    {
        var terminal = default(LinuxTerminal.Termios2);
        if (LinuxTerminal.Control(file, LinuxTerminal.GetTermios2, ref terminal) != 0)
            throw Refused(address, "it is not a serial port (" + LastError() + ")", "Check the path");
        terminal = LinuxFraming.Apply(terminal, settings);
        if (LinuxTerminal.Control(file, LinuxTerminal.SetTermios2, ref terminal) != 0
            || LinuxTerminal.Control(file, LinuxTerminal.GetTermios2, ref terminal) != 0)
            throw Refused(address, LastError(), "Check the serial settings in the bench file");
        _ = LinuxTerminal.Control(file, LinuxTerminal.FlushBuffers, LinuxTerminal.FlushBoth);
        var difference = LinuxFraming.Difference(terminal, settings);
        // A pseudo-terminal has no wire, so its framing cannot matter; a real port with the wrong frame gives garbage.
        if (difference is not null && !IsPseudoTerminal(address.Path))
            throw Refused(address, difference, "Choose settings that the adapter can do");
        return difference;
    }

    private static bool IsPseudoTerminal(string path) =>
        (File.ResolveLinkTarget(path, returnFinalTarget: true)?.FullName ?? path).StartsWith("/dev/pts/", StringComparison.Ordinal);

    private async ValueTask FinishWriteAsync(ReadOnlyMemory<byte> rest, CancellationToken cancellation)
    {
        while (!rest.IsEmpty)
        {
            TaskCompletionSource room;
            lock (_gate) room = _room ??= new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
            Wake();
            await room.Task.WaitAsync(cancellation).ConfigureAwait(false);
            rest = rest[WriteSome(rest.Span)..];
        }
    }

    private int WriteSome(ReadOnlySpan<byte> bytes)
    {
        if (_closing || _received.Failure is not null) throw _received.Failure ?? Gone("closed on our side");
        while (true)
        {
            var sent = LinuxTerminal.Write(_line, ref MemoryMarshal.GetReference(bytes), bytes.Length);
            if (sent >= 0) return (int)sent;
            switch (Marshal.GetLastPInvokeError())
            {
                case LinuxTerminal.ErrorInterrupted: continue;
                case LinuxTerminal.ErrorTryAgain: return 0;
                default: throw Gone(LastError());
            }
        }
    }

    private void Receive()
    {
        Span<LinuxTerminal.PollEntry> entries = stackalloc LinuxTerminal.PollEntry[2];
        Span<byte> buffer = stackalloc byte[1024];
        string? end = null;
        while (!_closing && end is null)
        {
            bool wantsRoom;
            lock (_gate) wantsRoom = _room is not null;
            entries[0] = new() { Descriptor = (int)_line.DangerousGetHandle(), Wanted = (short)(LinuxTerminal.PollIn | (wantsRoom ? LinuxTerminal.PollOut : 0)) };
            entries[1] = new() { Descriptor = (int)_wake.DangerousGetHandle(), Wanted = LinuxTerminal.PollIn };
            if (LinuxTerminal.Poll(ref entries[0], 2, -1) < 0 && Marshal.GetLastPInvokeError() != LinuxTerminal.ErrorInterrupted) end = LastError();
            else end = Handle(entries, buffer);
        }
        _received.Fail(Gone(end ?? "closed on our side"));
        ReleaseRoom();
    }

    // Returns why the line ended, or null while it lives.
    private string? Handle(Span<LinuxTerminal.PollEntry> entries, Span<byte> buffer)
    {
        if (entries[1].Seen != 0) _ = LinuxTerminal.Read(_wake, ref buffer[0], 8);
        var seen = entries[0].Seen;
        if ((seen & LinuxTerminal.PollOut) != 0) ReleaseRoom();
        if ((seen & LinuxTerminal.PollIn) != 0)
        {
            var read = LinuxTerminal.Read(_line, ref buffer[0], buffer.Length);
            if (read > 0) _received.Append(buffer[..(int)read]);
            else if (read == 0) return "the device was removed";
            else if (Marshal.GetLastPInvokeError() is not (LinuxTerminal.ErrorInterrupted or LinuxTerminal.ErrorTryAgain)) return LastError();
            return null;
        }
        return (seen & (LinuxTerminal.PollError | LinuxTerminal.PollHangUp | LinuxTerminal.PollInvalid)) != 0 ? "the device was removed" : null;
    }

    private void ReleaseRoom()
    {
        TaskCompletionSource? room;
        lock (_gate) (room, _room) = (_room, null);
        room?.TrySetResult();
    }

    private void Wake()
    {
        Span<byte> one = [1, 0, 0, 0, 0, 0, 0, 0];
        _ = LinuxTerminal.Write(_wake, ref one[0], one.Length);
    }

    private LinkException Gone(string why) =>
        new($"{_address.Text} is gone: {why}. Check the adapter and its cable; the next exchange opens the port again.");

    private static LinkException Refused(SerialAddress address, string why, string remedy) =>
        new($"{address.Text} cannot be opened: {why}. {remedy}.");

    private static string LastError() => Marshal.GetLastPInvokeErrorMessage();
}
