using Acquire.Bench.Readings;
using Acquire.Bench.Text;
using Acquire.Drivers.Files;
using CsCheck;

namespace Acquire.Drivers.Tests.Files;

public class DriverFileTests
{
    private static string Lamp { get; } = File.ReadAllText(Path.Combine(RepositoryFiles.Drivers, "scpi-lamp.driver.yaml"));

    private static string Meter { get; } = File.ReadAllText(Path.Combine(RepositoryFiles.Drivers, "scpi-source-meter.driver.yaml"));

    private static Parsed<DriverFile> Parse(string text) => DriverFile.Parse(new SourceText("x.driver.yaml", text));

    private static string OnlyDiagnostic(string text) => Assert.Single(Parse(text).Diagnostics).ToString();

    [Fact]
    public void Parse_ShippedLamp_GivesItsCommands()
    {
        var driver = Parse(Lamp).Value!;
        Assert.Equal(("scpi-lamp", "*IDN?", "SYST:ERR?"), (driver.Name, driver.Identity.Ask, driver.Errors!.Ask));
        Assert.Equal(["*CLS"], driver.Start);
        Assert.Equal(("SOUR:CURR {value}", "A"), (driver.Lamp!.Drive.Send, driver.Lamp.Drive.Scale.Unit));
        Assert.Equal(["OUTP 0", "SOUR:CURR 0", null], driver.MakeSafe.Select(step => step.Send));
        Assert.Equal("OUTP?", driver.MakeSafe[2].ReadBack!.Ask);
        Assert.Null(driver.Loop);
        Assert.Null(driver.Meter);
        Assert.Equal(Lamp, driver.Source.Text);
    }

    [Fact]
    public void Parse_UnitsOtherThanSI_AreScaledBothWays()
    {
        var driver = Parse(Lamp.Replace("drive: { unit: A }", "drive: { unit: mA, from: 0 mA, to: 2 A }", StringComparison.Ordinal)).Value!;
        var drive = driver.Lamp!.Poll.Fields[0];
        Assert.Equal(Measured.Good(0.25), drive.Read("250", "250"));
        Assert.Equal(250, drive.Scale.FromSI(0.25), 9);
        Assert.Equal(Quality.Implausible, drive.Read("2001", "2001").Quality);
    }

    [Fact]
    public void Parse_MarkersOfItsOwn_ReplaceThoseOfTheStandard()
    {
        var driver = Parse(Lamp.Replace("overload: scpi", "overload: [{ value: -999, means: implausible }]", StringComparison.Ordinal)).Value!;
        var monitor = driver.Lamp!.Poll.Fields[1];
        Assert.Equal(Quality.Implausible, monitor.Read("-999.0", "").Quality);
        Assert.Equal(Quality.Good, monitor.Read("9.9E37", "").Quality);
    }

    [Theory]
    [InlineData("reply: \"{drive};{monitor}\"", "reply: \"{drive};{current}\"", "x.driver.yaml:14:12: the reply does not have the fields of this poll; found '{drive};{current}'; allowed {drive}, {monitor}; name each of them once")]
    [InlineData("reply: \"{drive};{monitor}\"", "reply: \"{drive}{monitor}\"", "two fields stand side by side")]
    [InlineData("expect: \"0|OFF\"", "expect: \"(0\"", "this is no regular expression")]
    [InlineData("expect: \"0|OFF\"", "expect: \"(0)\\\\1\"", "this is no regular expression")]
    [InlineData("send: \"SOUR:CURR {value}\"", "send: \"SOUR:CURR\"", "printable ASCII with {value} in it")]
    [InlineData("{ unit: A }\n      monitor", "{ unit: V }\n      monitor", "allowed A, mA, uA, nA, pA")]
    [InlineData("lamp:\n  poll", "lamps:\n  poll", "did you mean 'lamp'?")]
    [InlineData("driver: scpi-lamp", "driver: ../lamp", "small letters, digits and hyphens")]
    public void Parse_Mistake_IsNamedWithItsPlace(string right, string wrong, string message)
    {
        Assert.Contains(right, Lamp, StringComparison.Ordinal);
        Assert.Contains(message, Parse(Lamp.Replace(right, wrong, StringComparison.Ordinal)).Diagnostics[0].ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void Parse_RangesOutOfOrder_AreRefused() =>
        Assert.Contains("the ranges do not ascend", OnlyDiagnostic(Meter.Replace("1 nA, 10 nA", "10 nA, 1 nA", StringComparison.Ordinal)), StringComparison.Ordinal);

    [Fact]
    public void Parse_TwoRoles_AreRefused()
    {
        var both = Lamp + Meter[Meter.IndexOf("source-meter:\n", StringComparison.Ordinal)..Meter.IndexOf("make safe:", StringComparison.Ordinal)];
        Assert.Contains("a driver plays exactly one role; found source-meter, lamp", OnlyDiagnostic(both), StringComparison.Ordinal);
    }

    [Fact]
    public void Parse_AnyOneCharacterChanged_GivesAModelOrDiagnostics() =>
        Gen.Select(Gen.Int[0, Meter.Length - 1], Gen.Char[' ', '~']).Sample((at, c) =>
        {
            var parsed = Parse(Meter[..at] + c + Meter[(at + 1)..]);
            return parsed.IsGood == (parsed.Diagnostics.Count == 0);
        }, iter: 500);
}
