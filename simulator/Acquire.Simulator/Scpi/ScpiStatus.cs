namespace Acquire.Simulator.Scpi;

/// <summary>Error queue and status registers of one device, after IEEE 488.2 section 11 and SCPI-1999 volume 1, section 9.</summary>
internal sealed class ScpiStatus
{
    private const int QueueLength = 20;
    private const int PowerOn = 128;
    private readonly Queue<ScpiError> _errors = new();

    /// <summary>Standard event status register.</summary>
    public int Events { get; private set; } = PowerOn;

    /// <summary>Standard event status enable register.</summary>
    public int EventsEnabled { get; set; }

    /// <summary>Service request enable register; bit 6 cannot be set.</summary>
    public int RequestsEnabled { get; set; }

    /// <summary>The status byte: error queue not empty (4), events enabled and set (32), master summary (64).</summary>
    public int Byte
    {
        get
        {
            var value = (_errors.Count > 0 ? 4 : 0) | ((Events & EventsEnabled) != 0 ? 32 : 0);
            return (value & RequestsEnabled & ~64) != 0 ? value | 64 : value;
        }
    }

    public void Report(ScpiError error)
    {
        Events |= error.EventBit;
        if (_errors.Count < QueueLength - 1) _errors.Enqueue(error);
        // The last place of a full queue says that errors were lost.
        else if (_errors.Count < QueueLength) _errors.Enqueue(ScpiError.QueueOverflow);
    }

    public ScpiError NextError() => _errors.TryDequeue(out var error) ? error : ScpiError.None;

    public void OperationComplete() => Events |= 1;

    public int TakeEvents()
    {
        var events = Events;
        Events = 0;
        return events;
    }

    public void Clear()
    {
        _errors.Clear();
        Events = 0;
    }
}
