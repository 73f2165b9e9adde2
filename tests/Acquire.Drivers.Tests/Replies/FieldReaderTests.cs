using Acquire.Bench.Readings;
using Acquire.Drivers.Replies;

namespace Acquire.Drivers.Tests.Replies;

public class FieldReaderTests
{
    private static readonly FieldReader StageK = new("stage", UnitScale.None, 0, 2000, OverloadMarker.Scpi);

    [Fact]
    public void Read_Number_IsScaledToSI()
    {
        var celsius = new FieldReader("stage", new UnitScale("degC", 1, 273.15), 0, 2000, OverloadMarker.Scpi);
        Assert.Equal(Measured.Good(298.15), celsius.Read("25.0", "25.0"));
        Assert.Equal(25, celsius.Scale.FromSI(298.15), 12);
    }

    // 9.9E37, -9.9E37 and 9.91E37 are plus infinity, minus infinity and not-a-number of SCPI-1999, volume 1, 7.2.1;
    // the last two are the same numbers after rounding to single precision.
    [Theory]
    [InlineData("9.9E37", Quality.Overrange)]
    [InlineData("+9.900000E+37", Quality.Overrange)]
    [InlineData("-9.9E37", Quality.Overrange)]
    [InlineData("9.91E37", Quality.Overrange)]
    [InlineData("9.8999999E37", Quality.Overrange)]
    [InlineData("9.9099997E+37", Quality.Overrange)]
    [InlineData("INF", Quality.Overrange)]
    [InlineData("-inf", Quality.Overrange)]
    [InlineData("NAN", Quality.Implausible)]
    [InlineData("NaN", Quality.Implausible)]
    [InlineData("-1", Quality.Implausible)]
    [InlineData("2000.1", Quality.Implausible)]
    [InlineData("293,15", Quality.Unreadable)]
    [InlineData("", Quality.Unreadable)]
    [InlineData("----", Quality.Unreadable)]
    [InlineData("1E999", Quality.Unreadable)]
    [InlineData("\u00ff\u0080", Quality.Unreadable)]
    public void Read_AnythingThatIsNoUsableNumber_IsBadAndKeepsTheReply(string field, Quality quality)
    {
        var value = StageK.Read(field, "whole " + field);
        Assert.Equal((quality, "whole " + field), (value.Quality, value.Raw));
    }

    [Theory]
    [InlineData(9.9E37 * 1.001)]
    [InlineData(9.9E36)]
    public void Matches_OtherLargeNumber_IsNoMarker(double number) => Assert.DoesNotContain(OverloadMarker.Scpi.Take(2), m => m.Matches(number));
}
