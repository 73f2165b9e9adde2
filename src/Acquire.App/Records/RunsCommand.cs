using System.CommandLine;
using System.Globalization;
using System.Text.Json;
using System.Text.Json.Nodes;
using Acquire.App.CommandLine;
using Acquire.Runs.Files;
using Spectre.Console;

namespace Acquire.App.Records;

/// <summary><c>acquire runs</c>: the runs of a folder.</summary>
internal static class RunsCommand
{
    private static readonly JsonSerializerOptions Indented = new() { WriteIndented = true };

    public static Command Build(Terminal terminal)
    {
        var folder = new Argument<string>("FOLDER") { Description = "The folder; runs/ when not given.", DefaultValueFactory = _ => "runs" };
        var json = Arguments.Json();
        var command = Arguments.Command("runs", "Lists runs: sample, date, state, points, result.", "runs runs");
        command.Add(folder);
        command.Add(json);
        command.SetAction(parsed => Run(terminal, parsed.GetRequiredValue(folder), parsed.GetValue(json)));
        return command;
    }

    private static int Run(Terminal terminal, string folder, bool json)
    {
        if (!Directory.Exists(folder))
        {
            terminal.Error.WriteLine($"{folder}: there is no such folder; the current folder is {Directory.GetCurrentDirectory()}.");
            return ExitCode.NotTaken;
        }

        var entries = RunCatalogue.List(folder);
        if (json)
        {
            terminal.Out.WriteLine(new JsonArray([.. entries.Select(entry => (JsonNode)new JsonObject
            {
                ["run"] = entry.Path,
                ["sample"] = entry.Sample,
                ["startUtc"] = Stamp(entry.StartUtc),
                ["state"] = entry.State,
                ["points"] = entry.Points,
                ["result"] = Result(entry.AnalysisJson),
                ["problem"] = entry.Problem,
            })]).ToJsonString(Indented));
            return ExitCode.Done;
        }

        var table = new Table().Border(TableBorder.Simple).AddColumns("run", "sample", "start (UTC)", "state", "points", "result");
        foreach (var entry in entries)
        {
            table.AddRow([.. new[] { Path.GetFileName(entry.Path), entry.Sample, entry.Problem is null ? Stamp(entry.StartUtc) : "", entry.State, entry.Points.ToString(CultureInfo.InvariantCulture), entry.Problem ?? Result(entry.AnalysisJson) }.Select(Markup.Escape)]);
        }

        terminal.Console.Write(table);
        return ExitCode.Done;
    }

    private static string Stamp(DateTimeOffset utc) => utc.UtcDateTime.ToString("yyyy-MM-dd HH:mm:ss", CultureInfo.InvariantCulture);

    private static string Result(string? analysis)
    {
        if (analysis is null)
        {
            return "";
        }

        try
        {
            using var json = JsonDocument.Parse(analysis);
            var verdict = json.RootElement.GetProperty("intrinsic").GetProperty("verdict").GetString();
            var energy = json.RootElement.GetProperty("activationEnergy");
            return energy.ValueKind == JsonValueKind.Null
                ? verdict ?? ""
                : string.Create(CultureInfo.InvariantCulture, $"{energy.GetProperty("value").GetDouble():F4} eV, u {energy.GetProperty("standardUncertainty").GetDouble():F4} eV, {verdict}");
        }
        catch (Exception problem) when (problem is JsonException or KeyNotFoundException or InvalidOperationException)
        {
            return "unreadable analysis";
        }
    }
}
