using System.Globalization;

namespace Acquire.Drivers.Replies;

/// <summary>Reads a decimal number as instruments write it.</summary>
/// <remarks>
/// Accepts any NRf of IEEE 488.2-1992, 7.7.2 (<c>1</c>, <c>-.5</c>, <c>+3.</c>, <c>1E3</c>, <c>1e+03</c>) with blanks around it.
/// A decimal comma, digit grouping, hexadecimal digits, units and words are refused: a guess would be a wrong reading.
/// </remarks>
public static class DecimalNumber
{
    private const NumberStyles Nrf = NumberStyles.AllowLeadingSign | NumberStyles.AllowDecimalPoint | NumberStyles.AllowExponent;

    /// <summary>Reads a number; false when the text is not one, or too large for a double.</summary>
    public static bool TryRead(ReadOnlySpan<char> text, out double value)
    {
        text = text.Trim(' ');
        value = double.NaN;
        // The runtime also accepts the words NaN and Infinity, and a sign alone is left to it to refuse.
        if (text.IsEmpty || !(char.IsAsciiDigit(text[0]) || text[0] is '+' or '-' or '.')) return false;
        if (!char.IsAsciiDigit(text[^1]) && text[^1] != '.') return false;
        if (double.TryParse(text, Nrf, CultureInfo.InvariantCulture, out value) && double.IsFinite(value)) return true;
        value = double.NaN;
        return false;
    }
}
