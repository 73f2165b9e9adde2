using System.Text.Json;
using System.Text.Json.Nodes;
using Acquire.Bench.Text;
using Acquire.Simulator.Twins;
using CsCheck;
using Json.Schema;

namespace Acquire.Simulator.Tests.Twins;

public sealed class TwinFileTests
{
    public static TheoryData<string> Names => [.. ShippedBenches.Names];

    [Fact]
    public void Schema_Committed_EqualsTheShape()
    {
        var path = Path.Combine(ShippedBenches.Folder, "twin.schema.json");
        var expected = JsonSchemaText.Write(TwinFileShape.Shape, "Acquire twin file");
        if (Environment.GetEnvironmentVariable("ACQUIRE_WRITE_SCHEMAS") == "1") File.WriteAllText(path, expected);
        Assert.Equal(expected, File.ReadAllText(path));
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Shipped_Bench_HasATwinWithPlausibleTruth(string name)
    {
        var bench = ShippedBenches.Bench(name);
        var twin = ShippedBenches.Twin(name);
        Assert.True(bench.Simulated);
        Assert.InRange(bench.Limits.TemperatureFromK, twin.Controller.SetFromK, twin.Controller.SetToK);
        Assert.InRange(bench.Limits.OverTemperatureK, bench.Limits.TemperatureToK, twin.Controller.SetToK);
        Assert.InRange(bench.Limits.RampKPerS, 0, twin.Controller.MostRampKPerS);
        Assert.True(twin.Controller.MostPowerW <= bench.Limits.HeaterPowerW);
        // The constant errors of the sensors must be worth two of the standard uncertainties that the bench declares for them.
        Assert.True(Math.Abs(twin.Controller.StageOffsetK) <= 2 * bench.Wiring.Loop.StageUncertaintyK);
        Assert.True(Math.Abs(twin.Controller.SampleOffsetK) <= 2 * bench.Wiring.Loop.SampleUncertaintyK);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Shipped_Twin_NamesItsSchemaFirst(string name) =>
        Assert.Equal("# yaml-language-server: $schema=twin.schema.json", File.ReadLines(Path.Combine(ShippedBenches.Folder, name + ".twin.yaml")).First());

    [Fact]
    public void Parse_UnknownKey_NamesPlaceAndNearestKey()
    {
        var text = QuickText().Replace("integral time", "integrall time", StringComparison.Ordinal);
        var found = Assert.Single(Problems(text), d => d.What == "unknown key");
        Assert.Contains("integral time", found.ToString(), StringComparison.Ordinal);
        Assert.StartsWith("t.twin.yaml:", found.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void Parse_TrapsWithoutDepth_AreRefused()
    {
        var text = string.Join('\n', QuickText().Split('\n').Where(line => !line.Contains("trap depth", StringComparison.Ordinal)));
        Assert.Contains(Problems(text), d => d.What.Contains("traps have no depth", StringComparison.Ordinal));
    }

    [Fact]
    public void Parse_MutatedLines_GiveAModelOrADiagnosticAndAgreeWithTheSchema()
    {
        var schema = JsonSchema.FromText(JsonSchemaText.Write(TwinFileShape.Shape, "Acquire twin file"));
        var lines = QuickText().Split('\n');
        string[] replacements = ["", "5", "1 furlong", "1 K", "x: y", "{}", "-1 W"];
        Gen.Select(Gen.Int[2, lines.Length - 2], Gen.Int[0, replacements.Length - 1])
            .Sample((at, which) =>
            {
                var with = replacements[which];
                var mutated = lines.ToArray();
                var colon = mutated[at].IndexOf(": ", StringComparison.Ordinal);
                mutated[at] = colon < 0 ? with : mutated[at][..(colon + 2)] + with;
                var text = string.Join('\n', mutated);
                var document = YamlDocument.Parse(new SourceText("t.twin.yaml", text));
                if (document.Value is null) return;
                var report = new ShapeReport("t.twin.yaml");
                TwinFileShape.Shape.Check(document.Value, report);
                // The range of a quantity with a unit is the one thing that a schema cannot say.
                var structural = report.Diagnostics.Where(d => !d.What.EndsWith("is out of range", StringComparison.Ordinal) || d.What.StartsWith("the number", StringComparison.Ordinal)).ToList();
                Assert.Equal(structural.Count == 0, schema.Evaluate(Json(document.Value)).IsValid);
                TwinFile.Parse(new SourceText("t.twin.yaml", text));
            }, iter: 400);
    }

    private static string QuickText() => File.ReadAllText(Path.Combine(ShippedBenches.Folder, "germanium-quick.twin.yaml"));

    private static IReadOnlyList<Diagnostic> Problems(string text)
    {
        var parsed = TwinFile.Parse(new SourceText("t.twin.yaml", text));
        Assert.Null(parsed.Value);
        return parsed.Diagnostics;
    }

    private static JsonElement Json(YamlNode node) => JsonSerializer.SerializeToElement(Node(node));

    private static JsonNode? Node(YamlNode node) => node switch
    {
        YamlMap map => new JsonObject(map.Entries.Select(e => KeyValuePair.Create(e.Key, Node(e.Value)))),
        YamlList list => new JsonArray([.. list.Items.Select(Node)]),
        YamlText { Quoted: true } text => JsonValue.Create(text.Value),
        YamlText { Value: "" } => null,
        YamlText { Value: "true" or "false" } text => JsonValue.Create(text.Value == "true"),
        YamlText text when PlainNumber.Parse(text.Value) is { } number => JsonValue.Create(number),
        YamlText text => JsonValue.Create(text.Value),
        _ => throw new InvalidOperationException(node.Kind),
    };
}
