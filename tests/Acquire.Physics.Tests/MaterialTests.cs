using Xunit;

namespace Acquire.Physics.Tests;

public sealed class MaterialTests
{
    /// <summary>Computed from the formulas and the parameters of the sets (Thurmond gap; Nc, Nv of Sze and Green), independently of this code.</summary>
    [Theory]
    [InlineData("Si", 300, 1.067e10, 3.062e5)]
    [InlineData("Si", 400, 5.634e12, 1.145e3)]
    [InlineData("Si", 600, 3.892e15, 4.314)]
    [InlineData("Si", 1000, 1.093e18, 5.120e-2)]
    [InlineData("Ge", 250, 7.994e11, 954.0)]
    [InlineData("Ge", 300, 2.115e13, 50.87)]
    [InlineData("GaAs", 300, 2.317e6, 3.027e8)]
    [InlineData("GaAs", 600, 2.521e13, 57.00)]
    public void Intrinsic_AtATemperature_EqualsTheWorkedValues(string symbol, double temperatureK, double perCm3, double ohmCm)
    {
        var material = Material.Find(symbol)!;
        Assert.Equal(perCm3, material.IntrinsicDensityPerM3(temperatureK) / 1e6, perCm3 * 1e-3);
        Assert.Equal(ohmCm, 100 / material.IntrinsicConductivitySPerM(temperatureK), ohmCm * 1e-3);
    }

    /// <summary>Altermatt et al. 2003, J. Appl. Phys. 93, 1598: n_i(Si, 300 K) = 9.65e9 cm-3; Morin and Maita 1954, Phys. Rev. 94, 1525: Ge 2.33e13. Sets differ by some 10 %.</summary>
    [Theory]
    [InlineData("Si", 9.65e9, 0.12)]
    [InlineData("Ge", 2.33159e13, 0.12)]
    public void IntrinsicDensity_At300K_LiesNearTheMeasurements(string symbol, double perCm3, double relative) =>
        Assert.Equal(perCm3, Material.Find(symbol)!.IntrinsicDensityPerM3(300) / 1e6, perCm3 * relative);

    [Theory]
    [InlineData("Si")]
    [InlineData("Ge")]
    [InlineData("GaAs")]
    public void SlopeEnergy_OfIntrinsicConductivity_IsHalfTheLinearGapPlusPrefactor(string symbol)
    {
        var material = Material.Find(symbol)!;
        foreach (var temperatureK in new[] { 250.0, 400, 700 })
        {
            const double Step = 1e-3;
            var rise = Math.Log(material.IntrinsicConductivitySPerM(temperatureK + Step) / material.IntrinsicConductivitySPerM(temperatureK - Step));
            var slopeEV = rise / (2 * Step) * SI.BoltzmannEVPerK * temperatureK * temperatureK; // -d ln s/d(1/kT) = k T^2 d ln s/dT
            var expected = (material.Gap.LinearGapEV(temperatureK) / 2) + (material.PrefactorExponent(temperatureK) * SI.ThermalEV(temperatureK));
            Assert.Equal(expected, slopeEV, 1e-7);
        }
    }

    [Fact]
    public void Find_UnknownSymbol_GivesNothing() => Assert.Null(Material.Find("Unobtainium"));

    [Fact]
    public void EverySet_NamesItsSource() => Assert.All(Material.All, material => Assert.True(material.Source.Length > 40 && material.Set.Length > 0));
}
