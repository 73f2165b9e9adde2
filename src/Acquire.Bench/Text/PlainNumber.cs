using System.Globalization;
using System.Text.RegularExpressions;

namespace Acquire.Bench.Text;

/// <summary>Numbers as files write them: a point, no group separators, an optional exponent; the culture plays no part.</summary>
public static partial class PlainNumber
{
    /// <summary>The form of a number, as a regular expression that JSON Schema and .NET read alike.</summary>
    public const string Pattern = @"[+-]?([0-9]+(\.[0-9]*)?|\.[0-9]+)([eE][+-]?[0-9]{1,3})?";

    /// <summary>Reads a finite number, or null.</summary>
    public static double? Parse(string text) =>
        Form().IsMatch(text) && double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out var value) && double.IsFinite(value)
            ? value
            : null;

    [GeneratedRegex("^" + Pattern + "$")]
    private static partial Regex Form();
}
