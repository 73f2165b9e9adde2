using System.Globalization;
using Acquire.Bench.Readings;
using Acquire.Bench.Roles;
using Acquire.Drivers.Files;
using Acquire.Wire;

namespace Acquire.Drivers.Instruments;

/// <summary>What all text instruments do alike: identify, set and check, poll, make safe.</summary>
/// <param name="name">The name in the bench file.</param>
/// <param name="driver">How to talk to it.</param>
/// <param name="exchange">The link it is reached by.</param>
/// <param name="timeOut">The longest wait for one answer.</param>
internal sealed class InstrumentTalk(string name, DriverFile driver, TextExchange exchange, TimeSpan timeOut) : IAsyncDisposable
{
    // Enough to empty the queue of any instrument met; a queue that never empties is itself a fault.
    private const int MostErrors = 32;
    private const int SafeAttempts = 2;

    public string Name => name;

    public string Address => exchange.Address;

    public async ValueTask<Identification> IdentifyAsync(CancellationToken cancellation)
    {
        var reply = await exchange.AskAsync(driver.Identity.Ask, timeOut, cancellation);
        if (!reply.IsGood) return new Identification(false, null, $"{name}: {reply.Problem}");
        if (!driver.Identity.Matches(reply.Text))
            return new Identification(false, reply.Text, $"{name} ({Address}) is not what driver '{driver.Name}' expects: '{driver.Identity.Ask}' was answered '{reply.Text}'; expected something like {driver.Identity.Expect}. Correct the address or the driver in the bench file.");
        exchange.ResynchroniseBy(driver.Identity.Ask, reply.Text);
        foreach (var command in driver.Start)
        {
            var sent = await exchange.SendAsync(command, timeOut, cancellation);
            if (!sent.IsGood) return new Identification(false, reply.Text, $"{name}: {sent.Problem}");
        }
        // Errors from before our time are nobody's setting; they are read away so that the next one is not blamed for them.
        if (driver.Errors is { } errors) await DrainErrorsAsync(errors, [], cancellation);
        return new Identification(true, reply.Text, null);
    }

    public ValueTask<CommandOutcome> SetAsync(Setting setting, double siValue, CancellationToken cancellation)
    {
        if (!double.IsFinite(siValue))
            return ValueTask.FromResult(CommandOutcome.Failed($"{name} ({Address}): '{setting.Send}' was not sent: the value is not a finite number."));
        var value = setting.Scale.FromSI(siValue);
        var text = setting.Decimals is { } decimals
            ? value.ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture)
            : value.ToString("G12", CultureInfo.InvariantCulture);
        return CommandAsync(setting.Send.Replace("{value}", text, StringComparison.Ordinal), cancellation);
    }

    public ValueTask<CommandOutcome> SwitchAsync(Switch control, bool on, CancellationToken cancellation) =>
        CommandAsync(control.Send.Replace("{value}", on ? control.On : control.Off, StringComparison.Ordinal), cancellation);

    /// <summary>Sends a command and looks into the error queue with nothing between them.</summary>
    public async ValueTask<CommandOutcome> CommandAsync(string command, CancellationToken cancellation)
    {
        if (driver.Errors is not { } errors)
        {
            var sent = await exchange.SendAsync(command, timeOut, cancellation);
            return sent.IsGood ? CommandOutcome.Ok : CommandOutcome.Failed($"{name}: {sent.Problem}");
        }
        var reply = await exchange.SendThenAskAsync(command, errors.Ask, timeOut, cancellation);
        if (!reply.IsGood) return CommandOutcome.Failed($"{name}: whether '{command}' was taken is not known: {reply.Problem}");
        if (errors.Matches(reply.Text)) return CommandOutcome.Ok;
        List<string> found = [reply.Text];
        await DrainErrorsAsync(errors, found, cancellation);
        return CommandOutcome.Failed($"{name} ({Address}) refused '{command}': it reports {string.Join("; ", found)}. Check the value against the instrument's limits and the driver '{driver.Name}'.");
    }

    /// <summary>Asks for a poll's numbers.</summary>
    public ValueTask<Reply> AskAsync(Poll poll, CancellationToken cancellation) => exchange.AskAsync(poll.Ask, timeOut, cancellation);

    /// <summary>Abandons what is in flight and runs the driver's make-safe sequence, the whole of it even when a step fails.</summary>
    public async ValueTask<CommandOutcome> MakeSafeAsync(CancellationToken cancellation)
    {
        using var seizure = await exchange.SeizeAsync(cancellation);
        List<string> problems = [];
        for (var attempt = 0; attempt < SafeAttempts; attempt++)
        {
            problems.Clear();
            foreach (var step in driver.MakeSafe)
                if (await SafeProblemAsync(seizure, step, cancellation) is { } problem) problems.Add(problem);
            if (problems.Count == 0) return CommandOutcome.Ok;
        }
        return CommandOutcome.Failed($"{name} ({Address}) is NOT known to be safe: {string.Join(" ", problems)} Switch its output off by hand.");
    }

    public ValueTask DisposeAsync() => exchange.DisposeAsync();

    /// <summary>Why an exchange gave no numbers, as a quality.</summary>
    public static Quality QualityOf(ReplyState state) => state switch
    {
        ReplyState.TimedOut => Quality.TimedOut,
        ReplyState.LinkFailed or ReplyState.Aborted or ReplyState.Refused => Quality.LinkFailed,
        _ => Quality.Unreadable,
    };

    private async ValueTask<string?> SafeProblemAsync(Seizure seizure, SafeStep step, CancellationToken cancellation)
    {
        if (step.Send is { } command)
        {
            var sent = await seizure.SendAsync(command, timeOut, cancellation);
            return sent.IsGood ? null : sent.Problem;
        }
        if (step.ReadBack is not { } check) return null;
        var reply = await seizure.AskAsync(check.Ask, timeOut, cancellation);
        if (!reply.IsGood) return reply.Problem;
        return check.Matches(reply.Text) ? null : $"'{check.Ask}' was answered '{reply.Text}', expected {check.Expect}.";
    }

    private async ValueTask DrainErrorsAsync(Check errors, List<string> found, CancellationToken cancellation)
    {
        for (var i = 0; i < MostErrors; i++)
        {
            var reply = await exchange.AskAsync(errors.Ask, timeOut, cancellation);
            if (!reply.IsGood || errors.Matches(reply.Text)) return;
            found.Add(reply.Text);
        }
    }
}
