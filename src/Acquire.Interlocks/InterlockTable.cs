using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Acquire.Bench.Files;

namespace Acquire.Interlocks;

/// <summary>The interlock table of a bench: versioned data with a hash that every run records. All rows trip and latch in this version.</summary>
public sealed record InterlockTable(int Version, IReadOnlyList<InterlockRow> Rows, double SensorFromK, double SensorToK)
{
    private const int PresentVersion = 1;

    /// <summary>The built-in rows with the thresholds of a bench. Rows of instruments that are not wired are not there: they are not protected, never healthy.</summary>
    /// <param name="bench">The bench.</param>
    /// <param name="pace">
    /// How many times faster than life the bench's clock runs: links, processors and operating systems are not faster, so ages are allowed in real time.
    /// </param>
    public static InterlockTable For(BenchFile bench, double pace = 1)
    {
        var staleS = pace * Math.Max(3 * bench.MonitorPeriodS / pace, 5);
        var rows = new List<InterlockRow>();
        foreach (var (input, words) in new[] { (InterlockInput.Stage, "stage"), (InterlockInput.Sample, "sample") })
        {
            // Before the limit, so that a sensor that gives no number is named as such.
            rows.Add(new($"invalid-{words}-sensor", input, InterlockCondition.Valid, double.NaN, "", 2, "a loop without a sensor heats without end",
                $"The {words} sensor gives no usable value ({{0}}).", $"Unplug the {words} sensor at the controller."));
            rows.Add(new($"over-temperature-{words}", input, InterlockCondition.AtMost, bench.Limits.OverTemperatureK, "K", 2, "sample, holder or insulation are destroyed; fire",
                $"The {words} is at {{0}} K, above the limit of {{1}} K.", "Lower 'over-temperature' below the present temperature on a cold bench."));
            rows.Add(new($"stale-{words}-sensor", input, InterlockCondition.Fresh, staleS, "s", 1, "the loop acts on a temperature that is no longer true",
                $"The last good {words} temperature is {{0}} s old; {{1}} s are allowed.", "Pull the controller's cable."));
        }

        rows.Add(Silent("silent-controller", InterlockInput.Controller, "temperature controller", pace));
        rows.Add(Silent("silent-meter", InterlockInput.Meter, "source-meter", pace));
        if (bench.Wiring.Lamp is not null)
        {
            rows.Add(Silent("silent-lamp", InterlockInput.Lamp, "lamp", pace));
        }

        rows.Add(new("record-lost", InterlockInput.Record, InterlockCondition.Writing, double.NaN, "", 1, "the night passes and nothing of it is kept",
            "The run file cannot be written: {0}", "Fill the disk."));
        return new(PresentVersion, rows, bench.Wiring.Loop.SensorFromK, bench.Wiring.Loop.SensorToK);
    }

    /// <summary>SHA-256 over every field of every row, hex.</summary>
    public string Sha256()
    {
        var text = new StringBuilder().Append(CultureInfo.InvariantCulture, $"{Version}|{SensorFromK:R}|{SensorToK:R}\n");
        foreach (var row in Rows)
        {
            text.Append(CultureInfo.InvariantCulture, $"{row.Id}|{row.Input}|{row.Condition}|{row.Threshold:R}|{row.Unit}|{row.Confirmations}|{row.Consequence}|{row.Text}|{row.HowToTest}\n");
        }

        return Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text.ToString())));
    }

    private static InterlockRow Silent(string id, InterlockInput input, string words, double pace) =>
        new(id, input, InterlockCondition.Answering, 10 * pace, "s", 1, "what it does cannot be known or changed",
            $"The {words} has not answered for {{0}} s; {{1}} s are allowed.", $"Switch the {words} off.");
}
