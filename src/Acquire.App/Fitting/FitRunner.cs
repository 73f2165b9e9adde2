using System.Text.Json;
using Acquire.Analysis.Dark;
using Acquire.App.CommandLine;
using Acquire.Physics;
using Acquire.Runs.Writing;

namespace Acquire.App.Fitting;

/// <summary>What a user may say about a fit; anything not said comes from the run.</summary>
internal sealed record FitOptions
{
    public string? Material { get; init; }

    public double? TemperatureUncertaintyK { get; init; }

    public double? DensityExponent { get; init; }

    public double? MobilityExponent { get; init; }
}

/// <summary>A result with the settings that led to it.</summary>
internal sealed record FitWithSettings(FitResult Result, string SettingsJson);

/// <summary>Fits, and stores fits.</summary>
internal static class FitRunner
{
    /// <summary>Runs the dark fit.</summary>
    public static FitWithSettings Fit(FitInput input, FitOptions options)
    {
        var symbol = options.Material ?? (input.Material.Length > 0 ? input.Material : null);
        var settings = new FitSettings
        {
            Material = symbol is null ? null : Material.Find(symbol),
            CommonTemperatureUncertaintyK = options.TemperatureUncertaintyK ?? input.TemperatureUncertaintyK,
            DensityExponent = options.DensityExponent ?? double.NaN,
            MobilityExponent = options.MobilityExponent ?? double.NaN,
            GeometryPerM = input.GeometryPerM,
        };
        var json = JsonSerializer.Serialize(new
        {
            material = symbol,
            constants = settings.Material?.Set,
            temperatureUncertaintyK = settings.CommonTemperatureUncertaintyK,
            densityExponent = options.DensityExponent,
            mobilityExponent = options.MobilityExponent,
        });
        return new(DarkFit.Fit(input.Points, settings), json);
    }

    /// <summary>Appends the result to its run; a problem in words, or null.</summary>
    public static string? Save(string runPath, FitWithSettings fit) =>
        AnalysisStore.Append(runPath, "dark", fit.SettingsJson, FitJson.Write(fit.Result), (Software.Name, TimeProvider.System));
}
