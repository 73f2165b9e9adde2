using System.Net.Sockets;
using System.Security.Cryptography;
using System.Text;

namespace Acquire.Control;

/// <summary>Names and bounds of the control socket.</summary>
public static class ControlSockets
{
    /// <summary>Version of the protocol; hello compares it.</summary>
    public const int Version = 1;

    /// <summary>Longest path of a socket [bytes]: what every system takes, less a reserve.</summary>
    internal const int LongestPath = 100;

    /// <summary>The socket of a run in a private folder; short, because a socket's path may have 107 bytes.</summary>
    public static string PathFor(string runtimeFolder, string runId) =>
        Path.Combine(runtimeFolder, Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(runId)))[..12] + ".sock");

    /// <summary>Why a path cannot be a socket's, or null.</summary>
    internal static string? Refusal(string path) => Encoding.UTF8.GetByteCount(path) <= LongestPath ? null
        : FormattableString.Invariant($"The control socket's path is too long: found {Encoding.UTF8.GetByteCount(path)} bytes, allowed {LongestPath} ({path}). Set XDG_RUNTIME_DIR to a shorter folder.");

    /// <summary>Connects; null when nobody listens.</summary>
    internal static async Task<Socket?> ConnectAsync(string path, CancellationToken cancellation)
    {
        var socket = new Socket(AddressFamily.Unix, SocketType.Stream, ProtocolType.Unspecified);
        try
        {
            await socket.ConnectAsync(new UnixDomainSocketEndPoint(path), cancellation).ConfigureAwait(false);
            return socket;
        }
        catch (SocketException)
        {
            socket.Dispose();
            return null;
        }
    }
}
