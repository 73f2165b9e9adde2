using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using Acquire.Analysis.Dark;

namespace Acquire.App.Fitting;

/// <summary>The JSON of a fit; its keys are fixed, more may be added.</summary>
internal static class FitJson
{
    private static readonly JsonSerializerOptions Indented = new() { WriteIndented = true, Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>Writes one document.</summary>
    public static string Write(FitResult fit) => new JsonObject
    {
        ["points"] = new JsonObject
        {
            ["total"] = fit.Total,
            ["used"] = fit.Used.Count,
            ["excluded"] = List(fit.Excluded, point => new JsonObject { ["index"] = point.Index, ["reason"] = point.Reason }),
        },
        ["window"] = fit.Window is not { } window ? null : new JsonObject
        {
            ["from"] = window.FromK,
            ["to"] = window.ToK,
            ["unit"] = "K",
            ["rule"] = window.Rule,
            ["rejected"] = window.Rejected,
        },
        ["activationEnergy"] = fit.ActivationEnergy is not { } energy ? null : new JsonObject
        {
            ["value"] = Number(energy.ValueEV),
            ["standardUncertainty"] = Number(energy.StandardUncertaintyEV),
            ["unit"] = "eV",
            ["interval95"] = new JsonArray(Number(energy.Low95EV), Number(energy.High95EV)),
        },
        ["prefactor"] = fit.Prefactor is not { } prefactor ? null : new JsonObject
        {
            ["value"] = Number(prefactor.Value),
            ["unit"] = prefactor.Unit,
            ["logStandardUncertainty"] = Number(prefactor.LogStandardUncertainty),
            ["correlation"] = Number(prefactor.Correlation),
        },
        ["corrected"] = fit.Corrected is not { } corrected ? null : new JsonObject
        {
            ["twice"] = Number(corrected.TwiceEV),
            ["standardUncertainty"] = Number(corrected.StandardUncertaintyEV),
            ["exponents"] = new JsonObject { ["density"] = Number(corrected.DensityExponent), ["mobility"] = Number(corrected.MobilityExponent) },
            ["expectedLinearGap"] = new JsonObject { ["value"] = Number(corrected.ExpectedLinearGapEV), ["source"] = corrected.ExpectedSource },
        },
        ["budget"] = List(fit.Budget, line => new JsonObject { ["name"] = line.Name, ["type"] = line.Type, ["contribution"] = Number(line.ContributionEV), ["unit"] = "eV" }),
        ["goodness"] = fit.Goodness is not { } goodness ? null : new JsonObject
        {
            ["reducedChiSquare"] = Number(goodness.ReducedChiSquare),
            ["runsTestP"] = Number(goodness.RunsTestP),
            ["quadraticTermP"] = Number(goodness.QuadraticTermP),
        },
        ["alternatives"] = List(fit.Alternatives, law => new JsonObject { ["law"] = law.Law, ["deltaBic"] = Number(law.DeltaBic), ["comparable"] = law.Comparable }),
        ["intrinsic"] = new JsonObject
        {
            ["verdict"] = fit.Intrinsic.Verdict,
            ["reasons"] = List(fit.Intrinsic.Reasons, reason => JsonValue.Create(reason)),
            ["netDopingBound"] = double.IsNaN(fit.Intrinsic.NTypeBoundPerCm3) && double.IsNaN(fit.Intrinsic.PTypeBoundPerCm3) ? null : new JsonObject
            {
                ["nType"] = Number(fit.Intrinsic.NTypeBoundPerCm3),
                ["pType"] = Number(fit.Intrinsic.PTypeBoundPerCm3),
                ["unit"] = "cm-3",
            },
            ["constants"] = fit.Intrinsic.Constants,
        },
        ["warnings"] = List(fit.Warnings, warning => JsonValue.Create(warning)),
    }.ToJsonString(Indented);

    private static JsonArray List<T>(IReadOnlyList<T> items, Func<T, JsonNode> write) => new([.. items.Select(item => (JsonNode?)write(item))]);

    /// <summary>JSON has no NaN: what is not known is null.</summary>
    private static JsonValue? Number(double value) => double.IsFinite(value) ? JsonValue.Create(value) : null;
}
