using Acquire.Drivers.Replies;
using CsCheck;

namespace Acquire.Drivers.Tests.Replies;

public class ReplyTemplateTests
{
    private static string[]? Match(string template, string reply)
    {
        var parsed = ReplyTemplate.TryParse(template, out var problem);
        Assert.Null(problem);
        var fields = new Range[parsed!.Names.Count];
        return parsed.TryMatch(reply, fields) ? [.. fields.Select(f => reply[f])] : null;
    }

    [Theory]
    [InlineData("{a};{b}", "1;2", new[] { "1", "2" })]
    [InlineData("{a}", "1,5", new[] { "1,5" })]
    [InlineData("T={a} K, P={b} W", "T=293.1 K, P=4 W", new[] { "293.1", "4" })]
    [InlineData("{a};{b}", ";", new[] { "", "" })]
    public void TryMatch_ReplyOfThisForm_GivesItsFields(string template, string reply, string[] fields) => Assert.Equal(fields, Match(template, reply));

    [Theory]
    [InlineData("{a};{b}", "1")]
    [InlineData("{a};{b}", "1;2;3")]
    [InlineData("{a},{b},{c}", "1,5E-6,0,1,0")]
    [InlineData("T={a} K", "T=293.1 C")]
    [InlineData("T={a} K", "293.1 K")]
    [InlineData("ab{a}bc", "abc")]
    [InlineData("{a};{b}", "")]
    public void TryMatch_ReplyOfOtherForm_IsRefused(string template, string reply) => Assert.Null(Match(template, reply));

    [Theory]
    [InlineData("OUTP", "no field in braces")]
    [InlineData("{a", "not closed")]
    [InlineData("{}", "holds no name")]
    [InlineData("{a}{b}", "side by side")]
    [InlineData("{a};{a}", "occurs twice")]
    public void TryParse_ImpossibleTemplate_SaysWhy(string text, string why)
    {
        Assert.Null(ReplyTemplate.TryParse(text, out var problem));
        Assert.Contains(why, problem, StringComparison.Ordinal);
    }

    [Fact]
    public void TryMatch_OfJoinedFields_GivesThemBack() =>
        Gen.String[Gen.Char['0', '9'], 0, 6].Array[1, 6].Sample(fields =>
        {
            var template = string.Join(';', fields.Select((_, i) => FormattableString.Invariant($"{{f{i}}}")));
            return Match(template, string.Join(';', fields))!.SequenceEqual(fields);
        });

    [Fact]
    public void TryMatch_OfAnyText_NeverThrows() =>
        Gen.Select(Gen.String, Gen.Int[0, 4]).Sample((reply, template) =>
        {
            Match(((string[])["{a};{b}", "x{a}", "{a}y", "ab{a}ba", "{a}, {b}, {c}"])[template], reply);
        });
}
