using Xunit;

namespace Acquire.Physics.Tests;

/// <summary>Values from quadrature and polylogarithm that agree with each other; the GNU Scientific Library's own test values are the same.</summary>
public sealed class FermiIntegralTests
{
    [Theory]
    [InlineData(-10, 4.539920105264e-5, 4.5398472361e-5, 4.5399565405e-5)]
    [InlineData(-5, 0.006721954314506, 0.0067060199893, 0.006729940909)]
    [InlineData(-4, 0.01819820350837, 0.018081922991, 0.018256727585)]
    [InlineData(-2, 0.1292985133201, 0.1236656218, 0.13224678225)]
    [InlineData(-1, 0.3277951592607, 0.29402761761, 0.3466747948)]
    [InlineData(0, 0.7651470246254, 0.60489864342, 0.86719988901)]
    [InlineData(1, 1.575640776151, 1.0270571255, 2.0022581488)]
    [InlineData(2, 2.823721277402, 1.4642945891, 4.1654144599)]
    [InlineData(5, 8.844208895243, 2.4729876225, 20.914467403)]
    [InlineData(10, 24.08465696464, 3.5527792395, 101.00510084)]
    [InlineData(20, 67.49151222166, 5.0410185075, 546.56301007)]
    [InlineData(50, 266.0928125214, 7.9775308586, 5332.3535667)]
    public void Integral_AtEta_EqualsTheTable(double eta, double half, double minusHalf, double threeHalves)
    {
        Assert.Equal(half, FermiIntegral.Half(eta), half * 1e-9);
        Assert.Equal(minusHalf, FermiIntegral.MinusHalf(eta), minusHalf * 1e-9);
        Assert.Equal(threeHalves, FermiIntegral.ThreeHalves(eta), threeHalves * 1e-9);
    }

    [Fact]
    public void Half_AtZero_IsTheClosedValue() => Assert.Equal(0.7651470246254079, FermiIntegral.Half(0), 1e-12);
}
