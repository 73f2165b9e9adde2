using System.Net.Sockets;
using System.Text;

namespace Acquire.EndToEnd.Programs;

/// <summary>One question over a plain socket, without any of our own links.</summary>
internal static class RawSocket
{
    public static async Task<string> AskAsync(int port, string question)
    {
        using var bound = new CancellationTokenSource(TimeSpan.FromSeconds(10));
        using var client = new TcpClient();
        await client.ConnectAsync("127.0.0.1", port, bound.Token);
        await using var stream = client.GetStream();
        await stream.WriteAsync(Encoding.ASCII.GetBytes(question + "\n"), bound.Token);
        using var reader = new StreamReader(stream, Encoding.ASCII);
        return (await reader.ReadLineAsync(bound.Token))?.Trim() ?? "";
    }
}
