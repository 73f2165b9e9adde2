using Acquire.Runs.Records;
using Acquire.Sweep.Measuring;

namespace Acquire.Sweep.Engine;

/// <summary>What an operator may ask of a running engine. Called on the loop.</summary>
public interface IEngineCommands
{
    /// <summary>Makes the bench safe at once; the run ends.</summary>
    string MakeSafe(string operatorName, string? reason);

    /// <summary>Ends the run safely.</summary>
    string Stop(string operatorName, string? reason);

    /// <summary>Keeps the temperature and pauses the sequence before its next step.</summary>
    string Hold(string operatorName, string? reason);

    /// <summary>Goes on after a hold.</summary>
    string Continue(string operatorName, string? reason);
}

/// <summary>The engine: one monitor loop, one sequence, one recorder, and one object that may energise.</summary>
public sealed class SweepEngine : IEngineCommands, IDisposable
{
    private readonly EngineSetup _setup;
    private readonly RunLog _log;
    private readonly BenchMonitor _monitor;
    private readonly OutputAuthority _outputs;
    private readonly Sequence _sequence;
    private readonly SequencePlace _place = new();
    private readonly CancellationTokenSource _sequenceEnd = new();
    private string _state = "starting";
    private string? _stopReason;
    private string? _fault;
    private TaskCompletionSource? _hold;

    public SweepEngine(EngineSetup setup)
    {
        _setup = setup;
        _log = new RunLog(setup.Recorder, setup.Loop.Clock, setup.OriginTimestamp, setup.Log);
        _monitor = new BenchMonitor(setup, _log);
        _outputs = new OutputAuthority(setup.Instruments, setup.Bench.Limits, _monitor.WhyNot, _log, setup.LinkClock, setup.Bench.Wiring.Lamp);
        _sequence = new Sequence(setup, _log, _outputs, _monitor, _place) { HoldAsync = WaitWhileHeldAsync };
        _monitor.Tripped = trips => EndSequence(null);
    }

    /// <summary>Runs the plan to its end, whatever that is; the bench is safe and the record sealed when it returns.</summary>
    public async Task<RunOutcome> RunAsync(CancellationToken cancellation)
    {
        _log.Event("state", Severity.Note, "engine", "The run starts.", $"{{\"interlocks\":\"{_setup.Interlocks.Sha256()}\"}}");
        _state = "running";
        using var stopped = cancellation.Register(() => _setup.Loop.Post(_ => Stop("the system", "it asked the program to end"), null));
        using var monitorEnd = new CancellationTokenSource();
        var monitoring = WatchAsync(monitorEnd.Token);
        var outcome = await SequenceAsync();
        _state = "ending";
        (_place.Phase, _place.Waiting) = ("safe", "");
        var safe = await _outputs.MakeSafeAsync(outcome.State == "completed" ? "the plan is done" : outcome.Reason);
        safe = safe || await _outputs.MakeSafeAsync("once more, because not every instrument confirmed");
        await LookOnceMoreAsync();
        monitorEnd.Cancel(); // not CancelAsync, which passes through the thread pool
        await monitoring;
        if (_fault is { } fault && outcome.State == "completed")
        {
            outcome = new("failed", fault);
        }

        if (!safe && outcome.State == "completed")
        {
            outcome = new("failed", "The plan is done, but not every instrument confirmed that it is off. Check the bench by hand.");
        }

        _log.Event("state", outcome.State == "completed" ? Severity.Note : Severity.Warning, "engine", $"The run ends: {outcome.State}. {outcome.Reason}");
        await SealAsync(outcome.State);
        _state = "ended: " + outcome.State;
        return outcome;
    }

    /// <summary>Where the run is now.</summary>
    public EngineStatus Status() => new()
    {
        State = _hold is null ? _state : "holding",
        Phase = _place.Phase,
        Leg = _place.Step?.Leg ?? 0,
        Legs = _setup.Plan.Steps.Max(step => step.Leg),
        Point = _place.Points,
        Points = _setup.Plan.Points,
        StageK = _monitor.Last.StageK,
        SampleK = _monitor.Last.SampleK,
        TargetK = _place.TargetK,
        TimeLeftS = _setup.Plan.Steps.Skip(_place.Step?.Index ?? 0).Sum(step => step.EstimateS),
        Committed = _log.Health.Committed,
        Waiting = _place.Waiting,
    };

    /// <inheritdoc/>
    public string MakeSafe(string operatorName, string? reason)
    {
        Command("make safe", operatorName, reason);
        var because = $"{operatorName} pressed make safe{(reason is null ? "" : ": " + reason)}";
        _ = _outputs.MakeSafeAsync(because); // recorded by itself; the end of the run waits for the same task
        EndSequence(because);
        return "Heater off, bias 0 and light off are on their way; the run ends.";
    }

