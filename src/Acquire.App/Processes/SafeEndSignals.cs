using System.Runtime.InteropServices;

namespace Acquire.App.Processes;

/// <summary>Turns Ctrl+C and SIGTERM into a request to end safely, and keeps a lost terminal (SIGHUP) from ending anything.</summary>
/// <remarks>A second signal does not cut the safe end short: only SIGKILL does, and then the file says that the run was cut.</remarks>
internal sealed class SafeEndSignals : IDisposable
{
    private readonly CancellationTokenSource _requested = new();
    private readonly List<PosixSignalRegistration> _registrations;

    public SafeEndSignals()
    {
        _registrations =
        [
            PosixSignalRegistration.Create(PosixSignal.SIGINT, Request),
            PosixSignalRegistration.Create(PosixSignal.SIGTERM, Request),
            PosixSignalRegistration.Create(PosixSignal.SIGQUIT, Request),
            PosixSignalRegistration.Create(PosixSignal.SIGHUP, context => context.Cancel = true),
        ];
    }

    /// <summary>Cancelled once somebody asked for the end.</summary>
    public CancellationToken Token => _requested.Token;

    /// <inheritdoc/>
    public void Dispose()
    {
        foreach (var registration in _registrations)
        {
            registration.Dispose();
        }

        _requested.Dispose();
    }

    private void Request(PosixSignalContext context)
    {
        context.Cancel = true;
        _requested.Cancel();
    }
}
