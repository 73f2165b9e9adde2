using System.Globalization;
using Acquire.Drivers.Replies;
using CsCheck;

namespace Acquire.Drivers.Tests.Replies;

public class DecimalNumberTests
{
    // The forms are those of IEEE 488.2-1992, 7.7.2 (NRf) and 8.7.2 to 8.7.4 (NR1, NR2, NR3).
    [Theory]
    [InlineData("1", 1)]
    [InlineData("-.5", -0.5)]
    [InlineData("+3.", 3)]
    [InlineData("1E3", 1000)]
    [InlineData("1e+03", 1000)]
    [InlineData("+1.50000E-03", 0.0015)]
    [InlineData(" 42 ", 42)]
    [InlineData("-0", 0)]
    [InlineData("9.9E37", 9.9E37)]
    public void TryRead_AnyNrf_IsTaken(string text, double expected)
    {
        Assert.True(DecimalNumber.TryRead(text, out var value));
        Assert.Equal(expected, value);
    }

    [Theory]
    [InlineData("")]
    [InlineData(" ")]
    [InlineData("-")]
    [InlineData(".")]
    [InlineData("+.")]
    [InlineData("1,5")]
    [InlineData("1.234,5")]
    [InlineData("1 000")]
    [InlineData("1E")]
    [InlineData("E5")]
    [InlineData("0x1F")]
    [InlineData("1.5V")]
    [InlineData("NaN")]
    [InlineData("Infinity")]
    [InlineData("-Infinity")]
    [InlineData("1E999")]
    [InlineData("--1")]
    [InlineData("1\0")]
    [InlineData("\u0661")]
    public void TryRead_AnythingElse_IsRefused(string text)
    {
        Assert.False(DecimalNumber.TryRead(text, out var value));
        Assert.True(double.IsNaN(value));
    }

    [Fact]
    public void TryRead_OfWrittenNumber_GivesItBackExactly() =>
        Gen.Double.Where(double.IsFinite).Sample(x =>
            DecimalNumber.TryRead(x.ToString("R", CultureInfo.InvariantCulture), out var back) && BitConverter.DoubleToInt64Bits(back) == BitConverter.DoubleToInt64Bits(x));

    [Fact]
    public void TryRead_OfAnyText_GivesAFiniteNumberOrRefuses() =>
        Gen.String.Sample(text => DecimalNumber.TryRead(text, out var value) == double.IsFinite(value));
}
