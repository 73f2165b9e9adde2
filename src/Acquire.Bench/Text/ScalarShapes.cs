using System.Globalization;
using System.Text.Json.Nodes;
using System.Text.RegularExpressions;

namespace Acquire.Bench.Text;

/// <summary>A quantity with a unit of one dimension, optionally inside bounds given in SI.</summary>
public sealed record QuantityShape(string Description, Dimension Dimension, double LeastSi = double.NegativeInfinity, double MostSi = double.PositiveInfinity)
    : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        var symbols = QuantityText.Symbols(Dimension);
        var name = QuantityText.NameOf(Dimension);
        if (node is not YamlText text || (CoreTypes.Of(text) is var type && type != CoreType.Text && !(Dimension == Dimension.Ratio && type is CoreType.Number or CoreType.WholeNumber)))
        {
            report.Add(node.At, $"a {name} with its unit is needed here", node is YamlText bare ? $"'{bare.Value}'" : node.Kind, $"a number and one of {symbols}", ExampleOr(symbols));
            return;
        }

        if (QuantityText.Parse(text.Value, Dimension) is not { } si)
        {
            report.Add(node.At, $"this is not a {name}", $"'{text.Value}'", $"a number, a space and one of {symbols}", ExampleOr(symbols));
            return;
        }

        if (!(si >= LeastSi && si <= MostSi))
        {
            report.Add(node.At, $"the {name} is out of range", $"'{text.Value}'", Range(), "change it");
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body()
    {
        var units = string.Join('|', QuantityText.UnitsOf(Dimension).Select(unit => Regex.Escape(unit.Symbol).Replace(@"\ ", " ", StringComparison.Ordinal)));
        var pattern = $"^ *{PlainNumber.Pattern} +({units}) *$";
        if (Dimension != Dimension.Ratio)
        {
            return new() { ["type"] = "string", ["pattern"] = pattern };
        }

        return new()
        {
            ["anyOf"] = new JsonArray(
            new JsonObject { ["type"] = "number" },
            new JsonObject { ["type"] = "string", ["pattern"] = $"^ *{PlainNumber.Pattern}( *%| +({units}))? *$" })
        };
    }

    private string ExampleOr(string symbols) =>
        $"write for example '{(Example.Length > 0 ? Example : $"1 {symbols.Split(',')[0]}")}'";

    private string Range() => (double.IsFinite(LeastSi), double.IsFinite(MostSi)) switch
    {
        (true, true) => $"{QuantityText.Format(LeastSi, Dimension)} to {QuantityText.Format(MostSi, Dimension)}",
        (true, false) => $"at least {QuantityText.Format(LeastSi, Dimension)}",
        _ => $"at most {QuantityText.Format(MostSi, Dimension)}",
    };
}

/// <summary>A number without a unit.</summary>
public sealed record NumberShape(string Description, double Least = double.MinValue, double Most = double.MaxValue, bool Whole = false) : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        var allowed = FormattableString.Invariant($"a {(Whole ? "whole " : "")}number from {Least} to {Most}");
        var value = node is YamlText text ? Value(text) : null;
        if (value is null)
        {
            report.Add(node.At, "a number without a unit is needed here", node is YamlText bare ? $"'{bare.Value}'" : node.Kind, allowed, "write the number alone");
        }
        else if (!(value >= Least && value <= Most))
        {
            report.Add(node.At, "the number is out of range", value.Value.ToString("R", CultureInfo.InvariantCulture), allowed, "change it");
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body()
    {
        var body = new JsonObject { ["type"] = Whole ? "integer" : "number" };
        if (Least > double.MinValue)
        {
            body["minimum"] = Least;
        }

        if (Most < double.MaxValue)
        {
            body["maximum"] = Most;
        }

        return body;
    }

    /// <inheritdoc/>
    protected override JsonNode ExampleValue() => JsonValue.Create(PlainNumber.Parse(Example) ?? 0);

    private double? Value(YamlText text) =>
        CoreTypes.NumberOf(text) is { } number && (!Whole || number == Math.Floor(number)) ? number : null;
}

/// <summary>A text, optionally of a form given by a regular expression that JSON Schema and .NET read alike.</summary>
public sealed record TextShape(string Description, string Pattern = "", string FormInWords = "") : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        if (node is not YamlText text || CoreTypes.Of(text) != CoreType.Text)
        {
            report.Add(node.At, "a text is needed here", node is YamlText bare ? $"'{bare.Value}'" : node.Kind, Description, "put it between quotes");
        }
        else if (text.Value.Trim().Length == 0)
        {
            report.Add(node.At, "the text is empty", "", Description, "write it");
        }
        else if (Pattern.Length > 0 && !Regex.IsMatch(text.Value, Pattern, RegexOptions.CultureInvariant | RegexOptions.ECMAScript, TimeSpan.FromSeconds(1)))
        {
            report.Add(node.At, "the text has the wrong form", $"'{text.Value}'", FormInWords, Example.Length > 0 ? $"write for example '{Example}'" : "change it");
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body() => Pattern.Length > 0
        ? new() { ["type"] = "string", ["pattern"] = Pattern }
        : new() { ["type"] = "string", ["pattern"] = @"\S" };
}

/// <summary>One of a few words.</summary>
public sealed record ChoiceShape(string Description, params string[] Words) : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        if (node is not YamlText text || CoreTypes.Of(text) != CoreType.Text || !Words.Contains(text.Value, StringComparer.Ordinal))
        {
            report.Add(node.At, "one of a few words is needed here", node is YamlText bare ? $"'{bare.Value}'" : node.Kind, string.Join(", ", Words), "write one of them");
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body() => new() { ["enum"] = new JsonArray([.. Words.Select(word => (JsonNode)JsonValue.Create(word))]) };
}

/// <summary>True or false.</summary>
public sealed record FlagShape(string Description) : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        if (node is not YamlText { Quoted: false, Value: "true" or "false" })
        {
            report.Add(node.At, "true or false is needed here", node is YamlText bare ? $"'{bare.Value}'" : node.Kind, "true, false", "write one of them");
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body() => new() { ["type"] = "boolean" };

    /// <inheritdoc/>
    protected override JsonNode ExampleValue() => JsonValue.Create(Example == "true");
}
