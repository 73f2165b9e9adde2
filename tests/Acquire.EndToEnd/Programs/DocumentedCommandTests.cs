using System.Text.RegularExpressions;
using Acquire.EndToEnd.Sources;
using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>Every command that README and docs show in a shell block runs and ends with 0, in the order shown, in one folder per page.</summary>
[Collection(ProcessCollection.Name)]
public sealed partial class DocumentedCommandTests
{
    public static TheoryData<string> Pages => [.. SourceTree.Files("*.md").Where(page => Commands(page).Count > 0)];

    [Theory]
    [MemberData(nameof(Pages))]
    public async Task Page_EveryCommand_Runs(string page)
    {
        using var scratch = new Scratch();
        foreach (var command in Commands(page))
        {
            var ended = await scratch.RunAsync(Scratch.Split(command));
            Assert.True(ended.ExitCode == 0, $"{page}: acquire {command}\n{ended}");
        }
    }

    /// <summary>The arguments of each command of our program in the page's <c>sh</c> blocks.</summary>
    private static List<string> Commands(string page) =>
        [.. Blocks().Matches(SourceTree.Read(page))
            .SelectMany(block => block.Groups[1].Value.Split('\n'))
            .Select(line => Ours().Match(line.Trim()))
            .Where(line => line.Success)
            .Select(line => line.Groups[1].Value)];

    [GeneratedRegex("```sh\n(.*?)```", RegexOptions.Singleline)]
    private static partial Regex Blocks();

    [GeneratedRegex("^(?:acquire|dotnet run .*?--project src/Acquire.App --) (.*)$")]
    private static partial Regex Ours();
}