    /// <inheritdoc/>
    public string Stop(string operatorName, string? reason)
    {
        Command("stop", operatorName, reason);
        EndSequence($"{operatorName} stopped the run{(reason is null ? "" : ": " + reason)}");
        return "The run ends safely: heater off, bias 0, light off.";
    }

    /// <inheritdoc/>
    public string Hold(string operatorName, string? reason)
    {
        Command("hold", operatorName, reason);
        _hold ??= new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously);
        return "The sequence pauses before its next step; the temperature is kept.";
    }

    /// <inheritdoc/>
    public string Continue(string operatorName, string? reason)
    {
        Command("continue", operatorName, reason);
        if (_hold is not { } held)
        {
            return "Nothing was held.";
        }

        _hold = null;
        held.TrySetResult();
        return "The sequence goes on.";
    }

    /// <inheritdoc/>
    public void Dispose() => _sequenceEnd.Dispose();

    private async Task SealAsync(string state)
    {
        try
        {
            await _setup.Recorder.SealAsync(state, CancellationToken.None);
        }
        catch (Exception fault)
        {
            _setup.Log.Log(Microsoft.Extensions.Logging.LogLevel.Error, default, fault, fault, (_, error) => "The record could not be sealed: " + error?.Message);
        }
    }

    /// <summary>The monitor under watch: when it ends by itself the bench is made safe, since nobody looks at it any more.</summary>
    private async Task WatchAsync(CancellationToken cancellation)
    {
        try
        {
            await _monitor.RunAsync(cancellation);
        }
        catch (Exception fault)
        {
            _fault = $"The monitor failed: {fault.Message}";
            _log.Event("fault", Severity.Trip, "monitor", _fault);
            _ = _outputs.MakeSafeAsync(_fault); // recorded by itself; the end of the run waits for the same task
            EndSequence(null);
        }
    }

    /// <summary>One more poll of the bench after it was made safe, for the record; a hanging instrument does not keep the run from ending.</summary>
    private async Task LookOnceMoreAsync()
    {
        try
        {
            var bound = Task.Delay(TimeSpan.FromSeconds(4 * _setup.Bench.MonitorPeriodS), _setup.Loop.Clock);
            await Task.WhenAny(_monitor.NextTickAsync(CancellationToken.None), bound);
        }
        catch (OperationCanceledException)
        {
            // The monitor has ended already.
        }
    }

    private async Task<RunOutcome> SequenceAsync()
    {
        try
        {
            await _monitor.NextTickAsync(_sequenceEnd.Token); // nothing is commanded before the first temperatures are known
            var early = await _sequence.RunAsync(_sequenceEnd.Token);
            return _monitor.Interlocks.FirstOut is { } trip ? new("tripped", trip.Text)
                : early is not null ? new("stopped", early)
                : _stopReason is { } stopped ? new("stopped", stopped) : new("completed", "Every step of the plan was done.");
        }
        catch (OperationCanceledException)
        {
            return Ended(null);
        }
        catch (StepFailedException failure)
        {
            return Ended(failure.Message);
        }
        catch (Exception unexpected)
        {
            _log.Event("fault", Severity.Alarm, "sequence", $"The sequence failed: {unexpected.GetType().Name}: {unexpected.Message}");
            return Ended($"The sequence failed: {unexpected.Message}");
        }
    }

    /// <summary>How a sequence that did not reach its end is told: a trip first, then a fault, then a person, then what failed.</summary>
    private RunOutcome Ended(string? failure) =>
        _monitor.Interlocks.FirstOut is { } trip ? new("tripped", trip.Text)
        : _fault is { } fault ? new("failed", fault)
        : _stopReason is { } stopped ? new("stopped", stopped)
        : failure is not null ? new("failed", failure) : new("stopped", "the sequence was cancelled");

    private void EndSequence(string? reason)
    {
        _stopReason ??= reason;
        if (_monitor.Interlocks.FirstOut is { } trip)
        {
            _ = _outputs.MakeSafeAsync(trip.Text); // recorded by itself; the end of the run waits for the same task
        }

        _sequenceEnd.Cancel();
        _monitor.Wake();
        _hold?.TrySetResult();
        _hold = null;
    }

    private void Command(string verb, string operatorName, string? reason) =>
        _log.Event("operator", Severity.Note, operatorName, $"{operatorName}: {verb}{(reason is null ? "" : " (" + reason + ")")}.");

    private async Task WaitWhileHeldAsync(CancellationToken cancellation)
    {
        if (_hold is { } held)
        {
            _place.Waiting = "held by an operator";
            await held.Task;
            _place.Waiting = "";
            cancellation.ThrowIfCancellationRequested();
        }
    }
}
