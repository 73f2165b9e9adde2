using Acquire.EndToEnd.Sources;
using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>Every shipped YAML file passes the program's own check and names its schema in the first line.</summary>
[Collection(ProcessCollection.Name)]
public sealed class ShippedFileTests
{
    [Fact]
    public async Task ShippedYaml_Check_FindsNothing()
    {
        using var scratch = new Scratch();
        var files = SourceTree.Files("*.yaml").ToArray();
        Assert.NotEmpty(files);
        var ended = await scratch.RunAsync(["check", .. files]);
        Assert.True(ended.ExitCode == 0, ended.ToString());
    }

    [Fact]
    public void ShippedYaml_FirstLine_NamesASchemaThatExists()
    {
        var offenders = SourceTree.Files("*.yaml").Where(path =>
        {
            const string Start = "# yaml-language-server: $schema=";
            var first = SourceTree.Read(path).Split('\n')[0].Trim();
            return !first.StartsWith(Start, StringComparison.Ordinal)
                || !File.Exists(Path.Combine(SourceTree.Root, Path.GetDirectoryName(path)!, first[Start.Length..]));
        });
        Assert.Empty(offenders);
    }
}
