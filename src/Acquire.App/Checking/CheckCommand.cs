using System.CommandLine;
using Acquire.App.CommandLine;
using Acquire.Bench.Files;
using Acquire.Bench.Text;
using Acquire.Drivers.Files;
using Acquire.Drivers.Instruments;
using Acquire.Simulator.Twins;
using Acquire.Sweep.Protocols;

namespace Acquire.App.Checking;

/// <summary><c>acquire check</c>: validates bench, twin, driver and protocol files, and a protocol against a bench.</summary>
internal static class CheckCommand
{
    public static Command Build(Terminal terminal)
    {
        var files = new Argument<string[]>("FILE") { Description = $"Files to check: {FileKinds.Known}.", Arity = ArgumentArity.OneOrMore };
        var bench = new Option<string?>("--bench") { Description = "A bench to hold every protocol against.", HelpName = "BENCH" };
        var command = Arguments.Command("check", "Validates bench, twin, driver and protocol files, and a protocol against a bench.",
            "check protocols/germanium-quick.protocol.yaml --bench simulator/germanium-quick.bench.yaml");
        command.Add(files);
        command.Add(bench);
        command.SetAction(parsed => Run(terminal, parsed.GetRequiredValue(files), parsed.GetValue(bench)));
        return command;
    }

    private static int Run(Terminal terminal, string[] files, string? benchPath)
    {
        BenchFile? bench = null;
        if (benchPath is not null)
        {
            var parsed = BenchFile.Read(benchPath);
            if (parsed.Value is null)
            {
                Print(terminal, parsed.Diagnostics);
                return ExitCode.NotTaken;
            }

            bench = parsed.Value;
        }

        var worst = ExitCode.Done;
        foreach (var file in files)
        {
            worst = Math.Max(worst, CheckOne(terminal, file, bench));
        }

        return worst;
    }

    private static int CheckOne(Terminal terminal, string file, BenchFile? bench)
    {
        var kind = FileKinds.Of(file);
        if (kind == FileKind.Unknown)
        {
            terminal.Error.WriteLine($"{file}: this is no kind of file that is known; allowed {FileKinds.Known}. Rename it, or name the right file.");
            return ExitCode.NotTaken;
        }

        var source = SourceText.Read(file);
        if (source.Value is null)
        {
            Print(terminal, source.Diagnostics);
            return ExitCode.NotTaken;
        }

        var findings = Findings(kind, source.Value, bench);
        Print(terminal, findings);
        if (findings.Count == 0)
        {
            terminal.Out.WriteLine($"{file}: sound.");
        }

        return findings.Count == 0 ? ExitCode.Done : ExitCode.AnswerIsNo;
    }

    private static IReadOnlyList<Diagnostic> Findings(FileKind kind, SourceText source, BenchFile? bench)
    {
        switch (kind)
        {
            case FileKind.Bench:
                var parsed = BenchFile.Parse(source);
                return parsed.Value is null ? parsed.Diagnostics : Beside(parsed.Value);
            case FileKind.Twin:
                return TwinFile.Parse(source).Diagnostics;
            case FileKind.Driver:
                return DriverFile.Parse(source).Diagnostics;
            default:
                var protocol = ProtocolFile.Parse(source);
                return protocol.Value is null || bench is null ? protocol.Diagnostics : ProtocolCheck.Against(protocol.Value, bench);
        }
    }

    /// <summary>What a bench file names must be there too: its drivers and its twin.</summary>
    private static IReadOnlyList<Diagnostic> Beside(BenchFile bench)
    {
        var drivers = InstrumentFactory.Drivers(bench, DriverCatalogue.For(bench.Source.File, Files.Folders.Configuration)).Diagnostics;
        return bench.TwinFile is null ? drivers : [.. drivers, .. TwinFile.Beside(bench).Diagnostics];
    }

    /// <summary>Prints diagnostics on standard error, one a line.</summary>
    public static void Print(Terminal terminal, IReadOnlyList<Diagnostic> diagnostics)
    {
        foreach (var diagnostic in diagnostics)
        {
            terminal.Error.WriteLine(diagnostic.ToString());
        }
    }
}
