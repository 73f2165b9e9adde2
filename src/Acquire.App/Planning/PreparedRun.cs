using Acquire.App.Files;
using Acquire.Bench.Files;
using Acquire.Bench.Text;
using Acquire.Drivers.Files;
using Acquire.Drivers.Instruments;
using Acquire.Runs.Plans;
using Acquire.Runs.Records;
using Acquire.Simulator.Twins;
using Acquire.Sweep.Planning;
using Acquire.Sweep.Protocols;

namespace Acquire.App.Planning;

/// <summary>A protocol and a bench that have passed every check, with the plan and the texts a run keeps.</summary>
internal sealed record PreparedRun(ProtocolFile Protocol, BenchFile Bench, Plan Plan, DriverCatalogue Drivers, IReadOnlyList<RunText> Texts)
{
    /// <summary>Reads and checks everything; nothing is opened.</summary>
    public static Parsed<PreparedRun> Read(string protocolPath, string benchPath)
    {
        var bench = BenchFile.Read(benchPath);
        var protocol = ProtocolFile.Read(protocolPath);
        if (bench.Value is null || protocol.Value is null)
        {
            return Parsed.Bad<PreparedRun>([.. bench.Diagnostics, .. protocol.Diagnostics]);
        }

        var catalogue = DriverCatalogue.For(benchPath, Folders.Configuration);
        var drivers = InstrumentFactory.Drivers(bench.Value, catalogue);
        var twin = bench.Value.TwinFile is null ? null : TwinFile.Beside(bench.Value);
        List<Diagnostic> findings = [.. ProtocolCheck.Against(protocol.Value, bench.Value), .. drivers.Diagnostics, .. twin?.Diagnostics ?? []];
        if (findings.Count > 0 || drivers.Value is null)
        {
            return Parsed.Bad<PreparedRun>(findings);
        }

        List<RunText> texts =
        [
            new("protocol", Path.GetFileName(protocolPath), protocol.Value.Source.Text),
            new("bench", Path.GetFileName(benchPath), bench.Value.Source.Text),
            .. drivers.Value.Values.DistinctBy(driver => driver.Name).OrderBy(driver => driver.Name, StringComparer.Ordinal).Select(driver => new RunText("driver", driver.Name, driver.Source.Text)),
        ];
        if (twin?.Value is { } file)
        {
            texts.Add(new("twin", Path.GetFileName(file.Source.File), file.Source.Text));
        }

        return Parsed.Good(new PreparedRun(protocol.Value, bench.Value, Planner.Plan(protocol.Value, bench.Value), catalogue, texts));
    }
}
