namespace Acquire.Wire;

/// <summary>What a link needs to know beside its address.</summary>
public sealed record LinkSettings
{
    /// <summary>Settings that suit an address with no options.</summary>
    public static LinkSettings Default { get; } = new();

    /// <summary>How a serial line is framed; ignored on other links.</summary>
    public SerialSettings Serial { get; init; } = new();
}

/// <summary>The framing of a serial line; 9600 baud, 8 data bits, no parity, one stop bit unless told otherwise.</summary>
public sealed record SerialSettings
{
    /// <summary>Speed [baud].</summary>
    public int Baud { get; init; } = 9600;

    /// <summary>Parity bit.</summary>
    public SerialParity Parity { get; init; } = SerialParity.None;

    /// <summary>Data bits, 7 or 8.</summary>
    public int DataBits { get; init; } = 8;

    /// <summary>Stop bits, 1 or 2.</summary>
    public int StopBits { get; init; } = 1;

    /// <summary>Who may stop whom.</summary>
    public SerialHandshake Handshake { get; init; } = SerialHandshake.None;

    /// <summary>True to use the runtime's own serial port even where the native back end exists.</summary>
    public bool PreferRuntimePort { get; init; }
}

/// <summary>The parity bit of a serial line.</summary>
public enum SerialParity
{
    None,
    Odd,
    Even,
}

/// <summary>The flow control of a serial line.</summary>
public enum SerialHandshake
{
    None,
    RequestToSend,
    XOnXOff,
}
