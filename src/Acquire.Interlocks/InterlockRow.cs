namespace Acquire.Interlocks;

/// <summary>What a row watches.</summary>
public enum InterlockInput
{
    /// <summary>The stage sensor.</summary>
    Stage,

    /// <summary>The sample sensor.</summary>
    Sample,

    /// <summary>The temperature controller as an instrument.</summary>
    Controller,

    /// <summary>The source-meter as an instrument.</summary>
    Meter,

    /// <summary>The lamp as an instrument.</summary>
    Lamp,

    /// <summary>The record of the run.</summary>
    Record,
}

/// <summary>What must be true for the row to be healthy. Each is written so that NaN, stale, sentinel and silence fail it.</summary>
public enum InterlockCondition
{
    /// <summary>The last answer is a good reading inside the sensor's range.</summary>
    Valid,

    /// <summary>The last good reading is at most the threshold: !(value &lt;= threshold) is unhealthy.</summary>
    AtMost,

    /// <summary>The last good reading is at most so many seconds old.</summary>
    Fresh,

    /// <summary>The instrument answered at most so many seconds ago.</summary>
    Answering,

    /// <summary>The run file is being written.</summary>
    Writing,
}

/// <summary>One row of the cause-and-effect table. Data, not code.</summary>
/// <param name="Id">Stable identifier.</param>
/// <param name="Input">What it watches.</param>
/// <param name="Condition">What must be true.</param>
/// <param name="Threshold">Its threshold, in <paramref name="Unit"/>.</param>
/// <param name="Unit">K, s, or empty.</param>
/// <param name="Confirmations">1: judged every time; 2: unhealthy samples among the last three before it trips.</param>
/// <param name="Consequence">What happens to people or samples if nothing acts.</param>
/// <param name="Text">What the operator is told; {0} is what was found, {1} the threshold.</param>
/// <param name="HowToTest">How the row is tested on a bench.</param>
public sealed record InterlockRow(
    string Id, InterlockInput Input, InterlockCondition Condition, double Threshold, string Unit, int Confirmations, string Consequence, string Text, string HowToTest);
