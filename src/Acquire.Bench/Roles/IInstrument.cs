namespace Acquire.Bench.Roles;

/// <summary>What every instrument of a bench can do, whatever role it plays.</summary>
/// <remarks>
/// Members are called on the engine's loop only. Time-outs, refused commands and dead links are returned, not thrown;
/// only a cancelled token throws <see cref="OperationCanceledException"/>.
/// </remarks>
public interface IInstrument : IAsyncDisposable
{
    /// <summary>The name under <c>instruments:</c> in the bench file.</summary>
    string Name { get; }

    /// <summary>The address in VISA resource syntax, as opened.</summary>
    string Address { get; }

    /// <summary>Opens the link, asks who is there and compares it with what the driver expects.</summary>
    ValueTask<Identification> IdentifyAsync(CancellationToken cancellation);

    /// <summary>
    /// De-energises the instrument. Has right of way: an exchange in flight is abandoned, the link cleared or reopened,
    /// the driver's make-safe sequence sent and read back.
    /// </summary>
    ValueTask<CommandOutcome> MakeSafeAsync(CancellationToken cancellation);
}

/// <summary>Who answered at an address.</summary>
/// <param name="Answered">True when something answered and it is what the driver expects.</param>
/// <param name="Text">The identity as returned, or null.</param>
/// <param name="Problem">Why it did not count, in words an operator can use; null when it did.</param>
public sealed record Identification(bool Answered, string? Text, string? Problem);
