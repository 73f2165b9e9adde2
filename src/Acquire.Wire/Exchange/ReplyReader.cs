using System.Text;

namespace Acquire.Wire;

/// <summary>Cuts lines out of received bytes, with a bound on their length; one reused buffer.</summary>
internal sealed class ReplyReader(TextFraming framing)
{
    private readonly byte[] _terminator = Encoding.Latin1.GetBytes(framing.ReadTerminator);
    private readonly byte[] _buffer = new byte[framing.LongestReply + framing.ReadTerminator.Length + 1];
    private int _filled;

    /// <summary>Where the next bytes go; empty when the longest reply is exceeded.</summary>
    public Memory<byte> Room => _buffer.AsMemory(_filled);

    /// <summary>True when bytes are held beyond the lines taken so far.</summary>
    public bool HasRest => _filled > 0;

    public void Forget() => _filled = 0;

    public void Received(int count) => _filled += count;

    /// <summary>Takes the first complete line; null when there is none yet.</summary>
    public string? TakeLine()
    {
        var held = _buffer.AsSpan(0, _filled);
        var end = held.IndexOf(_terminator);
        if (end < 0) return null;
        var line = held[..end];
        if (line.EndsWith("\r"u8)) line = line[..^1];
        var text = Encoding.Latin1.GetString(line);
        var next = end + _terminator.Length;
        held[next..].CopyTo(_buffer);
        _filled -= next;
        return text;
    }

    /// <summary>The bytes of an unfinished or surplus reply as text, shortened for a message.</summary>
    public string Rest(int longest = 80) => Encoding.Latin1.GetString(_buffer, 0, Math.Min(_filled, longest));
}
