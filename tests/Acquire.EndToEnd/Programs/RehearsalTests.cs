using System.Text.Json;
using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>A rehearsal is a function of protocol, bench and seed.</summary>
[Collection(ProcessCollection.Name)]
public sealed class RehearsalTests
{
    private const string Protocol = "protocols/germanium-quick.protocol.yaml";
    private const string Bench = "simulator/germanium-quick.bench.yaml";

    [Fact]
    public async Task Rehearse_SameSeed_GivesTheSameChainHead()
    {
        using var scratch = new Scratch();
        var first = await Head(scratch, "7", "first.run");
        var second = await Head(scratch, "7", "second.run");
        var other = await Head(scratch, "8", "other.run");

        Assert.Equal(first.Head, second.Head);
        Assert.NotEqual(first.Head, other.Head);
        Assert.True(first.Readings > 1000, $"{first.Readings} readings");
        Assert.True(first.Points > 20, $"{first.Points} points");
    }

    [Fact]
    public async Task Rehearse_ThenFit_RecoversTheLinearGapWithinItsUncertainty()
    {
        using var scratch = new Scratch();
        var rehearsed = await scratch.RunAsync("rehearse", Protocol, "--bench", Bench, "--seed", "3", "--out", "night.run");
        Assert.True(rehearsed.ExitCode == 0, rehearsed.ToString());

        var fitted = await scratch.RunAsync("fit", "night.run", "--json");
        Assert.True(fitted.ExitCode == 0, fitted.ToString());
        using var json = JsonDocument.Parse(fitted.Output);
        var corrected = json.RootElement.GetProperty("corrected");
        var twice = corrected.GetProperty("twice").GetDouble();
        var uncertainty = corrected.GetProperty("standardUncertainty").GetDouble();
        var expected = corrected.GetProperty("expectedLinearGap").GetProperty("value").GetDouble();
        // Three standard uncertainties: a wrong mobility or density exponent moves the value by several times that.
        Assert.InRange(twice, expected - (3 * uncertainty), expected + (3 * uncertainty));
        Assert.InRange(uncertainty, 0.0005, 0.05);
    }

    [Fact]
    public async Task Rehearse_FileOnDisk_OpensWithTheSqliteCommand()
    {
        using var scratch = new Scratch();
        Peers.Require("sqlite3");
        var rehearsed = await scratch.RunAsync("rehearse", Protocol, "--bench", Bench, "--seed", "3", "--out", "night.run");
        Assert.True(rehearsed.ExitCode == 0, rehearsed.ToString());

        var count = await Peers.RunAsync(scratch.Folder, "sqlite3", "night.run", "select count(*) from reading; select count(*) from point;");
        var lines = count.Output.Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(2, lines.Length);
        Assert.All(lines, line => Assert.True(int.Parse(line, System.Globalization.CultureInfo.InvariantCulture) > 10, line));
    }

    private static async Task<(string Head, long Readings, long Points)> Head(Scratch scratch, string seed, string file)
    {
        var rehearsed = await scratch.RunAsync("rehearse", Protocol, "--bench", Bench, "--seed", seed, "--out", file);
        Assert.True(rehearsed.ExitCode == 0, rehearsed.ToString());
        var verified = await scratch.RunAsync("verify", file, "--json");
        Assert.True(verified.ExitCode == 0, verified.ToString());
        using var json = JsonDocument.Parse(verified.Output);
        return (json.RootElement.GetProperty("chainHead").GetString()!,
            json.RootElement.GetProperty("readings").GetInt64(), json.RootElement.GetProperty("points").GetInt64());
    }
}
