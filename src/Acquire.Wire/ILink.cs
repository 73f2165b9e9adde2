namespace Acquire.Wire;

/// <summary>Bytes to and from one instrument. A link is used by one exchange at a time; the layer above sees to it.</summary>
public interface ILink : IAsyncDisposable
{
    /// <summary>The address in VISA resource syntax.</summary>
    string Address { get; }

    /// <summary>True between a successful open and the first failure or close.</summary>
    bool IsOpen { get; }

    /// <summary>
    /// True when closing and opening again gives a fresh stream on which no answer to an earlier question can arrive.
    /// A socket does; a serial line does not, and the layer above must then resynchronise by a question.
    /// </summary>
    bool ReopenSeparates => false;

    /// <summary>The clock that time-outs on this link run on: real time on a real wire, the device's clock in process.</summary>
    TimeProvider TimeOutClock => TimeProvider.System;

    /// <summary>Opens the link. Throws <see cref="LinkException"/> with the reason and the remedy.</summary>
    ValueTask OpenAsync(CancellationToken cancellation);

    /// <summary>Writes one whole message. Throws <see cref="LinkException"/> when the other end is gone.</summary>
    ValueTask WriteAsync(ReadOnlyMemory<byte> message, CancellationToken cancellation);

    /// <summary>Reads at least one byte. Throws <see cref="LinkException"/> when the other end is gone.</summary>
    ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellation);

    /// <summary>Drops whatever has arrived and was not read, so that a late answer never becomes the next one.</summary>
    ValueTask DiscardInputAsync(CancellationToken cancellation);

    /// <summary>Closes the link at once, abandoning what is in flight; it can be opened again.</summary>
    void Close();
}

/// <summary>The other end of a link is gone, refuses, or cannot be opened.</summary>
public sealed class LinkException(string message, Exception? inner = null) : IOException(message, inner);
