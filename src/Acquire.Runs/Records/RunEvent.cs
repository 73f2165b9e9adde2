namespace Acquire.Runs.Records;

/// <summary>How much an event matters to the person on duty.</summary>
public enum Severity
{
    /// <summary>For the record.</summary>
    Note = 0,

    /// <summary>Worth a look in the morning.</summary>
    Warning = 1,

    /// <summary>Asks a person to act.</summary>
    Alarm = 2,

    /// <summary>The bench was made safe.</summary>
    Trip = 3,
}

/// <summary>One row of the table <c>event</c>.</summary>
/// <param name="TimeUs">Microseconds since the start of the run, monotonic.</param>
/// <param name="Kind">A word for programs: <c>state</c>, <c>step</c>, <c>command</c>, <c>trip</c>, <c>fault</c>, <c>clock</c>, <c>operator</c> ...</param>
/// <param name="Severity">How much it matters.</param>
/// <param name="Source">Who says so: <c>sequence</c>, <c>monitor</c>, <c>interlocks</c>, an instrument's name, an operator's name.</param>
/// <param name="Text">One sentence for people.</param>
/// <param name="DataJson">The values in the sentence, for programs; or null.</param>
public sealed record RunEvent(long TimeUs, string Kind, Severity Severity, string Source, string Text, string? DataJson = null);
