using System.CommandLine;
using Acquire.App.Checking;
using Acquire.App.CommandLine;
using Acquire.Bench.Text;
using Acquire.Physics;

namespace Acquire.App.Fitting;

/// <summary><c>acquire fit</c>: the dark analysis of a run or a foreign table.</summary>
internal static class FitCommand
{
    public static Command Build(Terminal terminal)
    {
        var input = Arguments.File("RUN|CSV", "A run file, or a table with units in its header.");
        var settings = new Option<string?>("--settings") { Description = "A YAML file with settings of the fit.", HelpName = "FILE" };
        var material = new Option<string?>("--material") { Description = "Material whose constants are used: " + string.Join(", ", Material.All.Select(set => set.Symbol)) + ".", HelpName = "M" };
        var uncertainty = new Option<string?>("--temperature-uncertainty") { Description = "Standard uncertainty common to all temperatures.", HelpName = "'0.1 K'" };
        var map = Arguments.Map();
        var save = new Option<bool>("--save") { Description = "Store the result in the run; earlier results stay." };
        var json = Arguments.Json();
        var command = Arguments.Command("fit", "Fits the dark curve: activation energy, twice the corrected slope against the linear gap, verdict.", "fit runs/night.run --temperature-uncertainty '0.1 K'");
        command.Add(input);
        command.Add(settings);
        command.Add(material);
        command.Add(uncertainty);
        command.Add(map);
        command.Add(save);
        command.Add(json);
        command.SetAction(parsed =>
        {
            var options = Options(terminal, parsed.GetValue(settings), parsed.GetValue(material), parsed.GetValue(uncertainty));
            var (pairs, problem) = Arguments.ReadMap(parsed.GetValue(map));
            if (options is null || pairs is null)
            {
                if (problem is not null)
                {
                    terminal.Error.WriteLine(problem);
                }

                return ExitCode.NotTaken;
            }

            return Run(terminal, parsed.GetRequiredValue(input), options, pairs, (parsed.GetValue(save), parsed.GetValue(json)));
        });
        return command;
    }

    private static int Run(Terminal terminal, string path, FitOptions options, Dictionary<string, string> map, (bool Save, bool Json) how)
    {
        var (input, problems) = FitInput.Open(path, map);
        if (input is null)
        {
            foreach (var problem in problems)
            {
                terminal.Error.WriteLine(problem);
            }

            return ExitCode.NotTaken;
        }

        var fit = FitRunner.Fit(input, options);
        if (how.Json)
        {
            terminal.Out.WriteLine(FitJson.Write(fit.Result));
        }
        else
        {
            FitTable.Print(terminal, fit.Result, input.Title);
        }

        if (how.Save && FitRunner.Save(path, fit) is { } refused)
        {
            terminal.Error.WriteLine(refused);
            return ExitCode.NotTaken;
        }

        return fit.Result.Intrinsic.Verdict is "fail" or "refused" ? ExitCode.AnswerIsNo : ExitCode.Done;
    }

    private static FitOptions? Options(Terminal terminal, string? settings, string? material, string? uncertainty)
    {
        var options = new FitOptions();
        if (settings is not null)
        {
            var file = FitSettingsFile.Read(settings);
            if (file.Value is null)
            {
                CheckCommand.Print(terminal, file.Diagnostics);
                return null;
            }

            options = file.Value;
        }

        if (material is not null)
        {
            if (Material.Find(material) is not { } known)
            {
                terminal.Error.WriteLine($"--material {material} refused: no such set; allowed {string.Join(", ", Material.All.Select(set => set.Symbol))}.");
                return null;
            }

            options = options with { Material = known.Symbol };
        }

        if (uncertainty is not null)
        {
            if (QuantityText.Parse(uncertainty, Dimension.TemperatureDifference) is not { } kelvin || !(kelvin >= 0))
            {
                terminal.Error.WriteLine($"--temperature-uncertainty {uncertainty} refused: write a number of zero or more, a space and one of {QuantityText.Symbols(Dimension.TemperatureDifference)}.");
                return null;
            }

            options = options with { TemperatureUncertaintyK = kelvin };
        }

        return options;
    }
}
