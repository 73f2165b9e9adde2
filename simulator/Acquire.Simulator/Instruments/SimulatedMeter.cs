using Acquire.Simulator.Noise;
using Acquire.Simulator.Scpi;

namespace Acquire.Simulator.Instruments;

/// <summary>The device side of a source-meter: applies a voltage, measures the current that flows.</summary>
/// <remarks>
/// The current approaches its steady value with time constant R C (at least that of the instrument). A reading is the
/// mean over its integration time, with thermal, shot, input and 1/f noise, and with what the mains leave in it when the
/// integration is not a whole number of their cycles. READ? takes twice the integration time: one for the reading, one
/// for the instrument's own zero.
/// </remarks>
internal sealed class SimulatedMeter
{
    private const double Overload = 9.91e37;

    // Keeps an open circuit from dividing by zero.
    private const double LeastConductanceS = 1e-18;
    private readonly MeterModel _model;
    private readonly IConductor _sample;
    private readonly double _nominalLineHz;
    private readonly SeededNoise _noise;
    private readonly FlickerNoise _flicker;
    private readonly MeterSettings _settings = new();
    private readonly SettlingCurrent _current = new();
    private double _glitchA;
    private double _glitchAtS;

    public SimulatedMeter(MeterModel model, IConductor sample, double nominalLineHz, SeededNoise noise)
    {
        _model = model;
        _sample = sample;
        _nominalLineHz = nominalLineHz;
        _noise = noise.For("readings");
        _flicker = new FlickerNoise(noise.For("flicker"), 0.1, 1000);
        _settings.Reset();
    }

    /// <summary>The commands, in SCPI-1999 form.</summary>
    public ScpiCommands Commands() => new ScpiCommands()
        .Add("SOURce:VOLTage[:LEVel]", SetVoltage)
        .Add("SOURce:VOLTage[:LEVel]?", call => { if (call.TryNothing()) call.Reply(_settings.VoltageV, "R"); })
        .Add("SENSe:CURRent[:DC]:RANGe[:UPPer]", SetRange)
        .Add("SENSe:CURRent[:DC]:RANGe[:UPPer]?", call => { if (call.TryNothing()) call.Reply(_settings.RangeA, "E1"); })
        .Add("SENSe:CURRent[:DC]:RANGe:AUTO", call => { if (call.TryFlag(out var on)) _settings.IsAutomatic = on; })
        .Add("SENSe:CURRent[:DC]:RANGe:AUTO?", call => { if (call.TryNothing()) call.Reply(_settings.IsAutomatic); })
        .Add("SENSe:CURRent[:DC]:PROTection[:LEVel]", SetLimit)
        .Add("SENSe:CURRent[:DC]:PROTection[:LEVel]?", call => { if (call.TryNothing()) call.Reply(_settings.LimitA, "R"); })
        .Add("SENSe:CURRent[:DC]:NPLCycles", call => { if (call.TryNumber(0.01, 10, out var cycles)) _settings.LineCycles = cycles; })
        .Add("SENSe:CURRent[:DC]:NPLCycles?", call => { if (call.TryNothing()) call.Reply(_settings.LineCycles, "R"); })
        .Add("OUTPut[:STATe]", Switch)
        .Add("OUTPut[:STATe]?", call => { if (call.TryNothing()) call.Reply(_settings.IsOn); })
        .Add("READ?", call => { if (call.TryNothing()) Read(call); });

    /// <summary>What *RST does: output off, 0 V, autorange, one line cycle.</summary>
    public void Reset()
    {
        _settings.Reset();
        Heat();
    }

    private void SetVoltage(ScpiCall call)
    {
        if (!call.TryNumber(-_model.MostVoltageV, _model.MostVoltageV, out var voltageV)) return;
        Settle(call.StartS);
        _settings.VoltageV = voltageV;
        Heat();
    }

    private void Switch(ScpiCall call)
    {
        if (!call.TryFlag(out var on)) return;
        Settle(call.StartS);
        _settings.IsOn = on;
        Heat();
    }

    private void SetRange(ScpiCall call)
    {
        if (!call.TryNumber(0, MeterSettings.RangesA[^1], out var wantedA)) return;
        _settings.IsAutomatic = false;
        ChangeRange(MeterSettings.RangeFor(wantedA), call.StartS);
    }

