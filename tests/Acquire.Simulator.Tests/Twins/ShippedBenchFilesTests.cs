using Acquire.Bench.Files;
using Acquire.Simulator.Twins;

namespace Acquire.Simulator.Tests.Twins;

public sealed class ShippedBenchFilesTests
{
    [Fact]
    public void Inside_TheProgram_AreTheFilesOfTheFolder()
    {
        var folder = Directory.GetFiles(ShippedBenches.Folder, "*.yaml").Select(f => Path.GetFileName(f)!).Order(StringComparer.Ordinal).ToList();
        Assert.Equal(folder, ShippedBenchFiles.Names);
        foreach (var name in folder)
            Assert.Equal(File.ReadAllText(Path.Combine(ShippedBenches.Folder, name)), ShippedBenchFiles.Find(name)!.Text);
    }

    [Fact]
    public void Bench_FromInsideTheProgram_FindsItsTwinThereToo()
    {
        var bench = BenchFile.Parse(ShippedBenchFiles.Find("germanium-quick.bench.yaml")!).Value!;
        Assert.Equal("germanium quick holder (invented)", TwinFile.Beside(bench).Value!.Model.Title);
    }

    [Fact]
    public void Find_NameThatDoesNotShip_GivesNothing() => Assert.Null(ShippedBenchFiles.Find("nowhere.bench.yaml"));
}
