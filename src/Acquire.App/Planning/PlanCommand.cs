using System.CommandLine;
using System.Globalization;
using Acquire.App.Checking;
using Acquire.App.CommandLine;
using Acquire.App.Running;
using Acquire.Runs.Plans;
using Acquire.Runs.Records;
using Acquire.Sweep.Measuring;
using Acquire.Sweep.Planning;
using Spectre.Console;

namespace Acquire.App.Planning;

/// <summary><c>acquire plan</c>: the sweep as it will run.</summary>
internal static class PlanCommand
{
    private static readonly double[] Decades = [1e-9, 1e-8, 1e-7, 1e-6, 1e-5, 1e-4, 1e-3, 1e-2];

    public static Command Build(Terminal terminal)
    {
        var protocol = Arguments.File("PROTOCOL", "The protocol file.");
        var bench = Arguments.Bench(required: true);
        var json = Arguments.Json();
        var command = Arguments.Command("plan", "Shows the sweep as it will run: points, expected signal, ranges, settle times, duration.",
            "plan protocols/germanium-night.protocol.yaml --bench simulator/germanium-cryostat.bench.yaml");
        command.Add(protocol);
        command.Add(bench);
        command.Add(json);
        command.SetAction(parsed => Run(terminal, parsed.GetRequiredValue(protocol), parsed.GetRequiredValue(bench), parsed.GetValue(json)));
        return command;
    }

    private static int Run(Terminal terminal, string protocolPath, string benchPath, bool json)
    {
        var prepared = PreparedRun.Read(protocolPath, benchPath);
        if (prepared.Value is null)
        {
            CheckCommand.Print(terminal, prepared.Diagnostics);
            return ExitCode.NotTaken;
        }

        var plan = prepared.Value.Plan;
        if (json)
        {
            terminal.Out.WriteLine(PlanJson.Write(plan));
            return ExitCode.Done;
        }

        terminal.Console.Write(Table(plan));
        terminal.Out.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{plan.Title}: {plan.Points} points, {DurationText.Of(plan.DurationS)} of bench time."));
        foreach (var warning in plan.Warnings)
        {
            terminal.Out.WriteLine("Warning: " + warning + ".");
        }

        return ExitCode.Done;
    }

    private static Table Table(Plan plan)
    {
        var table = new Table().Border(TableBorder.Simple);
        foreach (var column in new[] { "leg", "T / K", "ramp / K/min", "band / K", "drift / K/min", "measure", "bias / V", "expected I / A", "range / A", "elapsed" })
        {
            table.AddColumn(new TableColumn(column).RightAligned());
        }

        var elapsed = 0.0;
        GoToStep? goTo = null;
        foreach (var step in plan.Steps)
        {
            elapsed += step.EstimateS;
            goTo = step as GoToStep ?? goTo;
            if (step is MeasureStep measure && goTo is not null)
            {
                var expectedA = measure.ExpectedConductanceS * measure.BiasV;
                table.AddRow(
                    Text(measure.Leg), Number(measure.TemperatureK, "F2"), Number(goTo.RampKPerS * 60, "G4"), Number(goTo.Gate.BandK, "F2"), Number(goTo.Gate.RateKPerS * 60, "G2"),
                    measure.Light switch { LightState.Lit => "lit", LightState.DarkAfter => "dark after", _ => "dark" }, Number(measure.BiasV, "G4"),
                    double.IsFinite(expectedA) ? Number(expectedA, "G3") : "-",
                    double.IsFinite(expectedA) ? Number(Decades[RangeChoice.For(expectedA, Decades)], "G3") : "found there", DurationText.Of(elapsed));
            }
        }

        return table;
    }

    private static string Text(int number) => number.ToString(CultureInfo.InvariantCulture);

    private static string Number(double value, string format) => value.ToString(format, CultureInfo.InvariantCulture);
}
