using Xunit;

namespace Acquire.Physics.Tests;

/// <summary>CODATA 2018 listing, NIST: derived values recomputed from the exact constants.</summary>
public sealed class SITests
{
    [Fact]
    public void BoltzmannInElectronvolts_EqualsTheListing() => Assert.Equal(8.617333262145e-5, SI.BoltzmannEVPerK, 1e-16);

    [Theory]
    [InlineData(77, 0.0066353466119)]
    [InlineData(300, 0.025851999786)]
    [InlineData(600, 0.051703999573)]
    public void ThermalEnergy_AtATemperature_EqualsKT(double temperatureK, double thermalEV) => Assert.Equal(thermalEV, SI.ThermalEV(temperatureK), 1e-12);

    [Theory]
    [InlineData(940e-9, 1.31898083, 4.7320695735e18)]
    [InlineData(1064e-9, 1.16526502, 5.3563000279e18)]
    public void Photon_OfAWavelength_HasEnergyAndNumber(double wavelengthM, double photonEV, double perJoule)
    {
        Assert.Equal(photonEV, SI.PhotonEV(wavelengthM), 1e-8);
        Assert.Equal(perJoule, SI.PhotonsPerJoule(wavelengthM), perJoule * 1e-10);
    }

    /// <summary>Hydrogen-like check that ties the constants to each other: 2 (2 pi m k T / h^2)^1.5 = 2.5094122e19 cm-3 at 300 K.</summary>
    [Fact]
    public void FreeElectronStates_At300K_TieTheConstantsTogether()
    {
        var states = 2 * Math.Pow(2 * Math.PI * SI.ElectronMassKg * SI.BoltzmannJPerK * 300 / (SI.PlanckJS * SI.PlanckJS), 1.5);
        Assert.Equal(2.5094122e25, states, 1e18);
    }
}
