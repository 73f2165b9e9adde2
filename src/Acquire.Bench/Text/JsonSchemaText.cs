using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace Acquire.Bench.Text;

/// <summary>The JSON Schema (2020-12) of a shape, as the committed files hold it.</summary>
public static class JsonSchemaText
{
    private static readonly JsonSerializerOptions Indented = new() { WriteIndented = true, Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>Writes the schema with a final line feed.</summary>
    public static string Write(Shape shape, string title)
    {
        var schema = new JsonObject { ["$schema"] = "https://json-schema.org/draft/2020-12/schema", ["title"] = title };
        foreach (var (name, value) in shape.Schema())
        {
            schema[name] = value?.DeepClone();
        }

        return schema.ToJsonString(Indented).ReplaceLineEndings("\n") + "\n";
    }
}
