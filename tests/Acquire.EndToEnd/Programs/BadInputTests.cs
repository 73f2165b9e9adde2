using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>Whatever a user hands in: a clear message naming place and remedy, exit code 2, nothing lost, nothing energised.</summary>
[Collection(ProcessCollection.Name)]
public sealed class BadInputTests
{
    private const string Protocol = "protocols/germanium-quick.protocol.yaml";
    private const string Bench = "simulator/germanium-quick.bench.yaml";

    [Fact]
    public async Task Rehearse_ProtocolWithUnknownKey_NamesPlaceAndRemedy()
    {
        using var scratch = new Scratch();
        var text = await File.ReadAllTextAsync(scratch[Protocol]);
        await File.WriteAllTextAsync(scratch["typo.protocol.yaml"], text + "\nfinnish: safe\n");
        await Refused(scratch, "typo.protocol.yaml:", "finnish", "rehearse", "typo.protocol.yaml", "--bench", Bench);
    }

    [Fact]
    public async Task Rehearse_ProtocolThatIsEmpty_IsRefused()
    {
        using var scratch = new Scratch();
        await File.WriteAllTextAsync(scratch["empty.protocol.yaml"], "");
        await Refused(scratch, "empty.protocol.yaml", "empty", "rehearse", "empty.protocol.yaml", "--bench", Bench);
    }

    [Fact]
    public async Task Rehearse_ProtocolThatIsBinary_IsRefused()
    {
        using var scratch = new Scratch();
        await File.WriteAllBytesAsync(scratch["noise.protocol.yaml"], [0, 1, 2, 3, 255, 254, 0, 9]);
        await Refused(scratch, "noise.protocol.yaml", "text", "rehearse", "noise.protocol.yaml", "--bench", Bench);
    }

    [Fact]
    public async Task Rehearse_ProtocolThatIsHuge_IsRefused()
    {
        using var scratch = new Scratch();
        await File.WriteAllTextAsync(scratch["huge.protocol.yaml"], new string('#', 20_000_000));
        await Refused(scratch, "huge.protocol.yaml", "MB", "rehearse", "huge.protocol.yaml", "--bench", Bench);
    }

    [Fact]
    public async Task Rehearse_ProtocolThatIsMissing_IsRefused()
    {
        using var scratch = new Scratch();
        await Refused(scratch, "nowhere.protocol.yaml", "nowhere.protocol.yaml", "rehearse", "nowhere.protocol.yaml", "--bench", Bench);
    }

    [Fact]
    public async Task Run_OnABenchThatIsNotSimulated_IsRefusedBeforeAnythingOpens()
    {
        using var scratch = new Scratch();
        var text = await File.ReadAllTextAsync(scratch[Bench]);
        var real = string.Join('\n', text.Split('\n').Where(line => !line.StartsWith("simulated:", StringComparison.Ordinal)
            && !line.StartsWith("pace:", StringComparison.Ordinal)));
        await File.WriteAllTextAsync(scratch["simulator/real.bench.yaml"], real);
        var ended = await Refused(scratch, "real.bench.yaml", "simulat", "run", Protocol, "--bench", "simulator/real.bench.yaml", "--foreground");
        Assert.False(Directory.Exists(scratch["runs"]) && Directory.EnumerateFiles(scratch["runs"]).Any(), ended.ToString());
    }

    [Theory]
    [InlineData("fit")]
    [InlineData("verify")]
    [InlineData("report")]
    public async Task Command_OnAFileThatIsNoRun_SaysSo(string command)
    {
        using var scratch = new Scratch();
        await File.WriteAllBytesAsync(scratch["broken.run"], [.. "SQLite format 3\0"u8, 1, 2, 3]);
        await Refused(scratch, "broken.run", "run", command, "broken.run");
    }

    [Fact]
    public async Task Fit_CsvWithTextInANumberColumn_NamesTheCell()
    {
        using var scratch = new Scratch();
        await File.WriteAllTextAsync(scratch["t.csv"], "T_K,G_S\n300,1e-6\n310,oops\n320,2e-6\n");
        await Refused(scratch, "t.csv:3", "oops", "fit", "t.csv");
    }

    [Fact]
    public async Task Acquire_UnknownCommand_IsRefused()
    {
        using var scratch = new Scratch();
        await Refused(scratch, "brew", "--help", "brew");
    }

    [Fact]
    public async Task Check_FileWithFindings_AnswersNo()
    {
        using var scratch = new Scratch();
        var text = await File.ReadAllTextAsync(scratch[Protocol]);
        await File.WriteAllTextAsync(scratch["typo.protocol.yaml"], text + "\nfinnish: safe\n");
        var ended = await scratch.RunAsync("check", "typo.protocol.yaml");
        Assert.True(ended.ExitCode == 1, ended.ToString());
        Assert.Contains("typo.protocol.yaml:", ended.Output + ended.Errors, StringComparison.Ordinal);
    }

    private static async Task<Ended> Refused(Scratch scratch, string place, string word, params string[] arguments)
    {
        var ended = await scratch.RunAsync(arguments);
        Assert.True(ended.ExitCode == 2, ended.ToString());
        Assert.Contains(place, ended.Errors, StringComparison.Ordinal);
        Assert.Contains(word, ended.Errors, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("   at ", ended.Errors, StringComparison.Ordinal); // no stack trace
        return ended;
    }
}
