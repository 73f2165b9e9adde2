using Xunit;

namespace Acquire.Physics.Tests;

/// <summary>Nyquist 1928 and Schottky 1918 formulas with the exact constants, recomputed independently.</summary>
public sealed class NoiseTests
{
    [Theory]
    [InlineData(1e6, 128.71592e-9, 128.71592e-15)]
    [InlineData(1e9, 4.07035478e-6, 4.07035478e-15)]
    public void Johnson_At300K_EqualsTheTable(double resistanceOhm, double voltage, double current)
    {
        Assert.Equal(voltage, Noise.JohnsonVoltageVPerRootHz(300, resistanceOhm), voltage * 1e-7);
        Assert.Equal(current, Noise.JohnsonCurrentAPerRootHz(300, 1 / resistanceOhm), current * 1e-7);
    }

    [Theory]
    [InlineData(1e-9, 1.79007074e-14)]
    [InlineData(-1e-6, 5.66070072e-13)]
    public void Shot_OfACurrent_EqualsTheTable(double currentA, double noise) => Assert.Equal(noise, Noise.ShotCurrentAPerRootHz(currentA), noise * 1e-8);

    [Theory]
    [InlineData(0.33, 77, 0.65)]
    [InlineData(0.56, 300, 0.072)]
    [InlineData(0.75, 900, 0.011)]
    public void Sensitivity_OfAnActivatedConductance_IsEaOverKTSquared(double activationEV, double temperatureK, double perKelvin) =>
        Assert.Equal(perKelvin, TemperatureSensitivity.PerKelvin(activationEV, temperatureK), perKelvin * 0.03);
}
