namespace Acquire.Wire;

/// <summary>Translates serial settings into the kernel's terminal flags, raw in both directions.</summary>
/// <remarks>Flag values from the kernel's asm-generic/termbits.h.</remarks>
internal static class LinuxFraming
{
    private const uint Size7 = 0x20, Size8 = 0x30, SizeMask = 0x30, TwoStops = 0x40, Receive = 0x80, ParityOn = 0x100, ParityOdd = 0x200,
        HangUpOnClose = 0x400, IgnoreModem = 0x800, SpeedMask = 0x100F, AnySpeed = 0x1000, RequestToSend = 0x80000000, MarkOrSpace = 0x40000000;
    private const uint InputXOn = 0x400, InputXOff = 0x1000;
    private const int MinimumBytes = 6, TimeTenths = 5;

    // Speed and modem flags may legitimately read back changed; these bits decide how a byte looks on the wire.
    private const uint FrameMask = SizeMask | TwoStops | ParityOn | ParityOdd | RequestToSend;

    public static LinuxTerminal.Termios2 Apply(LinuxTerminal.Termios2 now, SerialSettings settings)
    {
        now.Input = settings.Handshake == SerialHandshake.XOnXOff ? InputXOn | InputXOff : 0;
        now.Output = 0;
        now.Local = 0;
        now.Control &= ~(SizeMask | TwoStops | ParityOn | ParityOdd | MarkOrSpace | HangUpOnClose | RequestToSend | SpeedMask | (SpeedMask << 16));
        now.Control |= Receive | IgnoreModem | AnySpeed | FrameBits(settings);
        now.InputSpeed = now.OutputSpeed = (uint)settings.Baud;
        now.Characters[MinimumBytes] = 1;
        now.Characters[TimeTenths] = 0;
        return now;
    }

    /// <summary>What the port did not take, in words; null when the frame bits and the speed (within 3 %) are as asked.</summary>
    public static string? Difference(in LinuxTerminal.Termios2 got, SerialSettings settings)
    {
        if ((got.Control & FrameMask) != FrameBits(settings))
            return FormattableString.Invariant($"the port did not take {settings.DataBits} data bits, parity {settings.Parity}, {settings.StopBits} stop bits, handshake {settings.Handshake}");
        return Math.Abs((double)got.OutputSpeed - settings.Baud) <= 0.03 * settings.Baud
            ? null
            : FormattableString.Invariant($"the port runs at {got.OutputSpeed} baud, not at {settings.Baud}");
    }

    private static uint FrameBits(SerialSettings settings) =>
        (settings.DataBits == 7 ? Size7 : Size8)
        | (settings.StopBits == 2 ? TwoStops : 0)
        | (settings.Handshake == SerialHandshake.RequestToSend ? RequestToSend : 0)
        | settings.Parity switch
        {
            SerialParity.Odd => ParityOn | ParityOdd,
            SerialParity.Even => ParityOn,
            _ => 0,
        };
}
