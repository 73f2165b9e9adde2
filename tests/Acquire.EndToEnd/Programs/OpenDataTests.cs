using System.Text.Json;
using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>
/// A really measured germanium slab (van der Pauw, warming 95-350 K; MIT-licensed student data set, SHE-Hall-Effect-in-Al-doped-Ge-Semiconductor):
/// intrinsic above about 305 K with a slope energy of 0.387 eV, extrinsic and metal-like below 230 K.
/// </summary>
[Collection(ProcessCollection.Name)]
public sealed class OpenDataTests
{
    [Fact]
    public async Task Fit_OfTheMeasuredGermaniumRun_FindsTheIntrinsicRegion()
    {
        var data = Path.Combine(Peers.OpenData(), "transport", "germanium-warming-360uA.csv");
        using var scratch = new Scratch();
        var csv = await scratch.RunAsync("fit", data, "--map", "conductance=Gsheet_S", "--material", "Ge", "--json");
        AssertIntrinsicRegion(csv);

        var imported = await scratch.RunAsync("import", data, "--map", "conductance=Gsheet_S", "--out", "ge.run");
        Assert.True(imported.ExitCode == 0, imported.ToString());
        var run = await scratch.RunAsync("fit", "ge.run", "--material", "Ge", "--json");
        AssertIntrinsicRegion(run);
        Assert.Equal(Energy(csv), Energy(run), 9);
    }

    [Fact]
    public async Task Fit_OfItsExtrinsicPart_IsRefused()
    {
        var data = Path.Combine(Peers.OpenData(), "transport", "germanium-warming-360uA.csv");
        using var scratch = new Scratch();
        var lines = await File.ReadAllLinesAsync(data);
        var cold = lines.Where((line, index) => index == 0
            || double.Parse(line.Split(',')[0], System.Globalization.CultureInfo.InvariantCulture) < 230);
        await File.WriteAllLinesAsync(scratch["cold.csv"], cold);

        var ended = await scratch.RunAsync("fit", "cold.csv", "--map", "conductance=Gsheet_S", "--material", "Ge", "--json");
        Assert.True(ended.ExitCode == 1, ended.ToString());
        using var json = JsonDocument.Parse(ended.Output);
        Assert.Equal(JsonValueKind.Null, json.RootElement.GetProperty("activationEnergy").ValueKind);
        Assert.Equal("refused", json.RootElement.GetProperty("intrinsic").GetProperty("verdict").GetString());
        Assert.NotEmpty(json.RootElement.GetProperty("intrinsic").GetProperty("reasons").EnumerateArray());
    }

    [Fact]
    public async Task Fit_OfATableWithSeveralConductanceColumns_ListsTheCandidates()
    {
        var data = Path.Combine(Peers.OpenData(), "transport", "germanium-warming-360uA.csv");
        using var scratch = new Scratch();
        var ended = await scratch.RunAsync("fit", data, "--material", "Ge");
        Assert.True(ended.ExitCode == 2, ended.ToString());
        Assert.Contains("Gsheet_S", ended.Errors, StringComparison.Ordinal);
        Assert.Contains("rho_ohm_cm", ended.Errors, StringComparison.Ordinal);
        Assert.Contains("--map", ended.Errors, StringComparison.Ordinal);
    }

    private static void AssertIntrinsicRegion(Ended ended)
    {
        Assert.True(ended.ExitCode == 0, ended.ToString());
        Assert.InRange(Energy(ended), 0.375, 0.400);
        using var json = JsonDocument.Parse(ended.Output);
        Assert.True(json.RootElement.GetProperty("window").GetProperty("from").GetDouble() > 280, ended.Output);
    }

    private static double Energy(Ended ended)
    {
        using var json = JsonDocument.Parse(ended.Output);
        return json.RootElement.GetProperty("activationEnergy").GetProperty("value").GetDouble();
    }
}
