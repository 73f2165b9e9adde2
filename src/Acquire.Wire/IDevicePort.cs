using System.Buffers;

namespace Acquire.Wire;

/// <summary>The device side of a link that lives in this process; the simulator implements it, byte for byte.</summary>
public interface IDevicePort
{
    /// <summary>
    /// Takes bytes from the host. Complete replies are appended to <paramref name="reply"/>; the result says how long the
    /// device takes before they appear on the wire (zero: at once). A device that stays silent appends nothing.
    /// </summary>
    TimeSpan Receive(ReadOnlySpan<byte> bytes, IBufferWriter<byte> reply);

    /// <summary>The host opened (true) or closed (false) the link.</summary>
    void Connected(bool open);
}
