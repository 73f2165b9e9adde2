namespace Acquire.Bench.Roles;

/// <summary>How a command to an instrument ended: done, or not done and why, in words an operator can use.</summary>
/// <param name="Done">True when the instrument took the command.</param>
/// <param name="Problem">Instrument, address, what was sent, what came back, what to do; null when done.</param>
public sealed record CommandOutcome(bool Done, string? Problem)
{
    /// <summary>The instrument took the command.</summary>
    public static CommandOutcome Ok { get; } = new(true, null);

    /// <summary>The instrument did not take the command.</summary>
    public static CommandOutcome Failed(string problem) => new(false, problem);
}
