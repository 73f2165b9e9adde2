using System.Globalization;
using Acquire.App.Planning;
using Acquire.App.Processes;

namespace Acquire.App.Running;

/// <summary>Finds or starts the simulator of a bench: a process of its own that outlives the engine.</summary>
internal static class ServedBench
{
    /// <summary>A simulator that nobody stops ends by itself after so long.</summary>
    private const int LifetimeMin = 180;

    private static readonly TimeSpan StartBound = TimeSpan.FromSeconds(30);

    /// <summary>Where the instruments answer, or why they do not.</summary>
    public static async Task<(SimulatorNote? Note, string? Problem)> EnsureAsync(PreparedRun prepared, ulong seed, CancellationToken cancellation)
    {
        var key = SimulateCommand.KeyOf(prepared.Bench, seed);
        if (SimulatorNote.FindLive(key) is { } live)
        {
            return (live, null);
        }

        var (_, line) = await DetachedProcess.StartAsync(
            ["simulate", prepared.Bench.Source.File, "--seed", seed.ToString(CultureInfo.InvariantCulture), "--json", "--detached", "--lifetime", LifetimeMin.ToString(CultureInfo.InvariantCulture)],
            StartBound, cancellation);
        return SimulatorNote.FromJson(line) is { } note
            ? (note, null)
            : (null, $"{prepared.Bench.Source.File}: the simulator did not come up within {StartBound.TotalSeconds:F0} s. Try 'acquire simulate {prepared.Bench.Source.File}' and read what it says.");
    }
}
