namespace Acquire.Bench.Readings;

/// <summary>Why a reading may not be used; zero means that nothing speaks against it.</summary>
/// <remarks>The numbers are stored in run files and never change their meaning; new reasons take new bits.</remarks>
[Flags]
public enum Quality
{
    /// <summary>Nothing speaks against the reading.</summary>
    Good = 0,

    /// <summary>The instrument did not answer in time.</summary>
    TimedOut = 1,

    /// <summary>Above the range, or one of the overload markers of SCPI-1999 (9.9E37, 9.91E37).</summary>
    Overrange = 2,

    /// <summary>The value was read too long ago to stand for now.</summary>
    Stale = 4,

    /// <summary>The reply could not be read as a number.</summary>
    Unreadable = 8,

    /// <summary>Too small for the range in use.</summary>
    Underrange = 16,

    /// <summary>The source was limiting, so the set value was not applied.</summary>
    Compliance = 32,

    /// <summary>The signal had not settled when it was read.</summary>
    Unsettled = 64,

    /// <summary>The temperature gate was not met while it was read.</summary>
    UnstableTemperature = 128,

    /// <summary>The link failed or was closed.</summary>
    LinkFailed = 256,

    /// <summary>The reply said not-a-number, or a value outside what is physically possible for the channel.</summary>
    Implausible = 512,

    /// <summary>A person excluded it, with a reason in the edits of the run.</summary>
    Excluded = 1024,
}
