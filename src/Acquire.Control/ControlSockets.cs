using System.Net.Sockets;
using System.Security.Cryptography;
using System.Text;

namespace Acquire.Control;

/// <summary>Names and bounds of the control socket.</summary>
public static class ControlSockets
{
    /// <summary>Version of the protocol; hello compares it.</summary>
    public const int Version = 1;

    /// <summary>Longest line [characters].</summary>
    internal const int LongestLine = 64 * 1024;

    /// <summary>The socket of a run in a private folder; short, because a socket's path may have 107 bytes.</summary>
    public static string PathFor(string runtimeFolder, string runId) =>
        Path.Combine(runtimeFolder, Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(runId)))[..12] + ".sock");

    /// <summary>Reads one line, bounded; null at the end of the stream, <see cref="InvalidDataException"/> when it is too long.</summary>
    internal static async Task<string?> ReadLineAsync(StreamReader reader, CancellationToken cancellation)
    {
        var line = new StringBuilder();
        var one = new char[1];
        while (await reader.ReadAsync(one, cancellation).ConfigureAwait(false) == 1)
        {
            if (one[0] == '\n')
            {
                return line.ToString();
            }

            if (line.Length >= LongestLine)
            {
                throw new InvalidDataException("line too long");
            }

            line.Append(one[0]);
        }

        return line.Length == 0 ? null : line.ToString();
    }

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
