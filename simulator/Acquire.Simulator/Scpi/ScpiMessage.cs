namespace Acquire.Simulator.Scpi;

/// <summary>A program message taken apart: its units in order, up to the first that cannot be understood.</summary>
internal sealed class ScpiMessage
{
    private ScpiMessage(List<Unit> units) => Units = units;

    public List<Unit> Units { get; }

    /// <summary>Takes a message apart, without its terminator.</summary>
    /// <remarks>
    /// A header without a leading colon continues at the node of the one before it, common commands leave that node
    /// alone (SCPI-1999 volume 1, section 6.2.4). A unit that is wrong ends the message, as a parser that has lost its
    /// place must not guess.
    /// </remarks>
    public static ScpiMessage Parse(ReadOnlySpan<char> text, ScpiCommands commands)
    {
        List<Unit> units = [];
        var node = "";
        foreach (var range in UnitRanges(text))
        {
            var unit = text[range].Trim();
            if (unit.IsEmpty)
            {
                if (text.Trim().IsEmpty) break;
                units.Add(new Unit(null, "", ScpiError.Syntax));
                break;
            }
            var space = unit.IndexOfAny(' ', '\t');
            var written = (space < 0 ? unit : unit[..space]).ToString();
            var parameter = space < 0 ? "" : unit[space..].Trim().ToString();
            var header = written.StartsWith('*') ? written : written.StartsWith(':') ? written[1..] : node + written;
            var action = commands.Find(header);
            units.Add(new Unit(action, parameter, action is null ? ScpiError.UndefinedHeader : null));
            if (action is null) break;
            if (!header.StartsWith('*')) node = header[..(header.LastIndexOf(':') + 1)];
        }
        return new ScpiMessage(units);
    }

    // Semicolons within quotes or brackets belong to a parameter.
    private static List<Range> UnitRanges(ReadOnlySpan<char> text)
    {
        List<Range> ranges = [];
        var (start, depth, quote) = (0, 0, '\0');
        for (var i = 0; i < text.Length; i++)
        {
            var c = text[i];
            if (quote != '\0') quote = c == quote ? '\0' : quote;
            else if (c is '"' or '\'') quote = c;
            else if (c == '(') depth++;
            else if (c == ')') depth--;
            else if (c == ';' && depth <= 0)
            {
                ranges.Add(start..i);
                start = i + 1;
            }
        }
        ranges.Add(start..text.Length);
        return ranges;
    }

    internal readonly record struct Unit(ScpiAction? Action, string Parameter, ScpiError? Error);
}
