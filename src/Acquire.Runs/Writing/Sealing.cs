namespace Acquire.Runs.Writing;

/// <summary>Sealing, tried again while a reader stays.</summary>
internal static class Sealing
{
    private const int Tries = 40;
    private static readonly TimeSpan Between = TimeSpan.FromMilliseconds(250);

    /// <summary>Tries for up to ten seconds; an unsealed run is valid and readable, and is sealed by the next command that takes its lock.</summary>
    public static async ValueTask TryAsync(RunStore store, TimeProvider clock, CancellationToken cancellation)
    {
        for (var attempt = 0; attempt < Tries && !store.TrySeal() && !cancellation.IsCancellationRequested; attempt++)
        {
            await Task.Delay(Between, clock, CancellationToken.None);
        }
    }
}
