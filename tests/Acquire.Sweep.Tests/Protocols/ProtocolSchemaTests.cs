using Acquire.Bench.Text;
using Acquire.Sweep.Protocols;
using Json.Schema;
using Xunit;

namespace Acquire.Sweep.Tests.Protocols;

/// <summary>The committed schema is what the parser's shape generates; an independent validator accepts every shipped protocol and refuses broken ones.</summary>
public sealed class ProtocolSchemaTests
{
    private static readonly string Generated = JsonSchemaText.Write(ProtocolFileShape.Shape, "Acquire protocol file");

    [Fact]
    public void Schema_Committed_EqualsTheShape()
    {
        var path = Path.Combine(Shipped.Root, "protocols", "protocol.schema.json");
        if (Environment.GetEnvironmentVariable("ACQUIRE_WRITE_SCHEMAS") == "1")
        {
            File.WriteAllText(path, Generated);
        }

        Assert.Equal(Generated, File.ReadAllText(path));
    }

    public static TheoryData<string, string> Mutations => new()
    {
        { "bias: 0.2 V", "bias: 0.2" }, { "bias: 0.2 V", "bias: 0.2 K" }, { "reversals: 4", "reversals: 4.5" }, { "reversals: 4", "reversals: four" },
        { "spacing: reciprocal", "spacing: logarithmic" }, { "finish: safe", "finish: hot" }, { "finish: safe", "finnish: safe" }, { "id: G-0417", "id: 417" },
        { "material: Ge", "material: [Ge]" }, { "at each: [dark]", "at each: dark" }, { "ramp: 25 K/min", "ramp: 25 K/fortnight" }, { "legs:", "leg:" },
        { "bias: 0.2 V", "bias: 200 mV" }, { "points: 14", "points: 15" }, { "settled: 0.2 %", "settled: 0.002" }, { "finish: safe", "" },
    };

    [Theory]
    [MemberData(nameof(Mutations))]
    public void Schema_OnAMutatedProtocol_AgreesWithTheParser(string old, string changed)
    {
        var text = Shipped.Text("germanium-quick");
        Assert.Contains(old, text, StringComparison.Ordinal);
        var node = YamlDocument.Parse(new SourceText("p", text.Replace(old, changed, StringComparison.Ordinal))).Value!;
        var report = new ShapeReport("p");
        ProtocolFileShape.Shape.Check(node, report);
        var schema = JsonSchema.FromText(Generated).Evaluate(System.Text.Json.JsonSerializer.SerializeToElement(CoreJson.Of(node))).IsValid;
        Assert.Equal(schema, report.Diagnostics.Count == 0);
    }
}
