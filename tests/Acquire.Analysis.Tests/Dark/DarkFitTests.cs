using System.Globalization;
using Acquire.Analysis.Dark;
using Acquire.Physics;
using CsCheck;
using Xunit;

namespace Acquire.Analysis.Tests.Dark;

public sealed class DarkFitTests
{
    /// <summary>
    /// Straight lines through exact model data: twice the slope with T^1.5 and mobility divided out is the tangent intercept Eg* at the middle
    /// (worked independently from the Varshni and mobility parameters of the sets).
    /// </summary>
    [Theory]
    [InlineData("Si", 300, 350, 1.204)]
    [InlineData("Si", 450, 600, 1.230)]
    [InlineData("Si", 700, 1100, 1.270)]
    [InlineData("Ge", 250, 350, 0.778)]
    [InlineData("Ge", 400, 600, 0.794)]
    [InlineData("GaAs", 500, 700, 1.580)]
    public void Corrected_OnExactIntrinsicData_IsTheTangentIntercept(string symbol, double fromK, double toK, double twiceEV)
    {
        var material = Material.Find(symbol)!;
        var fit = DarkFit.Fit(Intrinsic(material, 0, fromK, toK, 25), new FitSettings { Material = material });
        Assert.Equal(twiceEV, fit.Corrected!.TwiceEV, 2.5e-3);
        Assert.Equal(twiceEV, fit.Corrected.ExpectedLinearGapEV, 2.5e-3);
        Assert.Equal(25, fit.Used.Count);
    }

    [Fact]
    public void Fit_OfAnExactArrheniusLine_RecoversWhatMadeIt() =>
        Gen.Select(Gen.Double[0.3, 1.2], Gen.Double[-10, 10], Gen.Double[250, 500]).Sample((energyEV, logPrefactor, fromK) =>
        {
            var points = Enumerable.Range(0, 15).Select(i =>
            {
                var temperatureK = fromK + (i * 8);
                return new ConductancePoint(i + 1, temperatureK, 0, Math.Exp(logPrefactor - (energyEV / SI.ThermalEV(temperatureK))), 0, 1, null);
            }).ToList();
            var fit = DarkFit.Fit(points, new FitSettings());
            Assert.Equal(energyEV, fit.ActivationEnergy!.ValueEV, 1e-8);
            Assert.Equal(logPrefactor, Math.Log(fit.Prefactor!.Value), 1e-6);
        }, iter: 300);

    /// <summary>A warming and a cooling leg of intrinsic germanium with 1e12 net donors per cm3, 0.2 % scatter: what doping does at the cold end must not enter.</summary>
    [Fact]
    public void Fit_OfSlightlyDopedGermanium_FindsTheIntrinsicRegionOnly()
    {
        var points = Intrinsic(Material.Ge, 1e18, 230, 340, 30, 0.002);
        var fit = DarkFit.Fit(points, new FitSettings { Material = Material.Ge, CommonTemperatureUncertaintyK = 0.1 });
        Assert.True(fit.Window!.FromK > 235, $"window from {fit.Window.FromK}");
        Assert.True(Math.Abs(fit.Corrected!.TwiceEV - fit.Corrected.ExpectedLinearGapEV) < 3 * fit.Corrected.StandardUncertaintyEV,
            $"{fit.Corrected} from {fit.Window.FromK}");
        Assert.NotEqual("fail", fit.Intrinsic.Verdict);
        Assert.Contains(fit.Budget, line => line.Name.StartsWith("thermometer offset", StringComparison.Ordinal));
    }

    [Fact]
    public void CommonUncertainty_IsNotReducedByTheNumberOfPoints()
    {
        double Offset(int count) => DarkFit.Fit(Intrinsic(Material.Si, 0, 500, 700, count), new FitSettings { Material = Material.Si, CommonTemperatureUncertaintyK = 1.5 })
            .Budget.Single(line => line.Name.StartsWith("thermometer offset", StringComparison.Ordinal)).ContributionEV;
        Assert.Equal(Offset(10), Offset(100), Offset(10) * 0.02);
    }

    public static TheoryData<string, ConductancePoint[]> Unanswerable => new()
    {
        { "usable points", [.. Intrinsic(Material.Ge, 0, 300, 340, 5)] },
        { "one temperature", [.. Enumerable.Range(0, 10).Select(i => new ConductancePoint(i, 300, 0, 1e-6 * (1 + (1e-3 * i)), 0, 1, null))] },
        { "not activated", [.. Enumerable.Range(0, 20).Select(i => new ConductancePoint(i, 100 + (i * 10), 0, 1e-3 * Math.Pow(100 + (i * 10), -1.6), 0, 1, null))] },
        { "changes sign", [.. Intrinsic(Material.Ge, 0, 300, 340, 12).Select((point, i) => i % 2 == 0 ? point with { ConductanceS = -point.ConductanceS } : point)] },
        { "usable points", [.. Intrinsic(Material.Ge, 0, 300, 340, 12).Select((point, i) => i % 2 == 0 ? point with { ExcludedReason = "unsettled" } : point with { TemperatureK = i < 3 ? double.NaN : point.TemperatureK })] },
    };

