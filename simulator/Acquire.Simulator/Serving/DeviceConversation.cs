using System.Buffers;
using Acquire.Wire;

namespace Acquire.Simulator.Serving;

/// <summary>Hands bytes to a device and waits as long as the device takes, on the clock of the bench.</summary>
internal sealed class DeviceConversation(IDevicePort port, TimeProvider clock)
{
    private readonly ArrayBufferWriter<byte> _reply = new(1024);

    /// <summary>The reply to bytes that arrived; empty when the device stays silent. Blocks the caller's own thread.</summary>
    public ReadOnlyMemory<byte> Exchange(ReadOnlySpan<byte> bytes, CancellationToken stop)
    {
        _reply.ResetWrittenCount();
        var delay = port.Receive(bytes, _reply);
        if (_reply.WrittenCount > 0 && delay > TimeSpan.Zero) Task.Delay(delay, clock, stop).GetAwaiter().GetResult();
        return _reply.WrittenMemory;
    }
}
