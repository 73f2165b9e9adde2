using System.Xml.Linq;
using Xunit;

namespace Acquire.EndToEnd.Sources;

/// <summary>Which project may look at which: the architecture, as a test.</summary>
public sealed class ProjectGraphTests
{
    private static readonly Dictionary<string, string[]> Allowed = new(StringComparer.Ordinal)
    {
        ["Bench"] = [],
        ["Wire"] = [],
        ["Physics"] = [],
        ["Analysis"] = ["Physics"],
        ["Interlocks"] = ["Bench"],
        ["Runs"] = ["Bench"],
        ["Control"] = ["Bench"],
        ["Guard"] = ["Wire"],
        ["Sweep"] = ["Bench", "Interlocks", "Runs", "Analysis", "Control", "Guard"],
        ["Reports"] = ["Runs", "Analysis", "Interlocks"],
        ["Publish"] = ["Runs"],
        ["Console"] = ["Runs", "Analysis", "Interlocks", "Control"],
        ["Drivers"] = ["Wire", "Bench", "Physics"],
        ["Simulator"] = ["Wire", "Physics", "Bench"],
    };

    private static readonly string[] PlotReferences = ["Reports", "App", "EndToEnd", "Reports.Tests", "App.Tests", "Benchmarks"];

    public static TheoryData<string> Projects => [.. SourceTree.Files("*.csproj").Where(path => !path.StartsWith("tests/", StringComparison.Ordinal))];

    [Theory]
    [MemberData(nameof(Projects))]
    public void Project_References_OnlyWhatTheDesignAllows(string path)
    {
        var name = Name(path);
        if (name == "App")
        {
            return; // the composition root sees everything
        }

        Assert.True(Allowed.ContainsKey(name), $"{path}: not in the design's list of projects.");
        var surplus = References(path).Except(Allowed[name]).ToList();
        Assert.True(surplus.Count == 0, $"{path} may not reference {string.Join(", ", surplus)}.");
    }

    [Fact]
    public void Serilog_IsReferenced_ByAppOnly()
    {
        var users = SourceTree.Files("*.csproj").Where(path => SourceTree.Read(path).Contains("Include=\"Serilog", StringComparison.Ordinal));
        Assert.Equal(["App"], users.Select(Name));
    }

    [Fact]
    public void Plots_AreReferenced_OnlyWhereTheyAreDrawn()
    {
        var users = SourceTree.Files("*.csproj").Where(path => SourceTree.Read(path).Contains("Include=\"ScottPlot", StringComparison.Ordinal));
        Assert.Empty(users.Select(Name).Except(PlotReferences));
    }

    private static string Name(string path) => Path.GetFileNameWithoutExtension(path)["Acquire.".Length..];

    private static IEnumerable<string> References(string path) =>
        XDocument.Parse(SourceTree.Read(path)).Descendants("ProjectReference")
            .Select(reference => Name(reference.Attribute("Include")!.Value.Replace('\\', '/')));
}
