namespace Acquire.Simulator.Scpi;

/// <summary>One entry of the error queue, with the number and text that SCPI-1999 volume 2, section 21.8 gives it.</summary>
public sealed record ScpiError(int Number, string Text)
{
    public static readonly ScpiError None = new(0, "No error");
    public static readonly ScpiError InvalidCharacter = new(-101, "Invalid character");
    public static readonly ScpiError Syntax = new(-102, "Syntax error");
    public static readonly ScpiError DataType = new(-104, "Data type error");
    public static readonly ScpiError ParameterNotAllowed = new(-108, "Parameter not allowed");
    public static readonly ScpiError MissingParameter = new(-109, "Missing parameter");
    public static readonly ScpiError UndefinedHeader = new(-113, "Undefined header");
    public static readonly ScpiError SettingsConflict = new(-221, "Settings conflict");
    public static readonly ScpiError DataOutOfRange = new(-222, "Data out of range");
    public static readonly ScpiError IllegalParameter = new(-224, "Illegal parameter value");
    public static readonly ScpiError QueueOverflow = new(-350, "Queue overflow");
    public static readonly ScpiError InputBufferOverrun = new(-363, "Input buffer overrun");

    /// <summary>The bit that this error sets in the standard event status register (IEEE 488.2, section 11.5.1).</summary>
    public int EventBit => Number switch
    {
        > -200 and <= -100 => 32,
        > -300 and <= -200 => 16,
        > -400 and <= -300 => 8,
        > -500 and <= -400 => 4,
        _ => 0,
    };
}
