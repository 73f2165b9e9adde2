using CsCheck;
using Xunit;

namespace Acquire.Physics.Tests;

/// <summary>Parameters: Thurmond 1975, J. Electrochem. Soc. 122, 1133 (Si, Ge); Blakemore 1982 / Vurgaftman 2001 (GaAs). Values recomputed from the formula.</summary>
public sealed class VarshniGapTests
{
    [Theory]
    [InlineData("Si", 77, 1.1660667)]
    [InlineData("Si", 300, 1.1245192)]
    [InlineData("Si", 500, 1.0659067)]
    [InlineData("Ge", 77, 0.73462787)]
    [InlineData("Ge", 300, 0.66338972)]
    [InlineData("Ge", 400, 0.62341024)]
    [InlineData("GaAs", 300, 1.4224821)]
    public void Gap_AtATemperature_EqualsTheTable(string symbol, double temperatureK, double gapEV) =>
        Assert.Equal(gapEV, Material.Find(symbol)!.Gap.GapEV(temperatureK), 1e-7);

    [Theory]
    [InlineData("Si", 300, 1.200904)]
    [InlineData("Si", 400, 1.214845)]
    [InlineData("Ge", 300, 0.7789765)]
    [InlineData("Ge", 400, 0.7882167)]
    [InlineData("GaAs", 400, 1.567358)]
    public void LinearGap_AtATemperature_EqualsTheTable(string symbol, double temperatureK, double gapEV) =>
        Assert.Equal(gapEV, Material.Find(symbol)!.Gap.LinearGapEV(temperatureK), 1e-6);

    [Fact]
    public void LinearGap_Always_IsGapMinusTTimesSlope() =>
        Gen.Select(Gen.Double[0.2, 3], Gen.Double[1e-4, 1e-3], Gen.Double[50, 1200], Gen.Double[4, 1500]).Sample((zero, alpha, beta, temperatureK) =>
        {
            var gap = new VarshniGap(zero, alpha, beta);
            var tangent = gap.GapEV(temperatureK) - (temperatureK * gap.SlopeEVPerK(temperatureK));
            Assert.Equal(tangent, gap.LinearGapEV(temperatureK), 1e-12);
        });
}
