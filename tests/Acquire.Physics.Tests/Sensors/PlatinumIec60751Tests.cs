using Acquire.Physics.Sensors;
using CsCheck;
using Xunit;

namespace Acquire.Physics.Tests.Sensors;

/// <summary>IEC 60751:2022, Pt100.</summary>
public sealed class PlatinumIec60751Tests
{
    [Theory]
    [InlineData(-200, 18.52008)]
    [InlineData(-150, 39.723184375)]
    [InlineData(-100, 60.25584)]
    [InlineData(-40, 84.270652032)]
    [InlineData(0, 100)]
    [InlineData(25, 109.73465625)]
    [InlineData(100, 138.5055)]
    [InlineData(400, 247.092)]
    [InlineData(850, 390.481125)]
    public void Resistance_AtATemperature_EqualsTheTable(double celsius, double ohm) => Assert.Equal(ohm, PlatinumIec60751.ResistanceOhm(celsius), 1e-9);

    [Theory]
    [InlineData(60.26, -99.9897361784)]
    [InlineData(110, 25.6840466625)]
    [InlineData(200, 266.348190958)]
    public void Temperature_OfAResistance_IsTheExactInverse(double ohm, double celsius) => Assert.Equal(celsius, PlatinumIec60751.Celsius(ohm), 1e-8);

    [Fact]
    public void Temperature_OfTheResistanceOfATemperature_IsThatTemperature() =>
        Gen.Double[-199.9, 849.9].Sample(celsius => Assert.Equal(celsius, PlatinumIec60751.Celsius(PlatinumIec60751.ResistanceOhm(celsius)), 1e-8));

    [Theory]
    [InlineData(10.0)]
    [InlineData(400.0)]
    [InlineData(double.NaN)]
    public void Temperature_OutsideTheRange_IsNoNumber(double ohm) => Assert.True(double.IsNaN(PlatinumIec60751.Celsius(ohm)));
}
