using System.Globalization;
using Acquire.Bench.Files;
using Acquire.Bench.Text;
using Acquire.Physics;
using Acquire.Simulator.Instruments;
using Acquire.Simulator.Noise;
using Acquire.Simulator.Samples;
using Acquire.Simulator.Scpi;
using Acquire.Simulator.Thermal;
using Acquire.Simulator.Twins;
using Acquire.Wire;

namespace Acquire.Simulator;

/// <summary>The instruments of a bench with the physics behind them, as the other ends of wires.</summary>
public sealed class SimulatedBench
{
    private readonly Dictionary<string, IDevicePort> _ports = new(StringComparer.Ordinal);
    private readonly HolderState _holder;
    private readonly SampleState _sample;
    private readonly BenchPhysics _physics;

    /// <summary>Builds the instruments that the wiring of a bench names, after its twin.</summary>
    /// <param name="bench">Names and roles of the instruments, and the nominal line frequency.</param>
    /// <param name="twin">The true values.</param>
    /// <param name="seed">Decides all noise: the same seed and the same questions at the same times give the same replies.</param>
    /// <param name="clock">The time of the bench; a virtual or a scaled one as well.</param>
    public SimulatedBench(BenchFile bench, TwinModel twin, ulong seed, TimeProvider clock)
    {
        ArgumentNullException.ThrowIfNull(bench);
        ArgumentNullException.ThrowIfNull(twin);
        ArgumentNullException.ThrowIfNull(clock);
        var material = Material.Find(twin.Sample.Material)
            ?? throw new ArgumentException($"No material set '{twin.Sample.Material}'. The twin file should have been refused.", nameof(twin));
        var noise = new SeededNoise(seed);
        _holder = new HolderState(twin.Holder);
        _sample = new SampleState(twin.Sample, new NeutralBulk(twin.Sample, material), _holder);
        _physics = new BenchPhysics(clock, _holder, _sample);
        AddController(bench, twin, noise.For("controller"), seed);
        AddMeter(bench, twin, noise.For("meter"), seed);
        AddLamp(bench, twin, noise.For("lamp"), seed);
    }

    /// <summary>The instruments that can be spoken to.</summary>
    public IReadOnlyCollection<string> InstrumentNames => _ports.Keys;

    /// <summary>True when the bench named no twin and one was made up from its ratings; whoever shows results says so.</summary>
    public bool IsTwinMadeUp { get; private init; }

    /// <summary>Reads the twin file that a bench file names, or makes up a twin where it names none, and builds the bench from it.</summary>
    public static Parsed<SimulatedBench> Open(BenchFile bench, ulong seed, TimeProvider clock)
    {
        ArgumentNullException.ThrowIfNull(bench);
        if (bench.TwinFile is null) return Parsed.Good(new SimulatedBench(bench, DefaultTwin.For(bench), seed, clock) { IsTwinMadeUp = true });
        var twin = TwinFile.Beside(bench);
        return twin.Value is null ? Parsed.Bad<SimulatedBench>(twin.Diagnostics) : Parsed.Good(new SimulatedBench(bench, twin.Value.Model, seed, clock));
    }

    /// <summary>The device side of an instrument, by its name in the bench file.</summary>
    public IDevicePort PortFor(string instrumentName) =>
        _ports.TryGetValue(instrumentName, out var port)
            ? port
            : throw new ArgumentException(
                $"The simulated bench has no instrument '{instrumentName}'. It has: {string.Join(", ", _ports.Keys)}.", nameof(instrumentName));

    /// <summary>What no instrument knows: the state of the bench at the present, for tests.</summary>
    public BenchTruth Truth()
    {
        lock (_physics.Gate)
        {
            _physics.AdvanceToNow();
            return new BenchTruth(_holder.StageK, _holder.SampleK, _sample.ConductanceS, _physics.Lamp?.IrradianceWPerM2 ?? 0);
        }
    }

    private void AddController(BenchFile bench, TwinModel twin, SeededNoise noise, ulong seed)
    {
        var controller = new SimulatedController(twin.Controller, _holder, noise);
        _physics.Controller = controller;
        Add(bench.Wiring.Loop.Instrument, Identity("TEMPERATURE CONTROLLER", seed), controller.Commands(), controller.Reset);
    }

    private void AddMeter(BenchFile bench, TwinModel twin, SeededNoise noise, ulong seed)
    {
        var meter = new SimulatedMeter(twin.Meter, _sample, bench.LineFrequencyHz, noise);
        Add(bench.Wiring.Meter.Instrument, Identity("SOURCE-METER", seed), meter.Commands(), meter.Reset);
    }

    private void AddLamp(BenchFile bench, TwinModel twin, SeededNoise noise, ulong seed)
    {
        if (bench.Wiring.Lamp is null || twin.Lamp is null) return;
        var lamp = new SimulatedLamp(twin.Lamp, noise);
        _physics.Lamp = lamp;
        Add(bench.Wiring.Lamp.Instrument, Identity("LAMP", seed), lamp.Commands(), lamp.Reset);
    }

    private void Add(string name, string identity, ScpiCommands commands, Action reset) =>
        _ports.Add(name, new ScpiDevice(identity, commands, reset, _physics));

    private static string Identity(string what, ulong seed) =>
        string.Create(CultureInfo.InvariantCulture, $"ACQUIRE,SIMULATED {what},S{seed},1");
}

/// <summary>The true state of a simulated bench.</summary>
/// <param name="StageK">Stage temperature [K].</param>
/// <param name="SampleK">Sample temperature [K].</param>
/// <param name="ConductanceS">Conductance between the terminals of the sample [S].</param>
/// <param name="IrradianceWPerM2">Irradiance on the sample [W/m2].</param>
public readonly record struct BenchTruth(double StageK, double SampleK, double ConductanceS, double IrradianceWPerM2);
