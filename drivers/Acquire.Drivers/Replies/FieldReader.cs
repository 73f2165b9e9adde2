using Acquire.Bench.Readings;

namespace Acquire.Drivers.Replies;

/// <summary>Turns one field of a reply into a value in SI, or into the reason why it is none.</summary>
/// <param name="Name">The field's name in the reply template.</param>
/// <param name="Scale">The instrument's unit.</param>
/// <param name="From">Least plausible value [SI].</param>
/// <param name="To">Greatest plausible value [SI].</param>
/// <param name="Markers">Numbers that stand for no number.</param>
public sealed record FieldReader(string Name, UnitScale Scale, double From, double To, IReadOnlyList<OverloadMarker> Markers)
{
    /// <summary>Reads the field; <paramref name="raw"/> is the whole reply, kept when the value cannot be used.</summary>
    public Measured Read(ReadOnlySpan<char> field, string raw)
    {
        if (!DecimalNumber.TryRead(field, out var number)) return Measured.Bad(WordQuality(field.Trim(' ')), raw);
        foreach (var marker in Markers)
            if (marker.Matches(number)) return Measured.Bad(marker.Means, raw);
        var si = Scale.ToSI(number);
        // Written so that a value that is not a number fails.
        return si >= From && si <= To ? Measured.Good(si) : Measured.Bad(Quality.Implausible, raw, si);
    }

    private static Quality WordQuality(ReadOnlySpan<char> word)
    {
        if (Is(word, "NAN") || Is(word, "-NAN") || Is(word, "+NAN")) return Quality.Implausible;
        foreach (var infinity in (ReadOnlySpan<string>)["INF", "+INF", "-INF", "INFINITY", "NINF"])
            if (Is(word, infinity)) return Quality.Overrange;
        return Quality.Unreadable;
    }

    private static bool Is(ReadOnlySpan<char> word, string expected) => word.Equals(expected, StringComparison.OrdinalIgnoreCase);
}
