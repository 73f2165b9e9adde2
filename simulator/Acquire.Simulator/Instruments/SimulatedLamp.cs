using Acquire.Simulator.Noise;
using Acquire.Simulator.Scpi;
using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Instruments;

/// <summary>The device side of a lamp with a monitor detector: light falls while it warms up, and drifts slowly.</summary>
internal sealed class SimulatedLamp(LampModel model, SeededNoise noise)
{
    private readonly RelaxingNoise _drift = new(noise.For("drift"), model.DriftTimeS);
    private readonly SeededNoise _readingNoise = noise.For("readings");
    private double _driveA;
    private bool _isOn;
    private double _warmth;

    /// <summary>Wavelength [m].</summary>
    public double WavelengthM => model.WavelengthM;

    /// <summary>Irradiance on the sample [W/m2].</summary>
    public double IrradianceWPerM2 { get; private set; }

    /// <summary>The commands, in SCPI-1999 form.</summary>
    public ScpiCommands Commands() => new ScpiCommands()
        .Add("SOURce:CURRent[:LEVel]", call => { if (call.TryNumber(0, model.MostDriveA, out var driveA)) _driveA = driveA; })
        .Add("SOURce:CURRent[:LEVel]?", call => { if (call.TryNothing()) call.Reply(_driveA, "R"); })
        .Add("OUTPut[:STATe]", call => { if (call.TryFlag(out var on)) _isOn = on; })
        .Add("OUTPut[:STATe]?", call => { if (call.TryNothing()) call.Reply(_isOn); })
        .Add("MEASure[:SCALar]:CURRent[:DC]?", ReplyCurrent);

    /// <summary>What *RST does: light off, drive zero.</summary>
    public void Reset() => (_isOn, _driveA) = (false, 0);

    /// <summary>Lets time pass.</summary>
    public void Step(double nowS, double stepS)
    {
        var driven = _isOn ? _driveA / model.RatedDriveA : 0;
        _warmth += (driven - _warmth) * Relaxation.Gone(stepS / model.WarmUpTimeS);
        IrradianceWPerM2 = driven <= 0 ? 0
            : model.IrradianceAtRatedWPerM2 * Math.Pow(driven, model.DriveExponent)
              * Math.Max(0, 1 - (model.WarmUpLoss * _warmth)) * (1 + (model.Drift * _drift.At(nowS)));
    }

    private void ReplyCurrent(ScpiCall call)
    {
        if (!call.TryChannel(2, out var channel)) return;
        call.Reply(channel == 1
            ? _isOn ? _driveA : 0
            : (model.MonitorAtRatedA * IrradianceWPerM2 / model.IrradianceAtRatedWPerM2) + (model.MonitorNoiseA * _readingNoise.NextNormal()));
    }
}
