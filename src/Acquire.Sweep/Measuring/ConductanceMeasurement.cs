using Acquire.Bench.Readings;
using Acquire.Bench.Roles;
using Acquire.Runs.Plans;
using Acquire.Runs.Records;
using Acquire.Sweep.Engine;
using Acquire.Sweep.Gates;

namespace Acquire.Sweep.Measuring;

/// <summary>An instrument did not do what the sequence needs; the run ends safely.</summary>
public sealed class StepFailedException(string message) : Exception(message);

/// <summary>Measures a conductance by reversing the bias, on a range that is chosen before and locked.</summary>
public sealed class ConductanceMeasurement(EngineSetup setup, RunLog log, OutputAuthority outputs, BenchMonitor monitor)
{
    private const int DiscardedAfterChange = 2;
    private const int MostRangeChanges = 10;
    private const double LeastOfRange = 0.05;
    private double _configuredCycles = double.NaN;

    /// <summary>Switches the bias on, finds range and settling, measures, and leaves the bias off.</summary>
    public async ValueTask<ReversalResult> RunAsync(MeasureStep step, double expectedS, Action<string> waiting, CancellationToken cancellation)
    {
        monitor.MeterAnswered();
        monitor.MeterIsInUse = true;
        try
        {
            await PrepareAsync(step, cancellation);
            return await RangedAsync(step, expectedS, waiting, cancellation);
        }
        finally
        {
            await BiasOffAsync();
            monitor.MeterIsInUse = false;
        }
    }

    private async ValueTask<ReversalResult> RangedAsync(MeasureStep step, double expectedS, Action<string> waiting, CancellationToken cancellation)
    {
        var range = await FindRangeAsync(step, expectedS, cancellation);
        for (var repeat = 0; ; repeat++)
        {
            var result = await MeasureAsync(step, range, waiting, cancellation);
            var overrange = ((result.Plus.Faults | result.Minus.Faults) & Quality.Overrange) != 0;
            if (!overrange || repeat > 0 || range + 1 >= setup.Instruments.Meter.CurrentRangesA.Count)
            {
                return result;
            }

            range++;
            log.Event("range", Severity.Warning, setup.Instruments.Meter.Name, FormattableString.Invariant(
                $"Overload at {step.TemperatureK:F1} K: up to the {setup.Instruments.Meter.CurrentRangesA[range]:G3} A range, and the point is repeated."));
            await LockRangeAsync(range, cancellation);
        }
    }

    /// <summary>Bias 0 and output off, checked: a bias that stays on is a failure of the run.</summary>
    private async ValueTask BiasOffAsync()
    {
        if (outputs.IsClosed)
        {
            return; // the bench has been made safe already
        }

        var zero = await outputs.BiasAsync(0, CancellationToken.None);
        var off = await outputs.OutputAsync(false, CancellationToken.None);
        if (!off.Done && !outputs.IsClosed)
        {
            throw new StepFailedException($"The bias could not be switched off: {off.Problem ?? zero.Problem}");
        }
    }

    /// <summary>Mean of a few readings at positive bias [A], for watching a recovery; the bias stays on.</summary>
    public async ValueTask<double> WatchAsync(int readings, CancellationToken cancellation)
    {
        var series = new PolaritySeries();
        for (var i = 0; i < readings; i++)
        {
            series.Add(await ReadAsync(cancellation));
        }

        return series.CurrentA;
    }

    /// <summary>Sets integration and positive bias and switches the output on.</summary>
    public async ValueTask PrepareAsync(MeasureStep step, CancellationToken cancellation)
    {
        if (_configuredCycles != step.IntegrationCycles)
        {
            Need(await setup.Instruments.Meter.ConfigureAsync(setup.Bench.Limits.CurrentA, step.IntegrationCycles, cancellation));
            _configuredCycles = step.IntegrationCycles;
        }

        Need(await outputs.BiasAsync(step.BiasV, cancellation));
        Need(await outputs.OutputAsync(true, cancellation));
    }

    /// <summary>The range before the point: from what is expected, corrected by single readings until one lies well inside it.</summary>
    public async ValueTask<int> FindRangeAsync(MeasureStep step, double expectedS, CancellationToken cancellation)
    {
        var ranges = setup.Instruments.Meter.CurrentRangesA;
        var range = double.IsFinite(expectedS) ? RangeChoice.For(expectedS * step.BiasV, ranges) : ranges.Count - 1;
        for (var change = 0; change < MostRangeChanges; change++)
        {
            await LockRangeAsync(range, cancellation);
            var reading = await DiscardAsync(DiscardedAfterChange, cancellation);
            if ((reading.CurrentA.Quality & Quality.Overrange) != 0 && range + 1 < ranges.Count)
            {
                range++;
                continue;
            }

            if (!reading.CurrentA.IsGood || range == 0 || Math.Abs(reading.CurrentA.Value) >= LeastOfRange * ranges[range])
            {
                break;
            }

            var better = RangeChoice.For(reading.CurrentA.Value, ranges);
            if (better >= range)
            {
                break;
            }

            range = better;
        }

        return range;
    }

