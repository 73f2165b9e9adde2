using System.CommandLine;
using Acquire.Analysis.Dark;
using Acquire.App.CommandLine;
using Acquire.App.Fitting;
using Acquire.App.Running;
using Acquire.Reports;
using Acquire.Runs.Files;

namespace Acquire.App.Records;

/// <summary><c>acquire report</c>: the report of a run.</summary>
internal static class ReportCommand
{
    public static Command Build(Terminal terminal)
    {
        var run = Arguments.File("RUN", "The run file.");
        var output = new Option<string?>("--out") { Description = "Folder for the report; otherwise one beside the run.", HelpName = "FOLDER" };
        var command = Arguments.Command("report", "Writes a self-contained HTML report with its plots inline as SVG and beside it as PNG.", "report runs/night.run");
        command.Add(run);
        command.Add(output);
        command.SetAction(parsed => Run(terminal, parsed.GetRequiredValue(run), parsed.GetValue(output)));
        return command;
    }

    /// <summary>Writes the report of a run with a fit; the path of its page.</summary>
    public static string Write(string runPath, FitResult? fit, string folder)
    {
        var (verified, _) = RunVerifier.Verify(runPath);
        var seal = new VerifySummary(verified?.ChainHead ?? "", verified?.IsSound ?? false, verified?.Findings ?? []);
        using var reader = RunReader.Open(runPath).Reader ?? throw new IOException($"{runPath}: the run file went away.");
        return ReportWriter.Write(reader, fit, seal, folder);
    }

    private static int Run(Terminal terminal, string path, string? folder)
    {
        var opening = RunReader.Open(path);
        if (opening.Reader is null)
        {
            terminal.Error.WriteLine(opening.Problem);
            return ExitCode.NotTaken;
        }

        FitInput input;
        using (opening.Reader)
        {
            input = FitInput.Of(opening.Reader);
        }

        var fit = FitRunner.Fit(input, new FitOptions());
        terminal.Out.WriteLine($"Report: {Write(path, fit.Result, folder ?? RunNaming.ReportFolder(path))}");
        return ExitCode.Done;
    }
}
