namespace Acquire.Wire;

/// <summary>How an exchange ended.</summary>
public enum ReplyState
{
    /// <summary>Exactly one complete answer came in time.</summary>
    Answered,

    /// <summary>The message was sent; no answer was asked for.</summary>
    Sent,

    /// <summary>No complete answer came in time.</summary>
    TimedOut,

    /// <summary>The link could not be opened, or the other end went away.</summary>
    LinkFailed,

    /// <summary>The answer exceeded the longest one that the framing allows.</summary>
    TooLong,

    /// <summary>More than one answer came, so none of them can be trusted.</summary>
    Ambiguous,

    /// <summary>A make-safe took the link.</summary>
    Aborted,

    /// <summary>Too many exchanges were waiting.</summary>
    Refused,
}

/// <summary>What came back from one exchange.</summary>
/// <param name="State">How it ended.</param>
/// <param name="Text">
/// The answer without its terminator; what arrived of it when the state is not Answered. Bytes are Latin-1, so nothing is lost.
/// </param>
/// <param name="Problem">Address, what was asked, what came, what to do; null when answered or sent.</param>
/// <param name="MidpointTicks">Half way between question and answer, in timestamps of the exchange's clock.</param>
public readonly record struct Reply(ReplyState State, string Text, string? Problem, long MidpointTicks)
{
    /// <summary>True when the exchange did what was asked.</summary>
    public bool IsGood => State is ReplyState.Answered or ReplyState.Sent;
}
