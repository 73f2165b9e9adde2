using Acquire.Bench.Text;
using Acquire.Sweep.Protocols;
using CsCheck;
using Xunit;

namespace Acquire.Sweep.Tests.Protocols;

public sealed class ProtocolFileTests
{
    [Theory]
    [InlineData("germanium-quick", "germanium-quick")]
    [InlineData("germanium-night", "germanium-cryostat")]
    [InlineData("silicon-furnace", "silicon-furnace")]
    public void ShippedProtocol_OnItsBench_PassesTheCheck(string protocol, string bench) =>
        Assert.Empty(ProtocolCheck.Against(Shipped.Protocol(protocol), Shipped.Bench(bench)));

    [Theory]
    [InlineData("finish: safe", "finnish: safe", "unknown key; found 'finnish'; allowed protocol, purpose, sample, measure, settle, legs, finish; did you mean 'finish'?")]
    [InlineData("bias: 0.2 V, reversals: 4", "bias: 0.2 A, reversals: 4", "this is not a voltage; found '0.2 A'; allowed a number, a space and one of V, mV, uV, kV; write for example '0.2 V'")]
    [InlineData("at each: [dark, lit, dark]", "at each: [lit, dark]", "light comes before dark; found '[lit ...]'; allowed dark first; write '[dark, lit, dark]': light fills traps that may not empty for hours")]
    [InlineData("from: 340 K, to: 240 K", "from: 340 K, to: 340 K", "the leg goes nowhere; found '340 K'; allowed another temperature than 'from'; change one of them")]
    public void Protocol_WithOneMistake_SaysWhatAndWhatToDo(string old, string mistake, string message)
    {
        var parsed = ProtocolFile.Parse(new SourceText("p.protocol.yaml", Shipped.Text("germanium-quick").Replace(old, mistake, StringComparison.Ordinal)));
        Assert.Null(parsed.Value);
        Assert.EndsWith(message, Assert.Single(parsed.Diagnostics).ToString(), StringComparison.Ordinal);
        Assert.StartsWith("p.protocol.yaml:", parsed.Diagnostics[0].ToString(), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("to: 240 K", "to: 140 K", "the temperature is outside the bench; found '140 K'; allowed 220 K to 345 K (")]
    [InlineData("ramp: 25 K/min", "ramp: 50 K/min", "the ramp is faster than the bench allows; found '50 K/min'; allowed at most 30 K/min (")]
    [InlineData("bias: 0.2 V, reversals: 4", "bias: 2 V, reversals: 4", "the bias is above what the bench allows; found '2 V'; allowed at most 1 V (")]
    [InlineData("wavelength: 940 nm", "wavelength: 532 nm", "the lamp has another wavelength; found '532 nm'; allowed 940 nm (")]
    [InlineData("irradiance: 1 mW/cm2", "irradiance: 7 mW/cm2", "the irradiance is above what the bench allows; found '70 W/m2'; allowed at most 50 W/m2 (")]
    public void Protocol_BeyondTheBench_IsRefusedWithTheLimitsPlace(string old, string mistake, string message)
    {
        var protocol = ProtocolFile.Parse(new SourceText("p.protocol.yaml", Shipped.Text("germanium-quick").Replace(old, mistake, StringComparison.Ordinal))).Value!;
        var findings = ProtocolCheck.Against(protocol, Shipped.Bench("germanium-quick"));
        Assert.NotEmpty(findings);
        Assert.All(findings, finding => Assert.Contains(message, finding.ToString(), StringComparison.Ordinal));
        Assert.All(findings, finding => Assert.Contains("germanium-quick.bench.yaml:", finding.ToString(), StringComparison.Ordinal));
    }

    [Fact]
    public void LitProtocol_OnADarkBench_IsRefused()
    {
        var findings = ProtocolCheck.Against(Shipped.Protocol("germanium-quick"), Shipped.Bench("silicon-furnace"));
        Assert.Contains(findings, finding => finding.What == "the protocol wants light and the bench has no lamp");
    }

    [Fact]
    public void ShippedProtocolWithBytesChanged_GivesAModelOrDiagnostics_NeverAnException()
    {
        var good = System.Text.Encoding.UTF8.GetBytes(Shipped.Text("germanium-quick"));
        Gen.Select(Gen.Int[0, good.Length - 1], Gen.Byte, Gen.Int[0, good.Length]).Sample((at, value, length) =>
        {
            var bytes = good.ToArray();
            bytes[at] = value;
            var source = SourceText.Decode("p.protocol.yaml", bytes.AsSpan(0, length));
            if (source.Value is not null)
            {
                var parsed = ProtocolFile.Parse(source.Value);
                Assert.Equal(parsed.Value is null, parsed.Diagnostics.Count > 0);
            }
        }, iter: 3000);
    }
}
