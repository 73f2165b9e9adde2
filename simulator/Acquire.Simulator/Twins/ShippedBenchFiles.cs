using Acquire.Bench.Text;

namespace Acquire.Simulator.Twins;

/// <summary>The simulated benches and twins that ship inside the program, for when their files do not lie about.</summary>
public static class ShippedBenchFiles
{
    /// <summary>Names of the shipped bench and twin files.</summary>
    public static IReadOnlyList<string> Names { get; } =
        [.. typeof(ShippedBenchFiles).Assembly.GetManifestResourceNames().Where(n => n.EndsWith(".yaml", StringComparison.Ordinal)).Order(StringComparer.Ordinal)];

    /// <summary>The text of a shipped file by its name, or null.</summary>
    public static SourceText? Find(string fileName)
    {
        using var stream = Names.Contains(fileName) ? typeof(ShippedBenchFiles).Assembly.GetManifestResourceStream(fileName) : null;
        if (stream is null) return null;
        using var reader = new StreamReader(stream);
        return new SourceText(fileName, reader.ReadToEnd());
    }
}
