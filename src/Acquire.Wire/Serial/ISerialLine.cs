namespace Acquire.Wire;

/// <summary>One way of driving a serial port; received bytes go to a <see cref="ReceiveBuffer"/> by the line's own thread.</summary>
internal interface ISerialLine : IDisposable
{
    /// <summary>What the port did not take of the framing asked for; null when all was taken.</summary>
    string? Warning { get; }

    ValueTask WriteAsync(ReadOnlyMemory<byte> message, CancellationToken cancellation);

    /// <summary>Drops what the driver holds of received bytes.</summary>
    void DropInput();
}
