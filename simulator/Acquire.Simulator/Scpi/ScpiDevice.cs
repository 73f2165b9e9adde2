using System.Buffers;
using System.Globalization;
using System.Text;
using Acquire.Wire;

namespace Acquire.Simulator.Scpi;

/// <summary>What a device needs of the bench it stands on.</summary>
public interface IBenchMoment
{
    /// <summary>Brings the bench to the present and says when that is [s since the bench was started].</summary>
    double AdvanceToNow();

    /// <summary>Held while a device works: the devices of a bench share its physics, and servers call from threads of their own.</summary>
    Lock Gate { get; }
}

/// <summary>A device that speaks SCPI-1999 over IEEE 488.2 messages ended by a new line.</summary>
/// <remarks>
/// Bytes may arrive in pieces of any size. Several messages at once are worked off in order, and a device that is still
/// busy with a measurement begins the next one when it has finished. A message longer than 4,096 bytes is dropped up to
/// its end and reported as -363.
/// </remarks>
public sealed class ScpiDevice : IDevicePort
{
    private const int LongestMessage = 4096;
    private const int CachedMessages = 64;
    private readonly ScpiCommands _commands;
    private readonly IBenchMoment _bench;
    private readonly ScpiStatus _status = new();
    private readonly ScpiCall _call = new();
    private readonly Dictionary<string, ScpiMessage> _parsed = new(StringComparer.Ordinal);
    private readonly Dictionary<string, ScpiMessage>.AlternateLookup<ReadOnlySpan<char>> _parsedBySpan;
    private readonly char[] _message = new char[LongestMessage];
    private int _length;
    private bool _tooLong;
    private double _busyUntilS;

    /// <summary>Puts a command set on the wire; <paramref name="reset"/> is what *RST does.</summary>
    public ScpiDevice(string identity, ScpiCommands commands, Action reset, IBenchMoment bench)
    {
        _bench = bench;
        _commands = commands;
        _parsedBySpan = _parsed.GetAlternateLookup<ReadOnlySpan<char>>();
        AddCommonCommands(identity, reset);
    }

    /// <inheritdoc/>
    public TimeSpan Receive(ReadOnlySpan<byte> bytes, IBufferWriter<byte> reply)
    {
        lock (_bench.Gate)
        {
            var nowS = _bench.AdvanceToNow();
            _busyUntilS = Math.Max(_busyUntilS, nowS);
            foreach (var b in bytes)
            {
                if (b == '\n') EndOfMessage(reply);
                else if (_length < LongestMessage) _message[_length++] = (char)b;
                else _tooLong = true;
            }
            return TimeSpan.FromSeconds(_busyUntilS - nowS);
        }
    }

    /// <inheritdoc/>
    public void Connected(bool open)
    {
        lock (_bench.Gate) (_length, _tooLong) = (0, false);
    }

    private void EndOfMessage(IBufferWriter<byte> reply)
    {
        var text = _message.AsSpan(0, _length).TrimEnd('\r');
        var tooLong = _tooLong;
        (_length, _tooLong) = (0, false);
        if (tooLong) _status.Report(ScpiError.InputBufferOverrun);
        else if (text.ContainsAnyExceptInRange(' ', '~') && text.ContainsAnyExcept(_printableAndTab)) _status.Report(ScpiError.InvalidCharacter);
        else Execute(Parsed(text), reply);
    }

    private void Execute(ScpiMessage message, IBufferWriter<byte> reply)
    {
        _call.BeginMessage(reply);
        foreach (var unit in message.Units)
        {
            _call.Begin(unit.Parameter, _busyUntilS);
            if (unit.Error is { } error) _call.Refuse(error);
            unit.Action?.Invoke(_call);
            _busyUntilS += _call.DurationS;
            if (_call.Error is null) continue;
            _status.Report(_call.Error);
            break;
        }
        _call.EndMessage();
    }

    private ScpiMessage Parsed(ReadOnlySpan<char> text)
    {
        if (_parsedBySpan.TryGetValue(text, out var known)) return known;
        var message = ScpiMessage.Parse(text, _commands);
        // Polls repeat word for word; set values do not, and must not fill the store for ever.
        if (_parsed.Count < CachedMessages) _parsed.Add(text.ToString(), message);
        return message;
    }

    private void AddCommonCommands(string identity, Action reset)
    {
        _commands.Add("*IDN?", call => call.Reply(identity));
        _commands.Add("*RST", _ => reset());
        _commands.Add("*CLS", _ => _status.Clear());
        _commands.Add("*ESR?", call => call.Reply(_status.TakeEvents()));
        _commands.Add("*ESE?", call => call.Reply(_status.EventsEnabled));
        _commands.Add("*ESE", call => _status.EventsEnabled = Register(call) ?? _status.EventsEnabled);
        _commands.Add("*SRE?", call => call.Reply(_status.RequestsEnabled));
        _commands.Add("*SRE", call => _status.RequestsEnabled = Register(call) & ~64 ?? _status.RequestsEnabled);
        _commands.Add("*STB?", call => call.Reply(_status.Byte));
        _commands.Add("*OPC", _ => _status.OperationComplete());
        _commands.Add("*OPC?", call => call.Reply(true));
        _commands.Add("*WAI", _ => { });
        _commands.Add("*TST?", call => call.Reply(0));
        _commands.Add("SYSTem:VERSion?", call => call.Reply("1999.0"));
        _commands.Add("SYSTem:ERRor[:NEXT]?", ReplyNextError);
    }

    private void ReplyNextError(ScpiCall call)
    {
        var error = _status.NextError();
        call.Reply(string.Create(CultureInfo.InvariantCulture, $"{error.Number},\"{error.Text}\""));
    }

    private static int? Register(ScpiCall call) => call.TryNumber(0, 255, out var value) ? (int)Math.Round(value) : null;

    private static readonly SearchValues<char> _printableAndTab =
        SearchValues.Create(new StringBuilder("\t").Append([.. Enumerable.Range(' ', '~' - ' ' + 1).Select(c => (char)c)]).ToString());
}
