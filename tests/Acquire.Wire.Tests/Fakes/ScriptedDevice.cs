using System.Buffers;
using System.Text;
using Acquire.Wire;

namespace Acquire.Testing;

/// <summary>A device in this process whose answers a test writes; remembers every message it got.</summary>
internal sealed class ScriptedDevice : IDevicePort
{
    private readonly StringBuilder _partial = new();

    /// <summary>Answers a message with raw bytes as Latin-1 text (terminator included) and a delay; null text stays silent.</summary>
    public Func<string, (string? Bytes, TimeSpan Delay)> Answer { get; set; } = _ => (null, TimeSpan.Zero);

    public List<string> Messages { get; } = [];

    public List<bool> Connections { get; } = [];

    public static ScriptedDevice AtOnce(Func<string, string?> answer) =>
        new() { Answer = message => (answer(message) is { } text ? text + "\n" : null, TimeSpan.Zero) };

    public TimeSpan Receive(ReadOnlySpan<byte> bytes, IBufferWriter<byte> reply)
    {
        var delay = TimeSpan.Zero;
        foreach (var b in bytes)
        {
            if (b != '\n')
            {
                _partial.Append((char)b);
                continue;
            }
            var message = _partial.ToString();
            _partial.Clear();
            Messages.Add(message);
            var (text, time) = Answer(message);
            if (text is not null) reply.Write(Encoding.Latin1.GetBytes(text));
            if (time > delay) delay = time;
        }
        return delay;
    }

    public void Connected(bool open) => Connections.Add(open);
}
