namespace Acquire.Drivers.Replies;

/// <summary>The form of a reply: names in braces for what varies, everything else literal, such as <c>{current},{voltage},{status}</c>.</summary>
/// <remarks>
/// A field never holds one of the separators of its template. A reply with decimal commas therefore has too many
/// separators and is refused as a whole, instead of being read as other numbers.
/// </remarks>
public sealed class ReplyTemplate
{
    private readonly string[] _literals;
    private readonly string[] _names;

    private ReplyTemplate(string text, string[] literals, string[] names) => (Text, _literals, _names) = (text, literals, names);

    /// <summary>The template as written.</summary>
    public string Text { get; }

    /// <summary>The names of the fields, in order.</summary>
    public IReadOnlyList<string> Names => _names;

    /// <summary>Reads a template; the result is null with the reason when it has no field or two fields without anything between them.</summary>
    public static ReplyTemplate? TryParse(string text, out string? problem)
    {
        List<string> literals = [], names = [];
        var at = 0;
        while (text.IndexOf('{', at) is >= 0 and var open)
        {
            var close = text.IndexOf('}', open);
            if (close <= open + 1) return Refuse("a brace is not closed, or holds no name", out problem);
            literals.Add(text[at..open]);
            names.Add(text[(open + 1)..close]);
            if (names.Count > 1 && literals[^1].Length == 0) return Refuse("two fields stand side by side with nothing between them", out problem);
            at = close + 1;
        }
        literals.Add(text[at..]);
        if (names.Count == 0) return Refuse("it has no field in braces", out problem);
        if (names.Distinct(StringComparer.Ordinal).Count() < names.Count) return Refuse("a field occurs twice", out problem);
        problem = null;
        return new ReplyTemplate(text, [.. literals], [.. names]);
    }

    /// <summary>The position of a field, or -1.</summary>
    public int IndexOf(string name) => Array.IndexOf(_names, name);

    /// <summary>Finds the fields of a reply; false when the reply does not have this form.</summary>
    public bool TryMatch(ReadOnlySpan<char> reply, Span<Range> fields)
    {
        if (!reply.StartsWith(_literals[0]) || !reply.EndsWith(_literals[^1])) return false;
        var at = _literals[0].Length;
        var last = reply.Length - _literals[^1].Length;
        if (last < at) return false;
        for (var i = 0; i < _names.Length; i++)
        {
            var end = i == _names.Length - 1 ? last : IndexFrom(reply[..last], at, _literals[i + 1]);
            if (end < 0 || HoldsSeparator(reply[at..end])) return false;
            fields[i] = at..end;
            at = end + (i == _names.Length - 1 ? 0 : _literals[i + 1].Length);
        }
        return true;
    }

    private static ReplyTemplate? Refuse(string why, out string? problem)
    {
        problem = why;
        return null;
    }

    private static int IndexFrom(ReadOnlySpan<char> text, int start, string literal)
    {
        var found = text[start..].IndexOf(literal);
        return found < 0 ? -1 : start + found;
    }

    private bool HoldsSeparator(ReadOnlySpan<char> field)
    {
        for (var i = 1; i < _literals.Length - 1; i++)
            if (field.Contains(_literals[i], StringComparison.Ordinal)) return true;
        return false;
    }
}
