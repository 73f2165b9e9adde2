using System.Text.Json.Nodes;
using Acquire.Bench.Text;
using Acquire.Drivers.Files;
using CsCheck;
using Json.Schema;

namespace Acquire.Drivers.Tests.Files;

public class DriverFileShapeTests
{
    private static readonly string SchemaPath = Path.Combine(RepositoryFiles.Drivers, "driver.schema.json");
    private static readonly string Generated = JsonSchemaText.Write(DriverFileShape.Shape, "Driver file of Acquire");
    private static readonly JsonSchema Schema = JsonSchema.FromText(Generated);

    [Fact]
    public void Schema_Committed_EqualsTheGeneratedOne()
    {
        if (Environment.GetEnvironmentVariable("ACQUIRE_WRITE_SCHEMAS") == "1") File.WriteAllText(SchemaPath, Generated);
        Assert.Equal(Generated, File.ReadAllText(SchemaPath));
    }

    public static TheoryData<string> Shipped => [.. DriverCatalogue.ShippedNames];

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Schema_AndParser_AgreeOnShippedFilesWithOneThingChanged(string name)
    {
        var text = File.ReadAllText(Path.Combine(RepositoryFiles.Drivers, name + ".driver.yaml"));
        var root = Json(YamlDocument.Parse(new SourceText(name, text)).Value!);
        Assert.True(Valid(root));
        Gen.Select(Gen.Int[0, 200], Gen.Int[0, 4]).Sample((place, change) =>
        {
            var mutated = root.DeepClone();
            if (!Mutate(mutated, place, change)) return;
            var report = new ShapeReport(name);
            DriverFileShape.Shape.Check(Yaml(mutated), report);
            Assert.True(Valid(mutated) == (report.Diagnostics.Count == 0),
                $"schema {Valid(mutated)}, parser {string.Join(" | ", report.Diagnostics)}: {mutated.ToJsonString()}");
        }, iter: 400, threads: 1);
    }

    private static bool Valid(JsonNode node) => Schema.Evaluate(System.Text.Json.JsonSerializer.SerializeToElement(node)).IsValid;

    // The values of the shipped files are texts, numbers, lists and maps; a number here is one that YAML reads as a number.
    private static JsonNode Json(YamlNode node) => node switch
    {
        YamlMap map => new JsonObject(map.Entries.Select(e => KeyValuePair.Create<string, JsonNode?>(e.Key, Json(e.Value)))),
        YamlList list => new JsonArray([.. list.Items.Select(item => (JsonNode?)Json(item))]),
        YamlText { Quoted: false } text when int.TryParse(text.Value, System.Globalization.CultureInfo.InvariantCulture, out var number) => JsonValue.Create(number),
        YamlText text => JsonValue.Create(text.Value),
        _ => throw new InvalidOperationException(),
    };

    private static YamlNode Yaml(JsonNode? node) => node switch
    {
        JsonObject map => new YamlMap(Position.Start, [.. map.Select(e => new YamlEntry(Position.Start, e.Key, Yaml(e.Value)))]),
        JsonArray list => new YamlList(Position.Start, [.. list.Select(Yaml)]),
        JsonValue value when value.TryGetValue<string>(out var text) => new YamlText(Position.Start, text, Quoted: true),
        _ => new YamlText(Position.Start, node!.ToJsonString(), Quoted: false),
    };

    private static bool Mutate(JsonNode root, int place, int change)
    {
        var maps = new List<JsonObject>();
        Collect(root, maps);
        var places = maps.SelectMany(map => map.Select(e => (map, e.Key))).ToList();
        var (target, key) = places[place % places.Count];
        switch (change)
        {
            case 0: target.Remove(key); return true;
            case 1: target[key + "x"] = "extra"; return true;
            case 2: target[key] = JsonValue.Create(7); return true;
            case 3: target[key] = new JsonArray(); return true;
            default: target[key] = JsonValue.Create("7 parsecs"); return true;
        }
    }

    private static void Collect(JsonNode? node, List<JsonObject> maps)
    {
        if (node is JsonObject map)
        {
            maps.Add(map);
            foreach (var (_, value) in map) Collect(value, maps);
        }
        else if (node is JsonArray list) foreach (var item in list) Collect(item, maps);
    }
}
