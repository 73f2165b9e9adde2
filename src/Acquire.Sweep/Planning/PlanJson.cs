using System.Text.Json;
using System.Text.Json.Serialization;
using Acquire.Runs.Plans;

namespace Acquire.Sweep.Planning;

/// <summary>A plan as JSON, there and back without loss.</summary>
public static class PlanJson
{
    private static readonly JsonSerializerOptions Options = MakeOptions();

    /// <summary>Writes a plan.</summary>
    public static string Write(Plan plan) => JsonSerializer.Serialize(plan, Options);

    /// <summary>Reads a plan; null when it is none.</summary>
    public static Plan? Read(string json)
    {
        try
        {
            return JsonSerializer.Deserialize<Plan>(json, Options);
        }
        catch (JsonException)
        {
            return null;
        }
    }

    private static JsonSerializerOptions MakeOptions()
    {
        var options = new JsonSerializerOptions
        {
            PropertyNamingPolicy = JsonNamingPolicy.CamelCase,
            NumberHandling = JsonNumberHandling.AllowNamedFloatingPointLiterals,
            TypeInfoResolver = new System.Text.Json.Serialization.Metadata.DefaultJsonTypeInfoResolver
            {
                Modifiers =
                {
                    type =>
                    {
                        if (type.Type == typeof(PlanStep))
                        {
                            type.PolymorphismOptions = new() { TypeDiscriminatorPropertyName = "step" };
                            type.PolymorphismOptions.DerivedTypes.Add(new(typeof(GoToStep), "go to"));
                            type.PolymorphismOptions.DerivedTypes.Add(new(typeof(MeasureStep), "measure"));
                            type.PolymorphismOptions.DerivedTypes.Add(new(typeof(FinishStep), "finish"));
                        }
                    },
                },
            },
        };
        options.Converters.Add(new JsonStringEnumConverter(JsonNamingPolicy.CamelCase));
        return options;
    }
}