    private async ValueTask<ReversalResult> MeasureAsync(MeasureStep step, int range, Action<string> waiting, CancellationToken cancellation)
    {
        var plus = new PolaritySeries();
        var minus = new PolaritySeries();
        // The first pair finds out how long the signal needs after each polarity; the later pairs give it as long.
        var up = await SettleAsync(step, +1, waiting, cancellation);
        await SeriesAsync(step, plus, cancellation);
        var down = await SettleAsync(step, -1, waiting, cancellation);
        await SeriesAsync(step, minus, cancellation);
        waiting("");
        var discarded = Math.Max(up.Discard, down.Discard);
        for (var pair = 1; pair < step.Reversals; pair++)
        {
            await ReverseAsync(step, +1, discarded, cancellation);
            await SeriesAsync(step, plus, cancellation);
            await ReverseAsync(step, -1, discarded, cancellation);
            await SeriesAsync(step, minus, cancellation);
        }

        return new(plus, minus, setup.Instruments.Meter.CurrentRangesA[range], Math.Max(up.SettleS, down.SettleS), up.Settled && down.Settled);
    }

    private async ValueTask<Settling> SettleAsync(MeasureStep step, int sign, Action<string> waiting, CancellationToken cancellation)
    {
        Need(await outputs.BiasAsync(sign * step.BiasV, cancellation));
        await DiscardAsync(DiscardedAfterChange, cancellation);
        var test = new SettledSignal(step.SettledWindow, step.SettledRelative);
        var startS = log.NowS;
        var readings = 0;
        waiting("signal settling");
        while (!test.IsSettled && log.NowS - startS <= step.SettleTimeOutS)
        {
            var reading = await ReadAsync(cancellation);
            readings++;
            test.Add(reading.CurrentA.IsGood ? reading.CurrentA.Value : double.NaN);
            if ((reading.CurrentA.Quality & Quality.Overrange) != 0)
            {
                break; // the range is wrong: the caller changes it
            }
        }

        // A signal that passes at the first chance needs no more than the discarded readings; a slow one needs its whole wait again.
        var discard = readings <= 3 * step.SettledWindow ? DiscardedAfterChange : readings;
        return new(test.IsSettled, log.NowS - startS, discard);
    }

    private async ValueTask ReverseAsync(MeasureStep step, int sign, int discarded, CancellationToken cancellation)
    {
        Need(await outputs.BiasAsync(sign * step.BiasV, cancellation));
        await DiscardAsync(discarded, cancellation);
    }

    private async ValueTask SeriesAsync(MeasureStep step, PolaritySeries series, CancellationToken cancellation)
    {
        for (var i = 0; i < step.Readings; i++)
        {
            series.Add(await ReadAsync(cancellation));
        }
    }

    private async ValueTask LockRangeAsync(int range, CancellationToken cancellation) =>
        Need(await setup.Instruments.Meter.SetRangeAsync(setup.Instruments.Meter.CurrentRangesA[range], cancellation));

    /// <summary>Readings that are recorded and not used: the transient of a change passes. Returns the last.</summary>
    private async ValueTask<SourceReading> DiscardAsync(int count, CancellationToken cancellation)
    {
        var last = default(SourceReading);
        for (var i = 0; i < count; i++)
        {
            last = await ReadAsync(cancellation);
        }

        return last;
    }

    private async ValueTask<SourceReading> ReadAsync(CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        var from = log.NowUs;
        var reading = await setup.Instruments.Meter.ReadAsync(cancellation);
        var to = log.NowUs;
        log.Reading(EngineChannels.Current, from, to, reading.CurrentA);
        log.Reading(EngineChannels.Voltage, from, to, reading.VoltageV);
        if ((reading.CurrentA.Quality & (Quality.TimedOut | Quality.LinkFailed)) == 0)
        {
            monitor.MeterAnswered();
        }

        return reading;
    }

    private readonly record struct Settling(bool Settled, double SettleS, int Discard);

    private static void Need(CommandOutcome outcome)
    {
        if (!outcome.Done)
        {
            throw new StepFailedException(outcome.Problem ?? "An instrument refused a command without a reason.");
        }
    }
}
