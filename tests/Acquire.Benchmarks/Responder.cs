using System.Net;
using System.Net.Sockets;

namespace Acquire.Benchmarks;

/// <summary>A peer on loopback that answers every line with the same bytes, on a thread of its own, for one client after another.</summary>
internal sealed class Responder : IDisposable
{
    private readonly TcpListener _listener = new(IPAddress.Loopback, 0);
    private readonly byte[] _answer;

    public Responder(string answer)
    {
        _answer = System.Text.Encoding.ASCII.GetBytes(answer);
        _listener.Start();
        Port = ((IPEndPoint)_listener.LocalEndpoint).Port;
        new Thread(Serve) { IsBackground = true, Name = "responder" }.Start();
    }

    /// <summary>The port it listens on.</summary>
    public int Port { get; }

    public void Dispose() => _listener.Stop();

    private void Serve()
    {
        try
        {
            while (true)
            {
                using var client = _listener.AcceptSocket();
                client.NoDelay = true;
                Answer(client);
            }
        }
        catch (SocketException)
        {
            // The listener was stopped: the benchmark is over.
        }
    }

    private void Answer(Socket client)
    {
        var buffer = new byte[4096];
        while (true)
        {
            var read = client.Receive(buffer);
            if (read == 0)
            {
                return;
            }

            // The clients here ask one line at a time, so a line feed at the end is a whole question.
            if (buffer[read - 1] == (byte)'\n')
            {
                client.Send(_answer);
            }
        }
    }
}
