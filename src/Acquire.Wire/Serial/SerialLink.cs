namespace Acquire.Wire;

/// <summary>A serial line: natively on Linux, through the runtime's serial port elsewhere.</summary>
/// <remarks>
/// The runtime's port costs 2 to 3 ms a query on Linux, and its Close may hang for ever after an unplug; hence the native one.
/// Reopening does not separate answers, so the exchange above resynchronises after a time-out.
/// </remarks>
public sealed class SerialLink(SerialAddress address, SerialSettings settings) : ILink
{
    private ReceiveBuffer _received = new();
    private ISerialLine? _line;

    /// <inheritdoc/>
    public string Address => address.Text;

    /// <inheritdoc/>
    public bool IsOpen => _line is not null && _received.Failure is null;

    /// <summary>What the port did not take of the framing asked for (pseudo-terminals ignore parity); null when all was taken.</summary>
    public string? Warning => _line?.Warning;

    /// <inheritdoc/>
    public ValueTask OpenAsync(CancellationToken cancellation)
    {
        Close();
        cancellation.ThrowIfCancellationRequested();
        CheckFraming();
        _received = new ReceiveBuffer();
        _line = OperatingSystem.IsLinux() && !settings.PreferRuntimePort
            ? LinuxSerialLine.Open(address, settings, _received)
            : RuntimeSerialLine.Open(address, settings, _received);
        return ValueTask.CompletedTask;
    }

    /// <inheritdoc/>
    public ValueTask WriteAsync(ReadOnlyMemory<byte> message, CancellationToken cancellation)
    {
        var line = Opened();
        return _received.Failure is { } failure ? throw failure : line.WriteAsync(message, cancellation);
    }

    /// <inheritdoc/>
    public ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellation)
    {
        Opened();
        return _received.ReadAsync(buffer, cancellation);
    }

    /// <inheritdoc/>
    public ValueTask DiscardInputAsync(CancellationToken cancellation)
    {
        var line = Opened();
        if (_received.Failure is { } failure) throw failure;
        line.DropInput();
        _received.Clear();
        return ValueTask.CompletedTask;
    }

    /// <inheritdoc/>
    public void Close()
    {
        var line = Interlocked.Exchange(ref _line, null);
        if (line is null) return;
        _received.Fail(new LinkException($"{Address} was closed on our side."));
        line.Dispose();
    }

    /// <inheritdoc/>
    public ValueTask DisposeAsync()
    {
        Close();
        return ValueTask.CompletedTask;
    }

    private ISerialLine Opened() => _line ?? throw new LinkException($"{Address} is closed. Open it first.");

    private void CheckFraming()
    {
        if (settings.DataBits is not (7 or 8)) throw Refused("data bits", settings.DataBits, "7 or 8");
        if (settings.StopBits is not (1 or 2)) throw Refused("stop bits", settings.StopBits, "1 or 2");
        if (settings.Baud is < 50 or > 4_000_000) throw Refused("baud", settings.Baud, "50 to 4000000");
    }

    private LinkException Refused(string what, int found, string allowed) => new(FormattableString.Invariant(
        $"{Address} cannot be opened: {what} {found} refused; allowed {allowed}. Correct the serial settings in the bench file."));
}
