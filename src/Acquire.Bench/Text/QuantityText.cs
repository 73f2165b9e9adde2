using System.Collections.Concurrent;
using System.Globalization;

namespace Acquire.Bench.Text;

/// <summary>Quantities as people write them: a number, a space, a unit.</summary>
public static class QuantityText
{
    private static readonly ConcurrentDictionary<Dimension, Unit[]> Known = new();

    /// <summary>The units of a dimension, the one we print first.</summary>
    public static IReadOnlyList<Unit> UnitsOf(Dimension dimension) => Known.GetOrAdd(dimension, Units.Of);

    /// <summary>Reads a quantity into SI; null when number or unit are not right for the dimension.</summary>
    public static double? Parse(string text, Dimension dimension)
    {
        var trimmed = text.AsSpan().Trim();
        foreach (var unit in UnitsOf(dimension))
        {
            if (!trimmed.EndsWith(unit.Symbol, StringComparison.Ordinal))
            {
                continue;
            }

            // A space, or nothing, between number and unit; the bare 1 of a ratio needs no unit at all.
            var number = PlainNumber.Parse(trimmed[..^unit.Symbol.Length].TrimEnd().ToString());
            if (number is { } value && (trimmed[^(unit.Symbol.Length + 1)] == ' ' || unit.Symbol == "%"))
            {
                return unit.Offset + (unit.Factor * value);
            }
        }

        return dimension == Dimension.Ratio ? PlainNumber.Parse(trimmed.ToString()) : null;
    }

    /// <summary>Reads a quantity that a shape has accepted already.</summary>
    public static double ParseOrThrow(string text, Dimension dimension) =>
        Parse(text, dimension) ?? throw new FormatException($"'{text}' is not a {NameOf(dimension)}.");

    /// <summary>Writes a quantity in a unit so that reading it gives the same double again, or the nearest one.</summary>
    public static string Format(double si, Dimension dimension, string? symbol = null)
    {
        var unit = UnitsOf(dimension).First(candidate => symbol is null || candidate.Symbol == symbol);
        var value = (si - unit.Offset) / unit.Factor;
        // Twelve digits read better than seventeen; they are used when they give the very same number back.
        var plain = value.ToString("G12", CultureInfo.InvariantCulture);
        var same = unit.Offset + (unit.Factor * double.Parse(plain, CultureInfo.InvariantCulture)) == si;
        return same ? $"{plain} {unit.Symbol}" : string.Create(CultureInfo.InvariantCulture, $"{value:R} {unit.Symbol}");
    }

    /// <summary>The units of a dimension, for messages.</summary>
    public static string Symbols(Dimension dimension) => string.Join(", ", UnitsOf(dimension).Select(unit => unit.Symbol));

    /// <summary>The dimension in words.</summary>
    public static string NameOf(Dimension dimension) =>
        string.Concat(dimension.ToString().Select((letter, index) => char.IsUpper(letter)
            ? (index > 0 ? " " : "") + char.ToLowerInvariant(letter)
            : letter.ToString()));
}
