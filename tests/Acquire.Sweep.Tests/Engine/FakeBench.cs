using Acquire.Bench.Files;
using Acquire.Bench.Readings;
using Acquire.Bench.Roles;
using Acquire.Bench.Text;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;

namespace Acquire.Sweep.Tests.Engine;

/// <summary>What every fake instrument shares: a list of what it was told, and make-safe.</summary>
internal abstract class FakeInstrument(string name, List<string> told) : IInstrument
{
    public string Name => name;

    public string Address => "SIM::" + name + "::INSTR";

    public int MadeSafe { get; private set; }

    public Func<CommandOutcome> OnMakeSafe { get; set; } = () => CommandOutcome.Ok;

    public ValueTask<Identification> IdentifyAsync(CancellationToken cancellation) => new(new Identification(true, "a,b,c,d", null));

    public ValueTask<CommandOutcome> MakeSafeAsync(CancellationToken cancellation)
    {
        MadeSafe++;
        var outcome = OnMakeSafe();
        told.Add($"{name} safe");
        if (outcome.Done)
        {
            SwitchedOff();
        }

        return new(outcome);
    }

    public ValueTask DisposeAsync() => ValueTask.CompletedTask;

    protected abstract void SwitchedOff();
}

internal sealed class FakeLoop(List<string> told) : FakeInstrument("controller", told), ITemperatureLoop
{
    private readonly List<string> _told = told;

    public bool HeaterOn { get; private set; }

    public double TargetK { get; private set; } = 300;

    public int Polls { get; private set; }

    public Action<bool> OnHeater { get; set; } = _ => { };

    /// <summary>Replaces the answer of a poll, by its number from 1.</summary>
    public Func<int, double, CancellationToken, ValueTask<LoopReading>> OnRead { get; set; } = (_, targetK, _) => new(Steady(targetK));

    public static LoopReading Steady(double temperatureK) =>
        new(Measured.Good(temperatureK), Measured.Good(temperatureK), Measured.Good(temperatureK), Measured.Good(5));

    public ValueTask<LoopReading> ReadAsync(CancellationToken cancellation) => OnRead(++Polls, TargetK, cancellation);

    public ValueTask<CommandOutcome> SetPointAsync(double temperatureK, double rampKPerS, CancellationToken cancellation)
    {
        TargetK = temperatureK;
        return new(CommandOutcome.Ok);
    }

    public ValueTask<CommandOutcome> HeaterAsync(bool on, CancellationToken cancellation)
    {
        OnHeater(on);
        HeaterOn = on;
        _told.Add($"heater {on}");
        return new(CommandOutcome.Ok);
    }

    protected override void SwitchedOff() => HeaterOn = false;
}

internal sealed class FakeMeter(List<string> told, TimeProvider clock) : FakeInstrument("meter", told), ISourceMeter
{
    private double _signA;
    private double _biasV;
    private double _changedS = double.NegativeInfinity;

    public IReadOnlyList<double> CurrentRangesA { get; } = [1e-6, 1e-5, 1e-4, 1e-3, 1e-2];

    public bool OutputOn { get; private set; }

    /// <summary>Time constant with which the current follows a change of bias [s].</summary>
    public double TimeConstantS { get; set; }

    public double ConductanceS { get; set; } = 1e-5;

    public Func<SourceReading>? OnRead { get; set; }

    private double NowS => clock.GetElapsedTime(0).TotalSeconds;

    public ValueTask<CommandOutcome> ConfigureAsync(double currentLimitA, double integrationCycles, CancellationToken cancellation) => new(CommandOutcome.Ok);

    public ValueTask<CommandOutcome> SetRangeAsync(double fullScaleA, CancellationToken cancellation) => new(CommandOutcome.Ok);

    public ValueTask<CommandOutcome> SetBiasAsync(double biasV, CancellationToken cancellation)
    {
        _signA = CurrentNowA();
        (_biasV, _changedS) = (biasV, NowS);
        return new(CommandOutcome.Ok);
    }

