using Acquire.App.CommandLine;
using Acquire.App.Fitting;
using Acquire.App.Records;
using Acquire.Runs.Files;
using Acquire.Sweep.Engine;

namespace Acquire.App.Running;

/// <summary>What a person reads when a run has ended: how, the result, where everything is.</summary>
internal static class RunEnding
{
    /// <summary>Prints the ending and the fit, saves it in the run, writes the report; the result is the program's exit code.</summary>
    public static int Tell(Terminal terminal, string path, RunOutcome outcome, bool withReport)
    {
        terminal.Out.WriteLine($"The run ended: {outcome.State}. {outcome.Reason}");
        var opening = RunReader.Open(path);
        if (opening.Reader is not null)
        {
            using (opening.Reader)
            {
                Conclude(terminal, opening.Reader, withReport);
            }
        }
        else if (File.Exists(path))
        {
            terminal.Error.WriteLine(opening.Problem);
        }

        return outcome.State switch
        {
            "completed" => ExitCode.Done,
            "stopped" or "tripped" => ExitCode.EndedEarly,
            _ => ExitCode.Failed,
        };
    }

    private static void Conclude(Terminal terminal, RunReader run, bool withReport)
    {
        var input = FitInput.Of(run);
        var fit = FitRunner.Fit(input, new FitOptions());
        FitTable.Print(terminal, fit.Result, input.Title);
        run.Dispose(); // an open reader would keep the analysis from being saved
        if (FitRunner.Save(run.Path, fit) is { } problem)
        {
            terminal.Error.WriteLine(problem);
        }

        terminal.Out.WriteLine($"Run:    {run.Path}");
        if (withReport)
        {
            terminal.Out.WriteLine($"Report: {ReportCommand.Write(run.Path, fit.Result, RunNaming.ReportFolder(run.Path))}");
        }
    }
}
