using Acquire.App.CommandLine;
using Xunit;

namespace Acquire.App.Tests.CommandLine;

public sealed class AcquireProgramTests
{
    private static readonly string[] Promised = ["check", "plan", "rehearse", "run", "tell", "simulate", "runs", "fit", "report", "import", "verify"];

    [Fact]
    public void Commands_OfTheContract_AreAllThere()
    {
        var (terminal, _, _) = Quiet();
        var visible = AcquireProgram.Build(terminal).Subcommands.Where(command => !command.Hidden).Select(command => command.Name);
        Assert.Equal(Promised.Order(), visible.Order());
    }

    [Fact]
    public async Task Help_OfEveryCommand_ShowsAnExampleOfItself()
    {
        foreach (var command in Promised)
        {
            var (terminal, output, _) = Quiet();
            Assert.Equal(ExitCode.Done, await AcquireProgram.RunAsync([command, "--help"], terminal));
            Assert.Contains($"acquire {command} ", output.ToString(), StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData("brew")]
    [InlineData("fit")]
    [InlineData("plan", "x.protocol.yaml")]
    [InlineData("tell", "x.run", "dance", "--operator", "A")]
    [InlineData("rehearse", "x", "--bench", "y", "--seed", "minus one")]
    public async Task Usage_ThatIsWrong_IsNotTakenAndPointsToTheHelp(params string[] arguments)
    {
        var (terminal, output, errors) = Quiet();
        Assert.Equal(ExitCode.NotTaken, await AcquireProgram.RunAsync(arguments, terminal));
        Assert.Contains("--help", errors.ToString(), StringComparison.Ordinal);
        Assert.Equal("", output.ToString());
    }

    [Fact]
    public async Task Fit_OfATableWithAllNoise_PrintsARefusalAsJson()
    {
        var path = Path.Combine(Path.GetTempPath(), FormattableString.Invariant($"acquire-app-{Environment.ProcessId}.csv"));
        await File.WriteAllTextAsync(path, "T_K,G_S\n300,1e-6\n310,2e-6\n");
        try
        {
            var (terminal, output, _) = Quiet();
            Assert.Equal(ExitCode.AnswerIsNo, await AcquireProgram.RunAsync(["fit", path, "--json"], terminal));
            Assert.Contains("\"activationEnergy\": null", output.ToString(), StringComparison.Ordinal);
            Assert.Contains("only 2 usable points; 6 are needed", output.ToString(), StringComparison.Ordinal);
        }
        finally
        {
            File.Delete(path);
        }
    }

    [Theory]
    [InlineData("--material", "Unobtainium", "allowed Ge, Si, GaAs")]
    [InlineData("--temperature-uncertainty", "0.1", "a space and one of K, mK")]
    [InlineData("--temperature-uncertainty", "-1 K", "zero or more")]
    [InlineData("--map", "banana=G_S", "role=COLUMN")]
    public async Task Fit_WithAnOptionThatIsWrong_SaysWhatIsAllowed(string option, string value, string allowed)
    {
        var (terminal, _, errors) = Quiet();
        Assert.Equal(ExitCode.NotTaken, await AcquireProgram.RunAsync(["fit", "x.csv", option, value], terminal));
        Assert.Contains(allowed, errors.ToString(), StringComparison.Ordinal);
    }

    private static (Terminal Terminal, StringWriter Output, StringWriter Errors) Quiet()
    {
        var (output, errors) = (new StringWriter(), new StringWriter());
        return (Terminal.Of(output, errors), output, errors);
    }
}
