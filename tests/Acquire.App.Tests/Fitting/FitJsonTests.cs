using System.Text.Json;
using Acquire.Analysis.Dark;
using Acquire.App.Fitting;
using Acquire.Physics;
using Xunit;

namespace Acquire.App.Tests.Fitting;

public sealed class FitJsonTests
{
    /// <summary>The keys that scripts rely on.</summary>
    [Fact]
    public void Json_OfAFit_HasEveryKeyOfTheContract()
    {
        var points = Enumerable.Range(0, 12).Select(i =>
        {
            var temperatureK = 300 + (i * 5.0);
            return new ConductancePoint(i + 1, temperatureK, 0.01, Material.Ge.IntrinsicConductivitySPerM(temperatureK) / 8000, 1e-9, 1, null);
        }).ToList();
        var fit = DarkFit.Fit(points, new FitSettings { Material = Material.Ge, GeometryPerM = 8000, CommonTemperatureUncertaintyK = 0.1 });
        using var json = JsonDocument.Parse(FitJson.Write(fit));
        foreach (var path in new[]
        {
            "points.total", "points.used", "points.excluded", "window.from", "window.to", "window.unit", "window.rule", "window.rejected",
            "activationEnergy.value", "activationEnergy.standardUncertainty", "activationEnergy.unit", "activationEnergy.interval95",
            "prefactor.value", "prefactor.unit", "prefactor.logStandardUncertainty", "prefactor.correlation",
            "corrected.twice", "corrected.standardUncertainty", "corrected.exponents.density", "corrected.exponents.mobility",
            "corrected.expectedLinearGap.value", "corrected.expectedLinearGap.source", "budget", "goodness.reducedChiSquare", "goodness.runsTestP",
            "goodness.quadraticTermP", "alternatives", "intrinsic.verdict", "intrinsic.reasons", "intrinsic.netDopingBound.nType",
            "intrinsic.netDopingBound.pType", "intrinsic.constants", "warnings",
        })
        {
            var element = json.RootElement;
            Assert.True(path.Split('.').All(key => element.TryGetProperty(key, out element)), path);
        }

        Assert.Equal(12, json.RootElement.GetProperty("points").GetProperty("used").GetInt32());
        Assert.Equal(0.5 * Material.Ge.Gap.LinearGapEV(327), json.RootElement.GetProperty("corrected").GetProperty("twice").GetDouble() / 2, 2e-3);
    }

    [Fact]
    public void Json_OfARefusal_HasNullsWhereNumbersWouldBe()
    {
        using var json = JsonDocument.Parse(FitJson.Write(DarkFit.Fit([], new FitSettings())));
        foreach (var key in new[] { "window", "activationEnergy", "prefactor", "corrected", "goodness" })
        {
            Assert.Equal(JsonValueKind.Null, json.RootElement.GetProperty(key).ValueKind);
        }

        Assert.Equal("refused", json.RootElement.GetProperty("intrinsic").GetProperty("verdict").GetString());
    }
}
