namespace Acquire.Wire;

/// <summary>How text messages are cut out of the bytes of a link.</summary>
public sealed record TextFraming
{
    /// <summary>Lines that end with a line feed, as IEEE 488.2 wants them.</summary>
    public static TextFraming LineFeed { get; } = new();

    /// <summary>Ends every message to the instrument.</summary>
    public string WriteTerminator { get; init; } = "\n";

    /// <summary>Ends every answer. A carriage return before it is dropped.</summary>
    public string ReadTerminator { get; init; } = "\n";

    /// <summary>The longest answer [bytes]; a longer one is refused.</summary>
    public int LongestReply { get; init; } = 4096;

    /// <summary>How long a serial line must be silent to count as clean, when no question to resynchronise by is known.</summary>
    public TimeSpan Quiet { get; init; } = TimeSpan.FromMilliseconds(100);

    /// <summary>How many exchanges may wait for their turn.</summary>
    public int LongestQueue { get; init; } = 32;
}
