namespace Acquire.Simulator.Scpi;

/// <summary>The headers a device understands, in the notation of SCPI-1999: <c>SENSe:CURRent[:DC]:RANGe?</c>.</summary>
/// <remarks>
/// Upper-case letters are the short form, the whole word the long form, brackets a node that may be left out; upper and
/// lower case are the same on the wire. All spellings are worked out once, so that a header is found by one look-up.
/// </remarks>
public sealed class ScpiCommands
{
    private readonly Dictionary<string, ScpiAction> _actions = new(StringComparer.OrdinalIgnoreCase);

    /// <summary>Adds a header and what it does; a question mark at its end makes it a query.</summary>
    public ScpiCommands Add(string header, ScpiAction action)
    {
        ArgumentNullException.ThrowIfNull(header);
        var query = header.EndsWith('?') ? "?" : "";
        foreach (var spelling in Spellings(header.TrimEnd('?')))
            _actions.Add(spelling + query, action);
        return this;
    }

    /// <summary>Finds what a complete header does, without its leading colon.</summary>
    public ScpiAction? Find(string header) => _actions.GetValueOrDefault(header);

    private static List<string> Spellings(string header)
    {
        List<string> spellings = [""];
        foreach (var (node, optional) in Nodes(header))
        {
            string[] forms = [.. Forms(node).Distinct(StringComparer.OrdinalIgnoreCase)];
            var longer = spellings.SelectMany(s => forms.Select(f => s.Length == 0 ? f : s + ":" + f));
            spellings = optional ? [.. spellings, .. longer] : [.. longer];
        }
        return spellings;
    }

    private static IEnumerable<(string Node, bool Optional)> Nodes(string header)
    {
        foreach (var part in header.Replace("[:", ":[", StringComparison.Ordinal).Split(':', StringSplitOptions.RemoveEmptyEntries))
            yield return (part.Trim('[', ']'), part.StartsWith('['));
    }

    private static string[] Forms(string node) => [string.Concat(node.Where(c => !char.IsAsciiLetterLower(c))), node];
}