    private void SetLimit(ScpiCall call)
    {
        if (call.TryNumber(MeterSettings.RangesA[0], MeterSettings.RangesA[^1] * MeterSettings.Headroom, out var limitA)) _settings.LimitA = limitA;
    }

    private void Read(ScpiCall call)
    {
        var startS = call.StartS;
        var integrationS = _settings.LineCycles / _nominalLineHz;
        var (steadyA, inCompliance) = SteadyCurrent();
        Heat();
        _current.MoveTo(startS, steadyA, TimeConstantS());
        var meanA = _current.MeanOver(integrationS, steadyA, TimeConstantS());
        _current.MoveTo(startS + (2 * integrationS), steadyA, TimeConstantS());
        if (_settings.IsAutomatic) ChangeRange(MeterSettings.RangeFor(meanA), startS);

        var readA = meanA + NoiseA(meanA, startS, integrationS) + PickUpA(startS, integrationS) + GlitchA(startS);
        var overload = Math.Abs(readA) > _settings.RangeA * MeterSettings.Headroom;
        var stepA = _settings.RangeA * _model.Resolution;
        call.Reply(overload ? Overload : Math.Round(readA / stepA) * stepA, "E8");
        call.Reply(VoltageV(inCompliance, integrationS));
        call.Reply((inCompliance ? 1 : 0) | (overload ? 2 : 0));
        call.Take(2 * integrationS);
    }

    private (double CurrentA, bool InCompliance) SteadyCurrent()
    {
        var freeA = _settings.IsOn ? (_settings.AppliedV + _sample.EmfV) * _sample.ConductanceS : 0;
        var inCompliance = Math.Abs(freeA) > _settings.LimitA;
        var currentA = inCompliance ? Math.CopySign(_settings.LimitA, freeA) : freeA;
        return (currentA, inCompliance);
    }

    private void Heat()
    {
        var (currentA, _) = SteadyCurrent();
        _sample.Dissipate(currentA * currentA / Math.Max(_sample.ConductanceS, LeastConductanceS));
    }

    private double TimeConstantS() => Math.Max(_model.SettlingTimeS, _model.CableF / Math.Max(_sample.ConductanceS, LeastConductanceS));

    private void Settle(double nowS) => _current.MoveTo(nowS, SteadyCurrent().CurrentA, TimeConstantS());

    private void ChangeRange(double rangeA, double nowS)
    {
        if (rangeA == _settings.RangeA) return;
        _settings.RangeA = rangeA;
        _glitchA = _model.RangeGlitch * rangeA;
        _glitchAtS = nowS;
    }

    private double GlitchA(double nowS) => _glitchA * Math.Exp(-(nowS - _glitchAtS) / _model.RangeGlitchTimeS);

    private double NoiseA(double currentA, double startS, double integrationS)
    {
        var johnsonA = _settings.IsOn ? CurrentNoise.JohnsonA(_sample.TemperatureK, _sample.ConductanceS, integrationS) : 0;
        var shotA = _model.ShotNoise * CurrentNoise.ShotA(currentA, integrationS);
        var inputA = CurrentNoise.WhiteA(_model.WhiteNoise * _settings.RangeA, integrationS);
        var whiteA = Math.Sqrt((johnsonA * johnsonA) + (shotA * shotA) + (inputA * inputA));
        return (whiteA * _noise.NextNormal()) + (_model.FlickerNoise * currentA * _flicker.At(startS)) + (_model.Offset * _settings.RangeA);
    }

    // The mean of a sine over the integration time: zero for whole cycles of the true frequency.
    private double PickUpA(double startS, double integrationS)
    {
        var omega = 2 * Math.PI * (_model.LineFrequencyHz ?? _nominalLineHz);
        return _model.LinePickUpA * (Math.Cos(omega * startS) - Math.Cos(omega * (startS + integrationS))) / (omega * integrationS);
    }

    private double VoltageV(bool inCompliance, double integrationS)
    {
        var trueV = inCompliance ? Math.CopySign(_settings.LimitA / _sample.ConductanceS, _settings.AppliedV) : _settings.AppliedV;
        return trueV + (_model.VoltageNoiseV * _noise.NextNormal() / Math.Sqrt(Math.Max(1, integrationS * _nominalLineHz)));
    }
}
