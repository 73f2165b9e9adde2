using Spectre.Console;

namespace Acquire.App.CommandLine;

/// <summary>Where a command writes: tables and progress for people on <see cref="Out"/>, diagnostics on <see cref="Error"/>.</summary>
/// <remarks>Plain text when redirected or when NO_COLOR is set; tests pass their own writers.</remarks>
internal sealed class Terminal
{
    private Terminal(TextWriter output, TextWriter error, bool interactive, int width)
    {
        Out = output;
        Error = error;
        Interactive = interactive;
        Console = AnsiConsole.Create(new AnsiConsoleSettings
        {
            Ansi = interactive ? AnsiSupport.Detect : AnsiSupport.No,
            ColorSystem = interactive ? ColorSystemSupport.Detect : ColorSystemSupport.NoColors,
            Interactive = interactive ? InteractionSupport.Detect : InteractionSupport.No,
            Out = new AnsiConsoleOutput(output),
        });
        Console.Profile.Width = width;
    }

    /// <summary>Results.</summary>
    public TextWriter Out { get; }

    /// <summary>Diagnostics.</summary>
    public TextWriter Error { get; }

    /// <summary>True when a person is looking at a terminal.</summary>
    public bool Interactive { get; }

    /// <summary>Tables for people.</summary>
    public IAnsiConsole Console { get; }

    /// <summary>The terminal of this process.</summary>
    public static Terminal OfProcess()
    {
        var interactive = !System.Console.IsOutputRedirected;
        return new(System.Console.Out, System.Console.Error, interactive, interactive ? Math.Clamp(WindowWidth(), 40, 160) : 120);
    }

    /// <summary>A terminal that writes into the given writers, plain and 120 columns wide.</summary>
    public static Terminal Of(TextWriter output, TextWriter error) => new(output, error, false, 120);

    private static int WindowWidth()
    {
        try
        {
            return System.Console.WindowWidth;
        }
        catch (IOException)
        {
            return 80;
        }
    }
}
