using System.CommandLine;

namespace Acquire.App.CommandLine;

/// <summary>Options that several commands share.</summary>
internal static class Arguments
{
    /// <summary>A required argument that names a file.</summary>
    public static Argument<string> File(string name, string description) => new(name) { Description = description };

    /// <summary><c>--bench BENCH</c>.</summary>
    public static Option<string> Bench(bool required) => new("--bench") { Description = "The bench file.", HelpName = "BENCH", Required = required };

    /// <summary><c>--out RUN</c>.</summary>
    public static Option<string?> Out(string description) => new("--out") { Description = description, HelpName = "FILE" };

    /// <summary><c>--json</c>.</summary>
    public static Option<bool> Json() => new("--json") { Description = "One JSON document on standard output and nothing else there." };

    /// <summary><c>--seed N</c>.</summary>
    public static Option<ulong> Seed() => new("--seed") { Description = "Seed of the simulated noise.", HelpName = "N", DefaultValueFactory = _ => 1 };

    /// <summary><c>--operator NAME</c>.</summary>
    public static Option<string?> Operator() => new("--operator") { Description = "Who does it; recorded.", HelpName = "NAME" };

    /// <summary><c>--map role=COLUMN</c>.</summary>
    public static Option<string[]> Map() => new("--map")
    {
        Description = "Settles which column is which: role=COLUMN; roles are temperature, conductance, current, voltage.",
        HelpName = "role=COLUMN",
        AllowMultipleArgumentsPerToken = true,
    };

    /// <summary>The map's pairs, or what is wrong with them.</summary>
    public static (Dictionary<string, string>? Map, string? Problem) ReadMap(string[]? entries)
    {
        var map = new Dictionary<string, string>(StringComparer.Ordinal);
        foreach (var entry in entries ?? [])
        {
            var parts = entry.Split('=', 2);
            if (parts.Length != 2 || parts[0] is not ("temperature" or "conductance" or "resistance" or "current" or "voltage"))
            {
                return (null, $"--map {entry} refused: write role=COLUMN with role temperature, conductance, current or voltage.");
            }

            map[parts[0]] = parts[1];
        }

        return (map, null);
    }

    /// <summary>A command with an example in its help.</summary>
    public static Command Command(string name, string description, string example) => new(name, $"{description}\n\nExample:\n  acquire {example}");
}
