using System.Text.RegularExpressions;

namespace Acquire.Bench.Text;

/// <summary>What the core schema of YAML 1.2.2 (section 10.3.2) makes of a scalar; a JSON Schema validator sees the same.</summary>
public enum CoreType
{
    Text,
    Number,
    WholeNumber,
    Flag,
    Nothing,
}

/// <summary>Resolves scalars as the core schema does.</summary>
public static partial class CoreTypes
{
    /// <summary>The type of a scalar.</summary>
    public static CoreType Of(YamlText text)
    {
        if (text.Quoted)
        {
            return CoreType.Text;
        }

        return text.Value switch
        {
            "" or "~" or "null" or "Null" or "NULL" => CoreType.Nothing,
            "true" or "True" or "TRUE" or "false" or "False" or "FALSE" => CoreType.Flag,
            _ when Whole().IsMatch(text.Value) => CoreType.WholeNumber,
            _ when Real().IsMatch(text.Value) => CoreType.Number,
            _ => CoreType.Text,
        };
    }

    /// <summary>The number that a scalar stands for; null for texts, and for the infinities and not-a-number, which no file of ours needs.</summary>
    public static double? NumberOf(YamlText text) => Of(text) switch
    {
        CoreType.WholeNumber when text.Value.StartsWith("0x", StringComparison.Ordinal) => Digits(text.Value[2..], 16),
        CoreType.WholeNumber when text.Value.StartsWith("0o", StringComparison.Ordinal) => Digits(text.Value[2..], 8),
        CoreType.WholeNumber or CoreType.Number => PlainNumber.Parse(text.Value),
        _ => null,
    };

    private static double Digits(string digits, int radix) => digits.Aggregate(0.0, (sum, digit) => (sum * radix) + Convert.ToInt32(digit.ToString(), 16));

    [GeneratedRegex(@"^([-+]?[0-9]+|0o[0-7]+|0x[0-9a-fA-F]+)$")]
    private static partial Regex Whole();

    [GeneratedRegex(@"^([-+]?(\.[0-9]+|[0-9]+(\.[0-9]*)?)([eE][-+]?[0-9]+)?|[-+]?\.(inf|Inf|INF)|\.(nan|NaN|NAN))$")]
    private static partial Regex Real();
}
