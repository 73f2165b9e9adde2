using System.CommandLine;
using System.Globalization;
using Acquire.App.CommandLine;
using Acquire.Runs;
using Acquire.Runs.Records;
using Acquire.Runs.Tables;

namespace Acquire.App.Records;

/// <summary><c>acquire import</c>: brings a foreign log into a run file.</summary>
internal static class ImportCommand
{
    public static Command Build(Terminal terminal)
    {
        var table = Arguments.File("CSV", "The table: comma or semicolon, one header line with names and units.");
        var map = Arguments.Map();
        var output = new Option<string>("--out") { Description = "The run file to make.", HelpName = "RUN", Required = true };
        var sample = new Option<string?>("--sample") { Description = "Sample identifier; otherwise the table's name.", HelpName = "ID" };
        var command = Arguments.Command("import", "Brings a foreign log into a run file and keeps its text whole.", "import old-log.csv --out runs/old-log.run");
        command.Add(table);
        command.Add(map);
        command.Add(output);
        command.Add(sample);
        command.SetAction(async (parsed, _) =>
        {
            var (pairs, problem) = Arguments.ReadMap(parsed.GetValue(map));
            if (pairs is null)
            {
                await terminal.Error.WriteLineAsync(problem);
                return ExitCode.NotTaken;
            }

            return await RunAsync(terminal, parsed.GetRequiredValue(table), pairs, parsed.GetRequiredValue(output), parsed.GetValue(sample));
        });
        return command;
    }

    private static async Task<int> RunAsync(Terminal terminal, string path, Dictionary<string, string> map, string output, string? sample)
    {
        var reading = TableFile.Read(path, map);
        if (reading.Table is not { } table)
        {
            foreach (var problem in reading.Problems)
            {
                await terminal.Error.WriteLineAsync(problem);
            }

            return ExitCode.NotTaken;
        }

        var clock = TimeProvider.System;
        var text = new RunText("table", Path.GetFileName(path), await File.ReadAllTextAsync(path));
        var header = new RunHeader
        {
            RunId = "import-" + text.Sha256[..16],
            Kind = "import",
            Title = "imported from " + Path.GetFileName(path),
            Operator = Environment.UserName,
            SampleId = sample ?? Path.GetFileNameWithoutExtension(path),
            Material = "",
            StartUtc = clock.GetUtcNow(),
            Software = Software.Name,
            Simulated = false,
            Texts = [text],
        };
        try
        {
            await RunImport.WriteAsync(table, output, header, clock);
        }
        catch (RunFileException problem)
        {
            await terminal.Error.WriteLineAsync(problem.Message);
            return ExitCode.NotTaken;
        }

        await terminal.Out.WriteLineAsync(string.Create(CultureInfo.InvariantCulture, $"{output}: {table.Rows.Count} points. {string.Join("; ", table.Understood)}."));
        return ExitCode.Done;
    }
}
