using System.Diagnostics;
using System.Net.Sockets;

namespace Acquire.Benchmarks;

/// <summary>The anchor of the cost per reading: an asynchronous socket exchange of the same bytes with a time-out and cancellation, and nothing else.</summary>
internal static class BareExchange
{
    /// <summary>Round trips of one question, in microseconds.</summary>
    public static async Task<double[]> RunAsync(int port, byte[] question, int count, CancellationToken cancellation)
    {
        using var socket = new Socket(SocketType.Stream, ProtocolType.Tcp) { NoDelay = true };
        await socket.ConnectAsync("127.0.0.1", port, cancellation);
        var buffer = new byte[4096];
        var results = new double[count];
        for (var i = 0; i < count; i++)
        {
            var start = Stopwatch.GetTimestamp();
            using var timeOut = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
            timeOut.CancelAfter(TimeSpan.FromSeconds(2));
            await socket.SendAsync(question, timeOut.Token);
            var length = 0;
            while (length == 0 || buffer[length - 1] != (byte)'\n')
            {
                var read = await socket.ReceiveAsync(buffer.AsMemory(length), timeOut.Token);
                if (read == 0)
                {
                    throw new IOException("The responder closed the connection.");
                }

                length += read;
            }

            results[i] = Stopwatch.GetElapsedTime(start).TotalMicroseconds;
        }

        return results;
    }
}
