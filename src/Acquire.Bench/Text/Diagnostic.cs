namespace Acquire.Bench.Text;

/// <summary>A place in a text: line and column, both from 1.</summary>
public readonly record struct Position(int Line, int Column)
{
    /// <summary>The beginning of a text.</summary>
    public static Position Start { get; } = new(1, 1);
}

/// <summary>What is wrong in a file, where, what was found, what is allowed and what to do about it.</summary>
/// <param name="File">The file as the user named it.</param>
/// <param name="At">Line and column.</param>
/// <param name="What">What is wrong.</param>
/// <param name="Found">The offending text, with its unit.</param>
/// <param name="Allowed">What would be right.</param>
/// <param name="Remedy">The next step.</param>
public sealed record Diagnostic(string File, Position At, string What, string Found, string Allowed, string Remedy)
{
    /// <summary><c>file:line:column: what; found ...; allowed ...; remedy</c>; empty parts are left out.</summary>
    public override string ToString()
    {
        var parts = new List<string> { What };
        if (Found.Length > 0)
        {
            parts.Add("found " + Found);
        }

        if (Allowed.Length > 0)
        {
            parts.Add("allowed " + Allowed);
        }

        if (Remedy.Length > 0)
        {
            parts.Add(Remedy);
        }

        return FormattableString.Invariant($"{File}:{At.Line}:{At.Column}: {string.Join("; ", parts)}");
    }
}

/// <summary>A value, or the reasons why there is none.</summary>
/// <param name="Value">The value; null when there is an error.</param>
/// <param name="Diagnostics">The reasons; empty when there is a value.</param>
public sealed record Parsed<T>(T? Value, IReadOnlyList<Diagnostic> Diagnostics)
    where T : class
{
    /// <summary>True when there is a value.</summary>
    public bool IsGood => Value is not null;
}

/// <summary>Makes <see cref="Parsed{T}"/>.</summary>
public static class Parsed
{
    /// <summary>A value.</summary>
    public static Parsed<T> Good<T>(T value)
        where T : class => new(value, []);

    /// <summary>Reasons why there is none.</summary>
    public static Parsed<T> Bad<T>(IReadOnlyList<Diagnostic> diagnostics)
        where T : class => new(null, diagnostics);
}
