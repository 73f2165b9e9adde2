namespace Acquire.App.CommandLine;

/// <summary>What the program's exit codes mean; scripts rely on the numbers.</summary>
internal static class ExitCode
{
    /// <summary>Done.</summary>
    public const int Done = 0;

    /// <summary>Done, and the answer is no.</summary>
    public const int AnswerIsNo = 1;

    /// <summary>The request could not be taken: usage, unreadable or invalid input.</summary>
    public const int NotTaken = 2;

    /// <summary>A run ended by an interlock or by the operator before its plan did.</summary>
    public const int EndedEarly = 3;

    /// <summary>An instrument or the system failed.</summary>
    public const int Failed = 4;
}
