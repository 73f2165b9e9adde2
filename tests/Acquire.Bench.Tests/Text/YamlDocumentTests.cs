using Acquire.Bench.Files;
using Acquire.Bench.Tests.Files;
using Acquire.Bench.Text;
using CsCheck;
using Xunit;

namespace Acquire.Bench.Tests.Text;

public sealed class YamlDocumentTests
{
    [Theory]
    [InlineData("", "empty")]
    [InlineData("a: 1\na: 2\n", "twice")]
    [InlineData("a: &x 1\nb: *x\n", "anchors")]
    [InlineData("b: *x\n", "")]
    [InlineData("a: !!str 1\n", "tags")]
    [InlineData("a: 1\n---\nb: 2\n", "second document")]
    [InlineData("a: [1, 2\n", "not YAML")]
    [InlineData("a: {b: }}\n", "not YAML")]
    [InlineData("a:\n\t- x", "not YAML")]
    public void Document_ThatIsNotStrict_IsRefusedWithAReason(string text, string reason)
    {
        var parsed = YamlDocument.Parse(new SourceText("x.yaml", text));
        Assert.Null(parsed.Value);
        Assert.Contains(parsed.Diagnostics, finding => finding.What.Contains(reason, StringComparison.Ordinal));
    }

    [Fact]
    public void Document_NestedTooDeeply_IsRefused()
    {
        var parsed = YamlDocument.Parse(new SourceText("x.yaml", new string('[', 60) + new string(']', 60)));
        Assert.Contains("nested too deeply", Assert.Single(parsed.Diagnostics).What, StringComparison.Ordinal);
    }

    [Fact]
    public void AnyBytes_GiveAModelOrDiagnostics_NeverAnException() =>
        Gen.Byte.Array[0, 200].Sample(AssertTotal, iter: 20_000);

    [Fact]
    public void AnyYamlLikeText_GivesAModelOrDiagnostics_NeverAnException() =>
        Gen.Char["abc:- \n\t{}[],&*!|>'\"%@`#?0123456789.~K/"].Array[0, 120].Select(letters => System.Text.Encoding.UTF8.GetBytes(letters))
            .Sample(AssertTotal, iter: 20_000);

    [Fact]
    public void AGoodFileWithBytesChanged_GivesAModelOrDiagnostics_NeverAnException()
    {
        var good = System.Text.Encoding.UTF8.GetBytes(BenchTexts.Good);
        Gen.Select(Gen.Int[0, good.Length - 1], Gen.Byte, Gen.Int[0, good.Length])
            .Sample((at, value, length) =>
            {
                var bytes = good.ToArray();
                bytes[at] = value;
                AssertTotal(bytes[..length]);
            }, iter: 5000);
    }

    private static void AssertTotal(byte[] bytes)
    {
        var source = SourceText.Decode("x.bench.yaml", bytes);
        Assert.Equal(source.Value is null, source.Diagnostics.Count > 0);
        if (source.Value is null)
        {
            return;
        }

        var document = YamlDocument.Parse(source.Value);
        Assert.Equal(document.Value is null, document.Diagnostics.Count > 0);
        var bench = BenchFile.Parse(source.Value);
        Assert.Equal(bench.Value is null, bench.Diagnostics.Count > 0);
    }
}
