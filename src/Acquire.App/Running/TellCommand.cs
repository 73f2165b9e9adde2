using System.CommandLine;
using Acquire.App.CommandLine;
using Acquire.App.Files;
using Acquire.Control;
using Acquire.Runs.Files;

namespace Acquire.App.Running;

/// <summary><c>acquire tell</c>: what a console can do, for scripts and for hands without a screen.</summary>
internal static class TellCommand
{
    private static readonly string[] Verbs = ["safe", "stop", "hold", "continue"];

    public static Command Build(Terminal terminal)
    {
        var run = Arguments.File("RUN", "The run file of a live run.");
        var verb = new Argument<string>("VERB") { Description = string.Join(", ", Verbs) + "." };
        verb.AcceptOnlyFromAmong(Verbs);
        var operatorName = Arguments.Operator();
        var reason = new Option<string?>("--reason") { Description = "Why; recorded.", HelpName = "TEXT" };
        var command = Arguments.Command("tell", "Tells a live run to make the bench safe, to stop, to hold or to continue.", "tell runs/night.run hold --operator 'A. Person' --reason 'looking at the contacts'");
        command.Add(run);
        command.Add(verb);
        command.Add(operatorName);
        command.Add(reason);
        command.SetAction(async (parsed, cancellation) =>
            await RunAsync(terminal, parsed.GetRequiredValue(run), parsed.GetRequiredValue(verb), (parsed.GetValue(operatorName), parsed.GetValue(reason)), cancellation));
        return command;
    }

    private static async Task<int> RunAsync(Terminal terminal, string path, string verb, (string? Operator, string? Reason) who, CancellationToken cancellation)
    {
        if (string.IsNullOrWhiteSpace(who.Operator))
        {
            await terminal.Error.WriteLineAsync($"tell {verb} refused: who are you? Add --operator NAME; it is recorded with the command.");
            return ExitCode.NotTaken;
        }

        var opening = RunReader.Open(path);
        if (opening.Reader is null)
        {
            await terminal.Error.WriteLineAsync(opening.Problem);
            return ExitCode.NotTaken;
        }

        string runId;
        string state;
        using (opening.Reader)
        {
            (runId, state) = (opening.Reader.Header.RunId, opening.Reader.State);
        }

        var (client, problem) = await ControlClient.ConnectAsync(ControlSockets.PathFor(Folders.Runtime, runId), cancellation);
        if (client is null)
        {
            await terminal.Error.WriteLineAsync($"{path}: the run is not running ({state}). {problem}");
            return ExitCode.NotTaken;
        }

        await using (client)
        {
            var outcome = await client.SendAsync(verb, who.Operator, who.Reason, cancellation);
            await (outcome.Done ? terminal.Out : terminal.Error).WriteLineAsync(outcome.Text);
            return outcome.Done ? ExitCode.Done : ExitCode.Failed;
        }
    }
}