    public ValueTask<CommandOutcome> OutputAsync(bool on, CancellationToken cancellation)
    {
        OutputOn = on;
        return new(CommandOutcome.Ok);
    }

    public async ValueTask<SourceReading> ReadAsync(CancellationToken cancellation)
    {
        await Task.Delay(TimeSpan.FromSeconds(0.2), clock, cancellation);
        return OnRead?.Invoke() ?? new(Measured.Good(CurrentNowA()), Measured.Good(_biasV));
    }

    protected override void SwitchedOff() => (OutputOn, _biasV) = (false, 0);

    private double CurrentNowA()
    {
        var finalA = ConductanceS * _biasV;
        return TimeConstantS > 0 && double.IsFinite(_changedS) ? finalA + ((_signA - finalA) * Math.Exp(-(NowS - _changedS) / TimeConstantS)) : finalA;
    }
}

internal sealed class FakeLamp(List<string> told) : FakeInstrument("lamp", told), ILamp
{
    public bool On { get; private set; }

    public double DriveA { get; private set; }

    public bool RefusesToSwitchOff { get; set; }

    public ValueTask<CommandOutcome> SetDriveAsync(double driveA, CancellationToken cancellation)
    {
        DriveA = driveA;
        return new(CommandOutcome.Ok);
    }

    public ValueTask<CommandOutcome> OutputAsync(bool on, CancellationToken cancellation)
    {
        if (!on && RefusesToSwitchOff)
        {
            return new(CommandOutcome.Failed("lamp: the output stayed on"));
        }

        On = on;
        return new(CommandOutcome.Ok);
    }

    public ValueTask<LampReading> ReadAsync(CancellationToken cancellation) =>
        new(new LampReading(Measured.Good(On ? DriveA : 0), Measured.Good(On ? 1e-6 : 0)));

    protected override void SwitchedOff() => On = false;
}

/// <summary>A record in memory.</summary>
internal sealed class MemoryRecorder : IRunRecorder
{
    public List<RunEvent> Events { get; } = [];

    public List<PointRecord> Points { get; } = [];

    public List<Reading> Readings { get; } = [];

    public string? EndState { get; private set; }

    public RecorderHealth Health => new(Readings.Count, Readings.Count, null);

    public void Append(in Reading reading) => Readings.Add(reading);

    /// <summary>Called before an event is kept; may throw, as a recorder with a broken contract does.</summary>
    public Action<RunEvent>? OnEvent { get; set; }

    public void Append(RunEvent record)
    {
        OnEvent?.Invoke(record);
        Events.Add(record);
    }

    public void Append(PointRecord point) => Points.Add(point);

    public ValueTask CommitAsync(CancellationToken cancellation) => ValueTask.CompletedTask;

    public ValueTask SealAsync(string endState, CancellationToken cancellation)
    {
        EndState = endState;
        return ValueTask.CompletedTask;
    }

    public ValueTask DisposeAsync() => ValueTask.CompletedTask;
}

internal static class InventedBench
{
    public static BenchFile File { get; } = BenchFile.Parse(new SourceText("b.bench.yaml", """
        bench: a small bench (invented)
        site: { line frequency: 50 Hz }
        instruments:
          c: { driver: d, address: "TCPIP::h::1::SOCKET" }
          m: { driver: d, address: "TCPIP::h::2::SOCKET" }
          l: { driver: d, address: "TCPIP::h::3::SOCKET" }
        wiring:
          temperature loop: { instrument: c, stage uncertainty: 0.1 K, sample uncertainty: 0.1 K, sensor range: { from: 60 K, to: 500 K } }
          source-meter: { instrument: m }
          lamp: { instrument: l, wavelength: 940 nm, rated drive: 0.5 A, irradiance at rated drive: 5 mW/cm2 }
        limits: { temperature: { from: 77 K, to: 420 K }, over-temperature: 440 K, ramp: 10 K/min, heater power: 50 W, bias: 10 V, current: 10 mA, irradiance: 10 mW/cm2 }
        """)).Value!;
}
