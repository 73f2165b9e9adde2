using Acquire.Bench.Files;
using Acquire.Simulator.Twins;

namespace Acquire.Simulator.Tests.Twins;

/// <summary>The benches that ship, found from the folder of the tests upwards.</summary>
internal static class ShippedBenches
{
    public static readonly string[] Names = ["germanium-quick", "germanium-cryostat", "silicon-furnace"];

    public static string Folder { get; } = Find();

    public static BenchFile Bench(string name)
    {
        var bench = BenchFile.Read(Path.Combine(Folder, name + ".bench.yaml"));
        Assert.True(bench.Value is not null, string.Join('\n', bench.Diagnostics));
        return bench.Value!;
    }

    public static TwinModel Twin(string name)
    {
        var twin = TwinFile.Beside(Bench(name));
        Assert.True(twin.Value is not null, string.Join('\n', twin.Diagnostics));
        return twin.Value!.Model;
    }

    private static string Find()
    {
        for (var folder = new DirectoryInfo(AppContext.BaseDirectory); folder is not null; folder = folder.Parent)
            if (File.Exists(Path.Combine(folder.FullName, "Acquire.sln"))) return Path.Combine(folder.FullName, "simulator");
        throw new DirectoryNotFoundException("No Acquire.sln above the tests.");
    }
}
