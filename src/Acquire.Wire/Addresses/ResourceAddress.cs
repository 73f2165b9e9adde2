using System.Globalization;

namespace Acquire.Wire;

/// <summary>Where an instrument is, in VISA resource syntax (VPP-4.3, section on resource names).</summary>
/// <remarks>Understood: <c>TCPIP::host::port::SOCKET</c>, <c>ASRL/dev/path::INSTR</c>, <c>ASRL1::INSTR</c>, <c>SIM::name::INSTR</c> (in this process).</remarks>
public abstract record ResourceAddress
{
    private const string Understood =
        "TCPIP::<host>::<port>::SOCKET, ASRL<path or number>::INSTR or, in process, SIM::<name>::INSTR";

    private protected ResourceAddress(string text) => Text = text;

    /// <summary>The address as written.</summary>
    public string Text { get; }

    /// <summary>Reads an address; the result carries either the address or the reason why there is none.</summary>
    public static AddressParse Parse(string text)
    {
        var trimmed = text.Trim();
        if (trimmed.Any(char.IsControl)) return Refuse(trimmed, "it holds control characters");
        if (trimmed.StartsWith("TCPIP", StringComparison.OrdinalIgnoreCase)) return Tcp(trimmed);
        if (trimmed.StartsWith("ASRL", StringComparison.OrdinalIgnoreCase)) return Serial(trimmed);
        if (trimmed.StartsWith("SIM::", StringComparison.OrdinalIgnoreCase)) return InProcess(trimmed);
        return Refuse(trimmed, "its interface is not one that this version speaks");
    }

    private static AddressParse Tcp(string text)
    {
        var head = text.IndexOf("::", StringComparison.Ordinal);
        if (head < 0 || !IsBoardNumber(text.AsSpan(5, head - 5))) return Refuse(text, "the part before the first '::' is not TCPIP or TCPIP<board>");
        var rest = text[(head + 2)..];
        var (host, tail) = SplitHost(rest);
        if (host.Length == 0) return Refuse(text, "the host is missing");
        var parts = tail.Split("::");
        if (parts.Length != 2 || !parts[1].Equals("SOCKET", StringComparison.OrdinalIgnoreCase))
            return Refuse(text, "only raw sockets are spoken over TCP, and those end with ::<port>::SOCKET");
        if (!ushort.TryParse(parts[0], NumberStyles.None, CultureInfo.InvariantCulture, out var port))
            return Refuse(text, $"the port '{parts[0]}' is not a number from 0 to 65535");
        return new AddressParse(new TcpAddress(text, host, port), null);
    }

    // An IPv6 host stands in brackets, since its colons would otherwise read as separators.
    private static (string Host, string Tail) SplitHost(string rest)
    {
        if (rest.StartsWith('['))
        {
            var close = rest.IndexOf("]::", StringComparison.Ordinal);
            return close < 0 ? ("", rest) : (rest[1..close], rest[(close + 3)..]);
        }
        var end = rest.IndexOf("::", StringComparison.Ordinal);
        return end < 0 ? (rest, "") : (rest[..end], rest[(end + 2)..]);
    }

    private static bool IsBoardNumber(ReadOnlySpan<char> digits)
    {
        foreach (var c in digits) if (!char.IsAsciiDigit(c)) return false;
        return true;
    }

    private static AddressParse Serial(string text)
    {
        if (!text.EndsWith("::INSTR", StringComparison.OrdinalIgnoreCase) || text.Length <= "ASRL::INSTR".Length)
            return Refuse(text, "a serial address is ASRL, then the path or number of the port, then ::INSTR");
        var port = text[4..^7];
        if (port.Contains("::", StringComparison.Ordinal)) return Refuse(text, "the path of the port holds '::'");
        return new AddressParse(new SerialAddress(text, SerialPath(port)), null);
    }

    // VISA numbers serial ports from 1; Linux counts ttyS from 0, Windows COM from 1.
    private static string SerialPath(string port) =>
        !int.TryParse(port, NumberStyles.None, CultureInfo.InvariantCulture, out var number) ? port
        : OperatingSystem.IsWindows() ? string.Create(CultureInfo.InvariantCulture, $"COM{number}")
        : string.Create(CultureInfo.InvariantCulture, $"/dev/ttyS{Math.Max(0, number - 1)}");

    private static AddressParse InProcess(string text)
    {
        var parts = text.Split("::");
        return parts.Length == 3 && parts[1].Length > 0 && parts[2].Equals("INSTR", StringComparison.OrdinalIgnoreCase)
            ? new AddressParse(new InProcessAddress(text, parts[1]), null)
            : Refuse(text, "an address in process is SIM::<name>::INSTR");
    }

    private static AddressParse Refuse(string text, string why) =>
        new(null, $"Address '{text}' refused: {why}. Allowed: {Understood}. Correct the address in the bench file.");
}

/// <summary>A raw TCP socket.</summary>
public sealed record TcpAddress(string Written, string Host, int Port) : ResourceAddress(Written);

/// <summary>A serial port by its path (or, on Windows, its name).</summary>
public sealed record SerialAddress(string Written, string Path) : ResourceAddress(Written);

/// <summary>A device that lives in this process.</summary>
public sealed record InProcessAddress(string Written, string Name) : ResourceAddress(Written);

/// <summary>What became of reading an address: exactly one of the two is not null.</summary>
/// <param name="Address">The address.</param>
/// <param name="Problem">Why it was refused, and what is allowed.</param>
public readonly record struct AddressParse(ResourceAddress? Address, string? Problem);
