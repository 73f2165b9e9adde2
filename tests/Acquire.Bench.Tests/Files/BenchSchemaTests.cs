using System.Text.Json.Nodes;
using Acquire.Bench.Files;
using Acquire.Bench.Text;
using CsCheck;
using Json.Schema;
using Xunit;

namespace Acquire.Bench.Tests.Files;

/// <summary>The committed schema is what the parser's shape generates, and an independent validator agrees with the parser.</summary>
public sealed class BenchSchemaTests
{
    private static readonly JsonSchema Independent = JsonSchema.FromText(JsonSchemaText.Write(BenchFileShape.Shape, "Acquire bench file"));

    [Fact]
    public void Schema_Committed_EqualsTheShape()
    {
        var path = Path.Combine(Root(), "simulator", "bench.schema.json");
        var expected = JsonSchemaText.Write(BenchFileShape.Shape, "Acquire bench file");
        if (Environment.GetEnvironmentVariable("ACQUIRE_WRITE_SCHEMAS") == "1")
        {
            File.WriteAllText(path, expected);
        }

        Assert.Equal(expected, File.ReadAllText(path));
    }

    [Fact]
    public void Schema_OnTheGoodText_AgreesWithTheParser() => AssertAgree(BenchTexts.Good);

    /// <summary>Ranges of quantities with units are the one thing that JSON Schema cannot say, so mutations stay inside them.</summary>
    [Fact]
    public void Schema_OnMutatedTexts_AgreesWithTheParser()
    {
        var replacements = new[]
        {
            "", "5", "-1", "1e3", "true", "yes", "null", "~", "''", "[]", "{}", "[1, 2]", "{ a: b }", "0.3 s", "0.3 K", "0.3  K", "50 Hz", "3 V", "3V", "1,5 V",
            "abc", "\"5\"", "\"TCPIP::h::1::SOCKET\"", "none", "two-wire", "2026-10-01", "0x10", ".5 K", "+3. K", "1 furlong",
        };
        var values = Places(BenchTexts.Good);
        Gen.Select(Gen.Int[0, values.Count - 1], Gen.Int[0, replacements.Length - 1])
            .Sample((place, which) => AssertAgree(Mutate(BenchTexts.Good, values[place], replacements[which])), iter: 3000);
    }

    [Fact]
    public void Schema_OnRenamedOrDroppedKeys_AgreesWithTheParser()
    {
        var keys = new[] { "bench", "simulated", "site", "line frequency", "instruments", "driver", "address", "wiring", "temperature loop", "instrument", "limits", "ramp", "what" };
        foreach (var key in keys)
        {
            AssertAgree(BenchTexts.Good.Replace(key + ":", key + "s:", StringComparison.Ordinal));
        }
    }

    private static void AssertAgree(string text)
    {
        var document = YamlDocument.Parse(BenchTexts.Source(text));
        if (document.Value is null)
        {
            return; // not YAML: there is nothing for a schema to judge
        }

        var report = new ShapeReport("x");
        BenchFileShape.Shape.Check(document.Value, report);
        var shape = report.Diagnostics.Where(finding => !finding.What.EndsWith("out of range", StringComparison.Ordinal) || finding.What.StartsWith("the number", StringComparison.Ordinal)).ToList();
        var schema = Independent.Evaluate(System.Text.Json.JsonSerializer.SerializeToElement(CoreJson.Of(document.Value))).IsValid;
        Assert.True(schema == (shape.Count == 0), $"schema says {schema}, parser says: {string.Join(" | ", shape)}\n{text}");
    }

    /// <summary>Start and length of every value that stands between a colon and a comma, a brace or the end of its line.</summary>
    private static List<(int Start, int Length)> Places(string text) =>
        [.. System.Text.RegularExpressions.Regex.Matches(text, @"(?<=: )[^,{}\n\[\]]+?(?=( \}|,|\n|$))").Select(match => (match.Index, match.Length))];

    private static string Mutate(string text, (int Start, int Length) place, string replacement) =>
        text.Remove(place.Start, place.Length).Insert(place.Start, replacement);

    private static string Root()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (!File.Exists(Path.Combine(folder.FullName, "Acquire.sln")))
        {
            folder = folder.Parent ?? throw new DirectoryNotFoundException("Acquire.sln");
        }

        return folder.FullName;
    }
}

/// <summary>A document as the core schema of YAML 1.2 makes JSON of it: what an editor's validator sees.</summary>
internal static class CoreJson
{
    public static JsonNode? Of(YamlNode node) => node switch
    {
        YamlMap map => new JsonObject(map.Entries.Select(entry => KeyValuePair.Create(entry.Key, Of(entry.Value)))),
        YamlList list => new JsonArray([.. list.Items.Select(Of)]),
        YamlText text => Scalar(text),
        _ => throw new ArgumentOutOfRangeException(nameof(node)),
    };

    private static JsonValue? Scalar(YamlText text) => CoreTypes.Of(text) switch
    {
        CoreType.Nothing => null,
        CoreType.Flag => JsonValue.Create(text.Value is "true" or "True" or "TRUE"),
        CoreType.WholeNumber or CoreType.Number => JsonValue.Create(CoreTypes.NumberOf(text)!.Value),
        _ => JsonValue.Create(text.Value),
    };
}
