using System.Text.RegularExpressions;

namespace Acquire.Drivers.Files;

/// <summary>A question and the form of the right answer.</summary>
public sealed class Check
{
    private readonly Regex _whole;

    private Check(string ask, string expect, Regex whole) => (Ask, Expect, _whole) = (ask, expect, whole);

    /// <summary>The question.</summary>
    public string Ask { get; }

    /// <summary>The regular expression that the whole of a right answer matches.</summary>
    public string Expect { get; }

    /// <summary>Makes a check; null with the reason when the expression is not one.</summary>
    /// <remarks>The expression runs in time proportional to the answer, so that no driver file can make a reply hang the loop.</remarks>
    public static Check? TryCreate(string ask, string expect, out string? problem)
    {
        try
        {
            problem = null;
            return new Check(ask, expect, new Regex($@"\A(?:{expect})\z", RegexOptions.CultureInvariant | RegexOptions.NonBacktracking));
        }
        catch (Exception e) when (e is ArgumentException or NotSupportedException)
        {
            problem = e.Message;
            return null;
        }
    }

    /// <summary>True when the answer, without blanks around it, is as expected.</summary>
    public bool Matches(string answer) => _whole.IsMatch(answer.Trim(' '));
}
