using System.CommandLine;
using System.Globalization;
using System.Text.Json;
using System.Text.Json.Nodes;
using Acquire.App.CommandLine;
using Acquire.Runs.Files;

namespace Acquire.App.Records;

/// <summary><c>acquire verify</c>: chain, tables and plausibility of a run file.</summary>
internal static class VerifyCommand
{
    private static readonly JsonSerializerOptions Indented = new() { WriteIndented = true };

    public static Command Build(Terminal terminal)
    {
        var run = Arguments.File("RUN", "The run file.");
        var json = Arguments.Json();
        var command = Arguments.Command("verify", "Checks a run file: its hash chain from the first block, missing rows, order of time, the texts it was made from.", "verify runs/night.run");
        command.Add(run);
        command.Add(json);
        command.SetAction(parsed => Run(terminal, parsed.GetRequiredValue(run), parsed.GetValue(json)));
        return command;
    }

    private static int Run(Terminal terminal, string path, bool json)
    {
        var (report, problem) = RunVerifier.Verify(path);
        if (report is null)
        {
            terminal.Error.WriteLine(problem);
            return ExitCode.NotTaken;
        }

        if (json)
        {
            terminal.Out.WriteLine(new JsonObject
            {
                ["run"] = report.Path,
                ["state"] = report.State,
                ["sound"] = report.IsSound,
                ["chainHead"] = report.ChainHead,
                ["blocks"] = report.Blocks,
                ["readings"] = report.Readings,
                ["points"] = report.Points,
                ["events"] = report.Events,
                ["unchainedReadings"] = report.UnchainedReadings,
                ["findings"] = new JsonArray([.. report.Findings.Select(finding => (JsonNode)JsonValue.Create(finding))]),
            }.ToJsonString(Indented));
        }
        else
        {
            terminal.Out.WriteLine(string.Create(CultureInfo.InvariantCulture,
                $"{report.Path}: {(report.IsSound ? "sound" : "damaged")}; {report.State}; {report.Readings} readings, {report.Points} points, {report.Events} events in {report.Blocks} blocks; chain head {report.ChainHead}."));
            if (report.UnchainedReadings > 0)
            {
                terminal.Out.WriteLine(string.Create(CultureInfo.InvariantCulture, $"The last {report.UnchainedReadings} readings lie after the last whole block, as in every run that was cut or is live."));
            }

            foreach (var finding in report.Findings)
            {
                terminal.Error.WriteLine($"{report.Path}: {finding}.");
            }
        }

        return report.IsSound ? ExitCode.Done : ExitCode.AnswerIsNo;
    }
}
