using Acquire.Simulator.Instruments;
using Acquire.Simulator.Samples;
using Acquire.Simulator.Scpi;
using Acquire.Simulator.Thermal;

namespace Acquire.Simulator;

/// <summary>What the instruments of a bench share: the holder, the sample, the light, and the present.</summary>
/// <remarks>
/// Time begins with the first message that any instrument receives, so that a bench that has been waiting for its first
/// client is as it was switched on. From then on the state moves in steps of 0.1 s on a fixed grid, whenever somebody
/// asks: what is found depends on the time alone, not on how often it was asked for. Someone who comes back after more
/// than six hours finds what six hours have made of the bench, which is at rest long before that.
/// </remarks>
internal sealed class BenchPhysics(TimeProvider clock, HolderState holder, SampleState sample) : IBenchMoment
{
    private const double StepS = 0.1;
    private const long MostSteps = 6 * 3600 * 10;
    private long? _startTimestamp;
    private long _stepsDone;

    /// <summary>The controller; set once while the bench is built.</summary>
    public SimulatedController? Controller { get; set; }

    /// <summary>The lamp, if there is one; set once while the bench is built.</summary>
    public SimulatedLamp? Lamp { get; set; }

    /// <inheritdoc/>
    public Lock Gate { get; } = new();

    /// <inheritdoc/>
    public double AdvanceToNow()
    {
        _startTimestamp ??= clock.GetTimestamp();
        var nowS = clock.GetElapsedTime(_startTimestamp.Value).TotalSeconds;
        var wanted = (long)Math.Floor(nowS / StepS);
        if (wanted - _stepsDone > MostSteps) _stepsDone = wanted - MostSteps;
        for (; _stepsDone < wanted; _stepsDone++) Step(_stepsDone * StepS);
        return nowS;
    }

    private void Step(double nowS)
    {
        Controller?.Step(StepS);
        Lamp?.Step(nowS, StepS);
        sample.Step(Lamp?.IrradianceWPerM2 ?? 0, Lamp?.WavelengthM ?? 1e-6, StepS);
        holder.Step(Controller?.PowerW ?? 0, sample.HeatW, StepS);
    }
}
