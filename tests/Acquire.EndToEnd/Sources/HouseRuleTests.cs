using System.Text.RegularExpressions;
using Xunit;

namespace Acquire.EndToEnd.Sources;

/// <summary>The sources tested like code: lengths, forbidden calls, forbidden words. Each exemption names its reason; the lists only shrink.</summary>
public sealed partial class HouseRuleTests
{
    private const int LongestFile = 500;

    /// <summary>Parts that run on the engine's loop: nothing there may leave it.</summary>
    private static readonly string[] LoopFolders =
        ["src/Acquire.Sweep/", "src/Acquire.Interlocks/", "drivers/Acquire.Drivers/", "simulator/Acquire.Simulator/Sample", "simulator/Acquire.Simulator/Stage"];

    private static readonly string[] TopLevel =
        ["README.md", "DEVELOPERS.md", "LICENSE", "CHANGELOG.md", "Acquire.sln", "Directory.Build.props", "Directory.Packages.props",
         "BannedSymbols.txt", "global.json", ".editorconfig", ".gitignore", ".gitattributes",
         "src", "drivers", "protocols", "simulator", "tests", "docs", ".ci", ".git"];

    [Fact]
    public void SourceFile_Length_StaysUnderTheStopLine()
    {
        var offenders = SourceTree.Files("*.cs")
            .Where(path => !path.EndsWith(".Data.cs", StringComparison.Ordinal))
            .Select(path => (path, lines: SourceTree.Read(path).AsSpan().Count('\n')))
            .Where(file => file.lines > LongestFile)
            .Select(file => $"{file.path}: {file.lines} lines");
        Assert.Empty(offenders);
    }

    [Fact]
    public void SourceFile_OnTheLoop_NeverLeavesIt()
    {
        var offenders = SourceTree.Files("*.cs")
            .Where(path => LoopFolders.Any(folder => path.StartsWith(folder, StringComparison.Ordinal)))
            .Where(path => LeavesLoop().IsMatch(SourceTree.Read(path)));
        Assert.Empty(offenders);
    }

    [Fact]
    public void SourceFile_Name_IsNotAGrabBag()
    {
        var offenders = SourceTree.Files("*.cs").Where(path => GrabBag().IsMatch(path));
        Assert.Empty(offenders);
    }

    [Fact]
    public void SourceFile_Text_HoldsNoUnfinishedWork()
    {
        var offenders = SourceTree.Files("*.cs")
            .Where(path => !path.EndsWith("HouseRuleTests.cs", StringComparison.Ordinal))
            .Where(path => Unfinished().IsMatch(SourceTree.Read(path)));
        Assert.Empty(offenders);
    }

    [Fact]
    public void AnyFile_Text_NamesNoPathOfAMachine()
    {
        var offenders = new[] { "*.cs", "*.md", "*.yaml", "*.json", "*.csproj", "*.props" }
            .SelectMany(SourceTree.Files)
            .Where(path => !path.EndsWith("HouseRuleTests.cs", StringComparison.Ordinal))
            .Where(path => MachinePath().IsMatch(SourceTree.Read(path)));
        Assert.Empty(offenders);
    }

    [Fact]
    public void TopLevel_Holds_OnlyWhatTheHouseLists()
    {
        var found = Directory.EnumerateFileSystemEntries(SourceTree.Root).Select(path => Path.GetFileName(path)!);
        Assert.Empty(found.Except([.. TopLevel, "runs", "TestResults", "bin", "obj"]));
    }

    [GeneratedRegex(@"ConfigureAwait\(false\)|Task\.Run\(|new Thread\(|ThreadPool\.")]
    private static partial Regex LeavesLoop();

    [GeneratedRegex(@"(Helper|Helpers|Util|Utils|Manager|Common|Misc)\.cs$|/(Helpers|Utils|Common|Managers)/")]
    private static partial Regex GrabBag();

    [GeneratedRegex(@"NotImplementedException|\bTODO\b|\bFIXME\b|\bHACK\b")]
    private static partial Regex Unfinished();

    [GeneratedRegex("""(?<![\w.~])/(work|home|root)/""")]
    private static partial Regex MachinePath();
}
