using Acquire.Runs.Chain;
using Acquire.Runs.Records;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Files;

/// <summary>What a check of a run file found.</summary>
/// <param name="Path">The file.</param>
/// <param name="State">Its state in words.</param>
/// <param name="ChainHead">Head of the last whole block, hex.</param>
/// <param name="Blocks">Whole blocks.</param>
/// <param name="Readings">Readings.</param>
/// <param name="Points">Points.</param>
/// <param name="Events">Events.</param>
/// <param name="UnchainedReadings">Readings after the last whole block: normal in a run that was cut or is live.</param>
/// <param name="Findings">Everything that is wrong; empty when the file is sound.</param>
public sealed record VerifyReport(
    string Path, string State, string ChainHead, long Blocks, long Readings, long Points, long Events, long UnchainedReadings, IReadOnlyList<string> Findings)
{
    /// <summary>True when nothing is wrong.</summary>
    public bool IsSound => Findings.Count == 0;
}

/// <summary>Checks a run file: SQLite's own check, the hash chain from its first block, ranges, order of time and the texts' hashes.</summary>
public static class RunVerifier
{
    /// <summary>Checks; a file that cannot be opened at all gives the opening's problem instead of a report.</summary>
    public static (VerifyReport? Report, string? Problem) Verify(string path)
    {
        var opening = RunReader.Open(path);
        if (opening.Reader is null)
        {
            return (null, opening.Problem);
        }

        using var reader = opening.Reader;
        try
        {
            return (Check(reader), null);
        }
        catch (Exception damage) when (damage is SqliteException or InvalidCastException or InvalidOperationException)
        {
            return (new(path, reader.State, "", 0, 0, 0, 0, 0, [$"the file is damaged: {damage.Message}"]), null);
        }
    }

    private static VerifyReport Check(RunReader reader)
    {
        var findings = new List<string>(reader.Integrity());
        var texts = reader.Header.Texts;
        var chain = new ChainHead();
        long blocks = 0;
        long lastReading = 0;
        var time = new TimeOrder();
        var points = reader.Points().ToDictionary(point => (long)point.Index);
        var events = reader.Events().ToDictionary(entry => entry.Id, entry => entry.Event);
        long seenEvents = 0;
        long seenPoints = 0;
        foreach (var block in reader.Blocks())
        {
            blocks++;
            if (block.First is { } first && block.Last is { } last)
            {
                AddReadings(reader, chain, time, (first, last), lastReading, findings);
                lastReading = last;
            }

            if (block.ClosedBy == "event" && block.Row is { } eventId && events.TryGetValue(eventId, out var record))
            {
                ChainRecord.Add(chain.Block, record);
                seenEvents++;
            }
            else if (block.ClosedBy == "point" && block.Row is { } pointId && points.TryGetValue(pointId, out var point))
            {
                ChainRecord.Add(chain.Block, point);
                seenPoints++;
            }

            if (chain.Close() != block.Head)
            {
                findings.Add($"block {blocks} (readings {block.First} to {block.Last}, closed by {block.ClosedBy} {block.Row}) does not match its hash: something in it was changed");
                break;
            }
        }

        var readings = reader.Count(RunTable.Readings);
        if (seenEvents < events.Count || seenPoints < points.Count)
        {
            findings.Add($"{events.Count - seenEvents} events and {points.Count - seenPoints} points are covered by no whole block");
        }

        if (reader.State.StartsWith("ended", StringComparison.Ordinal) && reader.Value("chain_head") is { } sealedHead && sealedHead != chain.Hex)
        {
            findings.Add($"the chain ends at {chain.Hex[..16]}..., the file was sealed at {sealedHead[..16]}...: rows are missing at the end");
        }

        foreach (var text in texts.Where(text => reader.TextHash(text) != text.Sha256))
        {
            findings.Add($"the {text.Role} text '{text.Name}' does not match its hash");
        }

        findings.AddRange(time.Findings);
        return new(reader.Path, reader.State, chain.Hex, blocks, readings, points.Count, events.Count, readings - lastReading, findings);
    }

    private static void AddReadings(RunReader reader, ChainHead chain, TimeOrder time, (long First, long Last) range, long before, List<string> findings)
    {
        if (range.First != before + 1)
        {
            findings.Add($"readings {before + 1} to {range.First - 1} are missing");
        }

        var rows = reader.Readings(range.First - 1, (int)(range.Last - range.First + 1));
        if (rows.Count != range.Last - range.First + 1)
        {
            findings.Add($"{range.Last - range.First + 1 - rows.Count} readings between {range.First} and {range.Last} are missing");
        }

        foreach (var (_, reading) in rows)
        {
            ChainRecord.Add(chain.Block, reading);
            time.Add(reading);
        }
    }

    /// <summary>Monotonic time may not run backwards within a channel.</summary>
    private sealed class TimeOrder
    {
        private readonly Dictionary<int, long> _last = [];

        public List<string> Findings { get; } = [];

        public void Add(in Reading reading)
        {
            if (_last.TryGetValue(reading.Channel, out var last) && reading.TimeUs < last && Findings.Count < 5)
            {
                Findings.Add($"the monotonic time of channel {reading.Channel} runs backwards from {last} us to {reading.TimeUs} us");
            }

            _last[reading.Channel] = reading.TimeUs;
        }
    }
}
