namespace Acquire.Bench.Text;

/// <summary>A node of a YAML document and where it stands.</summary>
public abstract record YamlNode(Position At)
{
    /// <summary>What the node is, in words for messages.</summary>
    public abstract string Kind { get; }
}

/// <summary>A scalar; always text, because a quantity is text with a unit.</summary>
public sealed record YamlText(Position At, string Value, bool Quoted) : YamlNode(At)
{
    /// <inheritdoc/>
    public override string Kind => "a text";
}

/// <summary>A sequence.</summary>
public sealed record YamlList(Position At, IReadOnlyList<YamlNode> Items) : YamlNode(At)
{
    /// <inheritdoc/>
    public override string Kind => "a list";
}

/// <summary>One key and its value.</summary>
public sealed record YamlEntry(Position At, string Key, YamlNode Value);

/// <summary>A mapping in the order written; keys are unique.</summary>
public sealed record YamlMap(Position At, IReadOnlyList<YamlEntry> Entries) : YamlNode(At)
{
    /// <inheritdoc/>
    public override string Kind => "a map";

    /// <summary>The value of a key, or null.</summary>
    public YamlNode? Find(string key)
    {
        foreach (var entry in Entries)
        {
            if (entry.Key == key)
            {
                return entry.Value;
            }
        }

        return null;
    }

    /// <summary>True when the key is there.</summary>
    public bool Has(string key) => Find(key) is not null;

    /// <summary>Where the key's value stands; the map itself when the key is missing.</summary>
    public Position AtOf(string key) => Find(key)?.At ?? At;

    /// <summary>The text of a key. For documents that passed their shape.</summary>
    public string Text(string key) => ((YamlText)Need(key)).Value;

    /// <summary>The text of a key, or the fallback when it is missing.</summary>
    public string TextOr(string key, string fallback) => Has(key) ? Text(key) : fallback;

    /// <summary>The map of a key.</summary>
    public YamlMap Map(string key) => (YamlMap)Need(key);

    /// <summary>The map of a key, or null when it is missing.</summary>
    public YamlMap? MapOrNull(string key) => Find(key) as YamlMap;

    /// <summary>The items of a key, or none when it is missing.</summary>
    public IReadOnlyList<YamlNode> List(string key) => Find(key) is YamlList list ? list.Items : [];

    /// <summary>A quantity in SI.</summary>
    public double Quantity(string key, Dimension dimension) => QuantityText.ParseOrThrow(Text(key), dimension);

    /// <summary>A quantity in SI, or the fallback when it is missing.</summary>
    public double QuantityOr(string key, Dimension dimension, double fallback) => Has(key) ? Quantity(key, dimension) : fallback;

    /// <summary>A whole number.</summary>
    public int Integer(string key) => (int)Number(key);

    /// <summary>A whole number, or the fallback when it is missing.</summary>
    public int IntegerOr(string key, int fallback) => Has(key) ? Integer(key) : fallback;

    /// <summary>A number without unit.</summary>
    public double Number(string key) => CoreTypes.NumberOf((YamlText)Need(key)) ?? throw new InvalidOperationException($"'{key}' passed no shape.");

    /// <summary>A number without unit, or the fallback when it is missing.</summary>
    public double NumberOr(string key, double fallback) => Has(key) ? Number(key) : fallback;

    /// <summary>A flag, or the fallback when it is missing.</summary>
    public bool FlagOr(string key, bool fallback) => Has(key) ? Text(key) == "true" : fallback;

    private YamlNode Need(string key) => Find(key) ?? throw new InvalidOperationException($"'{key}' is missing from a document that passed its shape.");
}
