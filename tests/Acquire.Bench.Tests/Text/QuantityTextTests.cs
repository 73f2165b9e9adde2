using Acquire.Bench.Text;
using CsCheck;
using Xunit;

namespace Acquire.Bench.Tests.Text;

public sealed class QuantityTextTests
{
    /// <summary>SI Brochure, 9th edition (BIPM 2019): prefixes, the minute and the hour, the degree Celsius; the electronvolt is exact since 2019.</summary>
    [Theory]
    [InlineData("5 K/min", Dimension.TemperatureRate, 5.0 / 60)]
    [InlineData("20 degC", Dimension.Temperature, 293.15)]
    [InlineData("0.2 V", Dimension.Voltage, 0.2)]
    [InlineData("1 mW/cm2", Dimension.Irradiance, 10)]
    [InlineData("940 nm", Dimension.Length, 940e-9)]
    [InlineData("1 eV", Dimension.Energy, 1.602176634e-19)]
    [InlineData("1e12 cm-3", Dimension.NumberDensity, 1e18)]
    [InlineData("3900 cm2/Vs", Dimension.Mobility, 0.39)]
    [InlineData("2 %", Dimension.Ratio, 0.02)]
    [InlineData("2%", Dimension.Ratio, 0.02)]
    [InlineData("0.02", Dimension.Ratio, 0.02)]
    [InlineData("5 line cycles", Dimension.LineCycles, 5)]
    [InlineData("2 h", Dimension.Time, 7200)]
    [InlineData("45 ohm cm", Dimension.Resistivity, 0.45)]
    public void Quantity_WithATradeUnit_BecomesSi(string text, Dimension dimension, double si) =>
        Assert.Equal(si, QuantityText.Parse(text, dimension)!.Value, Math.Abs(si) * 1e-15);

    [Theory]
    [InlineData("5", Dimension.Voltage)]
    [InlineData("5 K", Dimension.Voltage)]
    [InlineData("V", Dimension.Voltage)]
    [InlineData("1,5 V", Dimension.Voltage)]
    [InlineData("5V", Dimension.Voltage)]
    [InlineData("NaN V", Dimension.Voltage)]
    [InlineData("1e999 V", Dimension.Voltage)]
    [InlineData("5 degC", Dimension.TemperatureDifference)]
    [InlineData("", Dimension.Ratio)]
    public void Quantity_ThatIsNotOne_IsRefused(string text, Dimension dimension) => Assert.Null(QuantityText.Parse(text, dimension));

    [Fact]
    public void Quantity_WrittenAndRead_IsTheSame() =>
        Gen.Select(Gen.Enum<Dimension>(), Gen.Double[-1e6, 1e6], Gen.Int[0, 10]).Sample((dimension, si, which) =>
        {
            var units = QuantityText.UnitsOf(dimension);
            var text = QuantityText.Format(si, dimension, units[which % units.Count].Symbol);
            var back = QuantityText.Parse(text, dimension) ?? throw new FormatException(text);
            // One rounding on the way out and one on the way in, beside an offset where the unit has one.
            Assert.Equal(si, back, (Math.Abs(si) * 4e-16) + (units[which % units.Count].Offset == 0 ? 0 : 1e-10));
        }, iter: 20_000);
}