    [Theory]
    [MemberData(nameof(Unanswerable))]
    public void Fit_OfWhatCannotAnswer_IsRefusedWithoutANumber(string reason, ConductancePoint[] points)
    {
        var fit = DarkFit.Fit(points, new FitSettings { Material = Material.Ge });
        Assert.Null(fit.ActivationEnergy);
        Assert.Null(fit.Corrected);
        Assert.Equal("refused", fit.Intrinsic.Verdict);
        Assert.Contains(fit.Intrinsic.Reasons, text => text.Contains(reason, StringComparison.Ordinal));
    }

    [Fact]
    public void Verdict_OfAMidGapDefectLevel_IsNotAPass()
    {
        // A single slope of 0.30 eV in germanium: activated, straight, and not the gap's.
        var points = Enumerable.Range(0, 20).Select(i => new ConductancePoint(i + 1, 260 + (i * 4), 0.002, Math.Exp(-0.30 / SI.ThermalEV(260 + (i * 4))), 0, 1, null)).ToList();
        Assert.Equal("fail", DarkFit.Fit(points, new FitSettings { Material = Material.Ge, CommonTemperatureUncertaintyK = 0.1 }).Intrinsic.Verdict);
    }

    [Fact]
    public void Verdict_WithoutGeometryOrWithOneLeg_IsAtMostInconclusive()
    {
        var points = Intrinsic(Material.Ge, 0, 290, 350, 20, 0.001).Select(point => point with { ConductanceS = point.ConductanceS / 8000, ConductanceUncertaintyS = point.ConductanceUncertaintyS / 8000 }).ToList();
        var settings = new FitSettings { Material = Material.Ge, CommonTemperatureUncertaintyK = 0.1, GeometryPerM = 8000 };
        Assert.Equal("pass", DarkFit.Fit(points, settings).Intrinsic.Verdict);
        Assert.Equal("inconclusive", DarkFit.Fit(points, settings with { GeometryPerM = double.NaN }).Intrinsic.Verdict);
        Assert.Equal("inconclusive", DarkFit.Fit([.. points.Select(point => point with { Leg = 1 })], settings).Intrinsic.Verdict);
    }

    [Fact]
    public void Exclusions_KeepTheirReasons()
    {
        var points = Intrinsic(Material.Ge, 0, 300, 340, 12).ToList();
        points[3] = points[3] with { ExcludedReason = "temperature not steady" };
        var fit = DarkFit.Fit(points, new FitSettings { Material = Material.Ge });
        Assert.Equal([new ExcludedPoint(4, "temperature not steady")], fit.Excluded);
        Assert.DoesNotContain(4, fit.Used);
    }

    /// <summary>
    /// A really measured germanium slab (van der Pauw, warming 95-350 K; MIT-licensed student data set, SHE-Hall-Effect-in-Al-doped-Ge-Semiconductor):
    /// intrinsic above about 305 K with a slope energy of 0.387 eV; below 230 K the conductance falls on warming.
    /// </summary>
    [Fact]
    public void Fit_OfTheMeasuredGermaniumRun_FindsItsIntrinsicRegionAndRefusesTheRest()
    {
        var points = Measured();
        var settings = new FitSettings { Material = Material.Ge };
        var fit = DarkFit.Fit(points, settings);
        Assert.InRange(fit.ActivationEnergy!.ValueEV, 0.375, 0.400);
        Assert.True(fit.Window!.FromK > 280, $"window from {fit.Window.FromK}");
        Assert.Equal("refused", DarkFit.Fit([.. points.Where(point => point.TemperatureK < 230)], settings).Intrinsic.Verdict);
    }

    private static List<ConductancePoint> Measured()
    {
        var folder = Environment.GetEnvironmentVariable("ACQUIRE_OPEN_DATA");
        Assert.SkipWhen(string.IsNullOrEmpty(folder), "ACQUIRE_OPEN_DATA names no folder on this machine.");
        return [.. File.ReadLines(Path.Combine(folder!, "transport", "germanium-warming-360uA.csv")).Skip(1).Select((line, i) =>
        {
            var cells = line.Split(',').Select(cell => double.Parse(cell, CultureInfo.InvariantCulture)).ToArray();
            return new ConductancePoint(i + 1, cells[0], 0, cells[3], 0, 1, null);
        })];
    }

    /// <summary>Conductivity of a material with net donors [m-3], equal steps in 1/T, alternating legs, with a repeatable scatter.</summary>
    private static List<ConductancePoint> Intrinsic(Material material, double netPerM3, double fromK, double toK, int count, double scatter = 0)
    {
        var state = 12345UL;
        double Noise()
        {
            state = (state * 6364136223846793005UL) + 1442695040888963407UL;
            return ((state >> 11) / (double)(1UL << 53) * 2) - 1;
        }

        return [.. Enumerable.Range(0, count).Select(i =>
        {
            var temperatureK = 1 / ((1 / fromK) + (i * ((1 / toK) - (1 / fromK)) / (count - 1)));
            var (electrons, holes) = Neutrality.FullyIonised(material.IntrinsicDensityPerM3(temperatureK), netPerM3);
            var conductance = material.ConductivitySPerM(temperatureK, electrons, holes) * (1 + (scatter * 1.7 * Noise()));
            return new ConductancePoint(i + 1, temperatureK, 0, conductance, conductance * scatter, 1 + (i % 2), null);
        })];
    }
}
