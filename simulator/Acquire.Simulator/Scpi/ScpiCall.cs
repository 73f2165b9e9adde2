using System.Buffers;
using System.Globalization;

namespace Acquire.Simulator.Scpi;

/// <summary>What a device does for one program message unit.</summary>
public delegate void ScpiAction(ScpiCall call);

/// <summary>One program message unit being executed: its parameter, its reply, its errors, the time it takes.</summary>
public sealed class ScpiCall
{
    private readonly byte[] _number = new byte[40];
    private IBufferWriter<byte> _reply = new ArrayBufferWriter<byte>();
    private bool _replied;
    private bool _comma;

    internal ScpiCall()
    {
    }

    /// <summary>The text after the header, trimmed; empty when there is none.</summary>
    public string Parameter { get; private set; } = "";

    /// <summary>When the device begins with this unit [s of bench time].</summary>
    public double StartS { get; private set; }

    /// <summary>How long the device takes for it [s].</summary>
    public double DurationS { get; private set; }

    /// <summary>The error this unit met, or null.</summary>
    public ScpiError? Error { get; private set; }

    /// <summary>Adds to the time that the device takes [s].</summary>
    public void Take(double seconds) => DurationS += seconds;

    /// <summary>Refuses the unit; the first reason stands.</summary>
    public void Refuse(ScpiError error) => Error ??= error;

    /// <summary>Reads the only parameter as a number within limits; MINimum and MAXimum stand for them.</summary>
    public bool TryNumber(double least, double most, out double value)
    {
        value = double.NaN;
        if (Parameter.Length == 0) return Fail(ScpiError.MissingParameter);
        if (IsKeyword("MIN", "MINIMUM")) value = least;
        else if (IsKeyword("MAX", "MAXIMUM")) value = most;
        else if (Parameter.Contains(',', StringComparison.Ordinal)) return Fail(ScpiError.ParameterNotAllowed);
        else if (!double.TryParse(Parameter, NumberStyles.Float & ~NumberStyles.AllowTrailingWhite, CultureInfo.InvariantCulture, out value))
            return Fail(ScpiError.DataType);
        return value >= least && value <= most || Fail(ScpiError.DataOutOfRange);
    }

    /// <summary>Reads the only parameter as ON, OFF, 1 or 0.</summary>
    public bool TryFlag(out bool value)
    {
        value = IsKeyword("ON", "1");
        if (value || IsKeyword("OFF", "0")) return true;
        return Fail(Parameter.Length == 0 ? ScpiError.MissingParameter : ScpiError.IllegalParameter);
    }

    /// <summary>Reads the only parameter as a channel list with one channel, such as <c>(@2)</c>.</summary>
    public bool TryChannel(int channels, out int channel)
    {
        channel = 0;
        if (Parameter.Length == 0) return Fail(ScpiError.MissingParameter);
        if (Parameter.Length < 4 || !Parameter.StartsWith("(@", StringComparison.Ordinal) || Parameter[^1] != ')'
            || !int.TryParse(Parameter.AsSpan(2, Parameter.Length - 3), NumberStyles.None, CultureInfo.InvariantCulture, out channel))
            return Fail(ScpiError.DataType);
        return channel >= 1 && channel <= channels || Fail(ScpiError.DataOutOfRange);
    }

    /// <summary>Refuses a parameter where there may be none.</summary>
    public bool TryNothing() => Parameter.Length == 0 || Fail(ScpiError.ParameterNotAllowed);

    /// <summary>Replies with a floating-point number (NR3) of <paramref name="format"/>, such as E6.</summary>
    public void Reply(double value, string format = "E6")
    {
        value.TryFormat(_number, out var length, format, CultureInfo.InvariantCulture);
        Write(_number.AsSpan(0, length));
    }

    /// <summary>Replies with an integer (NR1).</summary>
    public void Reply(int value)
    {
        value.TryFormat(_number, out var length, default, CultureInfo.InvariantCulture);
        Write(_number.AsSpan(0, length));
    }

    /// <summary>Replies with 1 or 0.</summary>
    public void Reply(bool value) => Write(value ? "1"u8 : "0"u8);

    /// <summary>Replies with characters as they are.</summary>
    public void Reply(string text) => Write(System.Text.Encoding.ASCII.GetBytes(text));

    internal void Begin(string parameter, double startS)
    {
        Parameter = parameter;
        StartS = startS;
        DurationS = 0;
        Error = null;
        _comma = false;
    }

    internal void BeginMessage(IBufferWriter<byte> reply)
    {
        _reply = reply;
        _replied = false;
    }

    /// <summary>Ends the reply of a message; true when there was one.</summary>
    internal bool EndMessage()
    {
        if (_replied) _reply.Write("\n"u8);
        return _replied;
    }

    private void Write(ReadOnlySpan<byte> field)
    {
        // Fields of one unit are separated by commas, units by semicolons (IEEE 488.2, section 8.3).
        if (_comma) _reply.Write(","u8);
        else if (_replied) _reply.Write(";"u8);
        _reply.Write(field);
        _replied = _comma = true;
    }

    private bool IsKeyword(string shortForm, string longForm) =>
        Parameter.Equals(shortForm, StringComparison.OrdinalIgnoreCase) || Parameter.Equals(longForm, StringComparison.OrdinalIgnoreCase);

    private bool Fail(ScpiError error)
    {
        Refuse(error);
        return false;
    }
}
