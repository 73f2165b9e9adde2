using System.Text.Json.Nodes;
using Acquire.Bench.Files;
using Acquire.Bench.Text;
using Acquire.Sweep.Protocols;

namespace Acquire.Sweep.Tests;

/// <summary>The shipped benches and protocols, from the checkout.</summary>
internal static class Shipped
{
    public static string Root { get; } = FindRoot();

    public static string Text(string protocol) => File.ReadAllText(Path.Combine(Root, "protocols", protocol + ".protocol.yaml"));

    public static ProtocolFile Protocol(string name) => ProtocolFile.Read(Path.Combine(Root, "protocols", name + ".protocol.yaml")).Value!;

    public static BenchFile Bench(string name) => BenchFile.Read(Path.Combine(Root, "simulator", name + ".bench.yaml")).Value!;

    private static string FindRoot()
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
