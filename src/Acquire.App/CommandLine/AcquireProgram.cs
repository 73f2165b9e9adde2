using System.CommandLine;
using Acquire.App.Checking;
using Acquire.App.Fitting;
using Acquire.App.Planning;
using Acquire.App.Records;
using Acquire.App.Running;

namespace Acquire.App.CommandLine;

/// <summary>The command line: every command in one readable place.</summary>
internal static class AcquireProgram
{
    /// <summary>Parses and runs one command; never throws for anything a user typed or a file holds.</summary>
    public static async Task<int> RunAsync(string[] arguments, Terminal terminal)
    {
        var root = Build(terminal);
        var parsed = root.Parse(arguments);
        if (parsed.Errors.Count > 0)
        {
            foreach (var error in parsed.Errors)
            {
                await terminal.Error.WriteLineAsync(error.Message);
            }

            await terminal.Error.WriteLineAsync($"See: acquire {parsed.CommandResult.Command.Name} --help".Replace("acquire acquire", "acquire", StringComparison.Ordinal));
            return ExitCode.NotTaken;
        }

        var configuration = new InvocationConfiguration
        {
            EnableDefaultExceptionHandler = false,
            ProcessTerminationTimeout = null, // signals are ours: they end a run safely
            Output = terminal.Out,
            Error = terminal.Error,
        };
        try
        {
            return await parsed.InvokeAsync(configuration);
        }
        catch (Exception problem) when (problem is IOException or UnauthorizedAccessException)
        {
            await terminal.Error.WriteLineAsync($"The system refused: {problem.Message}");
            return ExitCode.Failed;
        }
    }

    /// <summary>The command tree.</summary>
    public static RootCommand Build(Terminal terminal)
    {
        var root = new RootCommand(
            "Runs a semiconductor bench through a temperature sweep, in the dark and under light, keeps it safe, loses no reading, "
            + "and turns the record into an activation energy that can be signed.");
        root.Add(CheckCommand.Build(terminal));
        root.Add(PlanCommand.Build(terminal));
        root.Add(RehearseCommand.Build(terminal));
        root.Add(RunCommand.Build(terminal));
        root.Add(RunCommand.BuildEngine(terminal));
        root.Add(TellCommand.Build(terminal));
        root.Add(SimulateCommand.Build(terminal));
        root.Add(RunsCommand.Build(terminal));
        root.Add(FitCommand.Build(terminal));
        root.Add(ReportCommand.Build(terminal));
        root.Add(ImportCommand.Build(terminal));
        root.Add(VerifyCommand.Build(terminal));
        return root;
    }
}
