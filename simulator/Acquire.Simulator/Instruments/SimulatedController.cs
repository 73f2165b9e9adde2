using Acquire.Simulator.Noise;
using Acquire.Simulator.Scpi;
using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Instruments;

/// <summary>The device side of a temperature controller with two sensors and a heater.</summary>
internal sealed class SimulatedController
{
    private readonly ControllerModel _model;
    private readonly HolderState _holder;
    private readonly ControlLaw _law;
    private readonly SeededNoise _loopNoise;
    private readonly SeededNoise _readingNoise;

    public SimulatedController(ControllerModel model, HolderState holder, SeededNoise noise)
    {
        _model = model;
        _holder = holder;
        _law = new ControlLaw(model);
        // Two sequences, so that asking more often does not change what the heater does.
        _loopNoise = noise.For("loop");
        _readingNoise = noise.For("readings");
        Reset();
    }

    /// <summary>Heater power [W].</summary>
    public double PowerW => _law.PowerW;

    /// <summary>The commands, in SCPI-1999 form.</summary>
    public ScpiCommands Commands() => new ScpiCommands()
        .Add("MEASure[:SCALar]:TEMPerature?", ReplyTemperature)
        .Add("MEASure[:SCALar]:POWer?", call => { if (call.TryNothing()) call.Reply(_law.PowerW); })
        .Add("SOURce:TEMPerature:SPOint", SetTarget)
        .Add("SOURce:TEMPerature:SPOint?", call => { if (call.TryNothing()) call.Reply(Rounded(_law.WorkingK)); })
        .Add("SOURce:TEMPerature:SPOint:TARGet?", call => { if (call.TryNothing()) call.Reply(_law.TargetK, "R"); })
        .Add("SOURce:TEMPerature:RAMP", SetRamp)
        .Add("SOURce:TEMPerature:RAMP?", call => { if (call.TryNothing()) call.Reply(_law.RampKPerS * 60, "G12"); })
        .Add("OUTPut[:STATe]", call => { if (call.TryFlag(out var on)) _law.Switch(on, StageReadingK(_loopNoise)); })
        .Add("OUTPut[:STATe]?", call => { if (call.TryNothing()) call.Reply(_law.IsOn); });

    /// <summary>What *RST does: heater off, ramp at its fastest, target at the temperature of the start.</summary>
    public void Reset()
    {
        _law.Switch(false, _holder.StageK);
        _law.RampKPerS = _model.MostRampKPerS;
        _law.TargetK = Math.Clamp(_holder.Model.StartK, _model.SetFromK, _model.SetToK);
    }

    /// <summary>One sample of the control law.</summary>
    public void Step(double stepS) => _law.Step(StageReadingK(_loopNoise), stepS);

    private double StageReadingK(SeededNoise noise) => _holder.StageK + _model.StageOffsetK + (_model.SensorNoiseK * noise.NextNormal());

    private void ReplyTemperature(ScpiCall call)
    {
        if (!call.TryChannel(2, out var channel)) return;
        call.Reply(Rounded(channel == 1
            ? StageReadingK(_readingNoise)
            : _holder.SampleK + _model.SampleOffsetK + (_model.SensorNoiseK * _readingNoise.NextNormal())));
    }

    private void SetTarget(ScpiCall call)
    {
        if (call.TryNumber(_model.SetFromK, _model.SetToK, out var targetK)) _law.TargetK = targetK;
    }

    private void SetRamp(ScpiCall call)
    {
        // A limit given in K/min and stored in K/s must still be allowed after the round trip.
        if (call.TryNumber(0, _model.MostRampKPerS * 60 * (1 + 1e-9), out var rampKPerMin)) _law.RampKPerS = rampKPerMin / 60;
    }

    private double Rounded(double temperatureK) => Math.Round(temperatureK / _model.ResolutionK) * _model.ResolutionK;
}
