using System.Text.Json.Nodes;

namespace Acquire.Bench.Text;

/// <summary>What a part of a file may look like. One description serves the parser and the JSON Schema.</summary>
public abstract record Shape(string Description)
{
    /// <summary>An example for editors and documentation; empty when there is none.</summary>
    public string Example { get; init; } = "";

    /// <summary>Reports everything in the node that is not of this shape.</summary>
    public abstract void Check(YamlNode node, ShapeReport report);

    /// <summary>The JSON Schema of this shape, without description.</summary>
    protected abstract JsonObject Body();

    /// <summary>The JSON Schema of this shape.</summary>
    public JsonObject Schema()
    {
        var body = Body();
        body.Insert(0, "description", Description);
        if (Example.Length > 0)
        {
            body["examples"] = new JsonArray(ExampleValue());
        }

        return body;
    }

    /// <summary>The example as a JSON value.</summary>
    protected virtual JsonNode ExampleValue() => JsonValue.Create(Example);
}

/// <summary>Collects what a shape finds.</summary>
public sealed class ShapeReport(string file)
{
    private readonly List<Diagnostic> _diagnostics = [];

    /// <summary>Everything found, in order.</summary>
    public IReadOnlyList<Diagnostic> Diagnostics => _diagnostics;

    /// <summary>Adds a finding.</summary>
    public void Add(Position at, string what, string found, string allowed, string remedy) =>
        _diagnostics.Add(new Diagnostic(file, at, what, found, allowed, remedy));
}

/// <summary>One key of a map.</summary>
/// <param name="Name">The key.</param>
/// <param name="Value">The shape of its value.</param>
/// <param name="Required">True when it must be there.</param>
public sealed record Key(string Name, Shape Value, bool Required = false);

/// <summary>A map with known keys.</summary>
public sealed record MapShape(string Description, params Key[] Keys) : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        if (node is not YamlMap map)
        {
            report.Add(node.At, "a map of keys is needed here", node.Kind, string.Join(", ", Keys.Select(key => key.Name)), "write 'key: value' pairs");
            return;
        }

        foreach (var entry in map.Entries)
        {
            var key = Keys.FirstOrDefault(candidate => candidate.Name == entry.Key);
            if (key is null)
            {
                report.Add(entry.At, "unknown key", $"'{entry.Key}'", string.Join(", ", Keys.Select(candidate => candidate.Name)), Suggestion(entry.Key));
            }
            else
            {
                key.Value.Check(entry.Value, report);
            }
        }

        foreach (var missing in Keys.Where(key => key.Required && !map.Has(key.Name)))
        {
            report.Add(map.At, $"the key '{missing.Name}' is missing", "", "", missing.Value.Example.Length > 0
                ? $"add '{missing.Name}: {missing.Value.Example}'" : $"add '{missing.Name}:' ({missing.Value.Description})");
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body()
    {
        var properties = new JsonObject();
        foreach (var key in Keys)
        {
            properties[key.Name] = key.Value.Schema();
        }

        var body = new JsonObject { ["type"] = "object", ["additionalProperties"] = false, ["properties"] = properties };
        var required = Keys.Where(key => key.Required).Select(key => (JsonNode)JsonValue.Create(key.Name)).ToArray();
        if (required.Length > 0)
        {
            body["required"] = new JsonArray(required);
        }

        return body;
    }

    private string Suggestion(string written)
    {
        var nearest = Keys.MinBy(key => EditDistance.Between(key.Name, written))?.Name;
        return nearest is not null && EditDistance.Between(nearest, written) <= 1 + (written.Length / 3)
            ? $"did you mean '{nearest}'?" : "remove it";
    }
}

/// <summary>A map whose keys are names that the user chooses.</summary>
public sealed record NamesShape(string Description, Shape Value) : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        if (node is not YamlMap map)
        {
            report.Add(node.At, "a map of names is needed here", node.Kind, "name: ...", "write one entry for each name");
            return;
        }

        if (map.Entries.Count == 0)
        {
            report.Add(node.At, "the map is empty", "", "at least one entry", "add one");
        }

        foreach (var entry in map.Entries)
        {
            Value.Check(entry.Value, report);
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body() =>
        new() { ["type"] = "object", ["minProperties"] = 1, ["additionalProperties"] = Value.Schema() };
}

/// <summary>A list.</summary>
public sealed record ListShape(string Description, Shape Item, int Least = 0, int Most = 10_000) : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        if (node is not YamlList list)
        {
            report.Add(node.At, "a list is needed here", node.Kind, Item.Description, "write '- ' before each item, or [a, b]");
            return;
        }

        if (list.Items.Count < Least || list.Items.Count > Most)
        {
            report.Add(node.At, "the list has the wrong length", FormattableString.Invariant($"{list.Items.Count} items"),
                FormattableString.Invariant($"{Least} to {Most}"), "add or remove items");
        }

        foreach (var item in list.Items)
        {
            Item.Check(item, report);
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body() =>
        new() { ["type"] = "array", ["minItems"] = Least, ["maxItems"] = Most, ["items"] = Item.Schema() };
}

/// <summary>A part that another project judges; any node.</summary>
public sealed record OpenShape(string Description) : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        // Judged elsewhere.
    }

    /// <inheritdoc/>
    protected override JsonObject Body() => [];
}

/// <summary>A value that may take one of several forms, told apart by what kind of node it is and by its keys.</summary>
public sealed record EitherShape(string Description, params Shape[] Options) : Shape(Description)
{
    /// <inheritdoc/>
    public override void Check(YamlNode node, ShapeReport report)
    {
        var reports = Options.Select(option =>
        {
            var trial = new ShapeReport("");
            option.Check(node, trial);
            return (option, trial.Diagnostics);
        }).ToList();
        if (reports.Any(trial => trial.Diagnostics.Count == 0))
        {
            return;
        }

        // The form that comes closest explains best.
        foreach (var finding in reports.MinBy(trial => trial.Diagnostics.Count).Diagnostics)
        {
            report.Add(finding.At, finding.What, finding.Found, finding.Allowed, finding.Remedy);
        }
    }

    /// <inheritdoc/>
    protected override JsonObject Body() => new() { ["anyOf"] = new JsonArray([.. Options.Select(option => (JsonNode)option.Schema())]) };
}
