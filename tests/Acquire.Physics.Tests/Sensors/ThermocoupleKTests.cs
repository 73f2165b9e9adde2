using Acquire.Physics.Sensors;
using CsCheck;
using Xunit;

namespace Acquire.Physics.Tests.Sensors;

/// <summary>NIST ITS-90 Thermocouple Database (SRD 60), type K.</summary>
public sealed class ThermocoupleKTests
{
    [Theory]
    [InlineData(-270, -6.457737953)]
    [InlineData(-200, -5.891403592)]
    [InlineData(-100, -3.553631337)]
    [InlineData(-40, -1.526947951)]
    [InlineData(0, 0)]
    [InlineData(25, 1.000242355)]
    [InlineData(100, 4.096230219)]
    [InlineData(300, 12.20856553)]
    [InlineData(500, 20.64428639)]
    [InlineData(1000, 41.27560646)]
    [InlineData(1372, 54.88636403)]
    public void Voltage_AtATemperature_EqualsTheReferenceFunction(double celsius, double millivolt) =>
        Assert.Equal(millivolt, ThermocoupleK.VoltageV(celsius) * 1e3, 1e-8);

    /// <summary>The same cold-junction example worked with the reference function: 3.095987864 mV with the junction at 25 degC is 100 degC.</summary>
    [Fact]
    public void Temperature_WithAWarmReferenceJunction_IsCorrected() => Assert.Equal(100, ThermocoupleK.Celsius(3.095987864e-3, 25), 1e-6);

    [Fact]
    public void Temperature_OfTheVoltageOfATemperature_IsThatTemperature() =>
        Gen.Double[-199, 1371].Sample(celsius => Assert.Equal(celsius, ThermocoupleK.Celsius(ThermocoupleK.VoltageV(celsius)), 1e-7));

    [Theory]
    [InlineData(-0.0065)]
    [InlineData(0.0550)]
    [InlineData(double.NaN)]
    public void Temperature_OutsideTheRange_IsNoNumber(double volt) => Assert.True(double.IsNaN(ThermocoupleK.Celsius(volt)));
}
