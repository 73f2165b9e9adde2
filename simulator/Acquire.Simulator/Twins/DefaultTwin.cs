using Acquire.Bench.Files;
using Acquire.Simulator.Instruments;
using Acquire.Simulator.Samples;
using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Twins;

/// <summary>A twin for a bench that names none, from its ratings alone: enough to rehearse a protocol, no more.</summary>
/// <remarks>
/// The holder is chosen so that the hottest set point takes 60 % of the heater's rating and the fastest ramp 20 %; a bench
/// that goes below 285 K gets a cold end 15 K below its coldest set point, any other stands in a room. The sample is
/// lightly doped germanium, or silicon for a bench that goes above 500 K. Whoever shows results of it says that it was made up.
/// </remarks>
public static class DefaultTwin
{
    private const double RoomK = 293;

    /// <summary>Builds the twin.</summary>
    public static TwinModel For(BenchFile bench)
    {
        ArgumentNullException.ThrowIfNull(bench);
        var limits = bench.Limits;
        var coldEndK = limits.TemperatureFromK < 285 ? Math.Max(2, limits.TemperatureFromK - 15) : RoomK;
        var powerW = limits.HeaterPowerW > 0 ? limits.HeaterPowerW : 50;
        var linkWPerK = 0.6 * powerW / Math.Max(10, limits.TemperatureToK - coldEndK);
        var storeJPerK = 0.2 * powerW / limits.RampKPerS;
        return new TwinModel(
            $"default twin of {bench.Title}, made up from its ratings",
            Holder(coldEndK, linkWPerK, storeJPerK),
            Controller(limits, powerW, linkWPerK, storeJPerK),
            Meter(limits),
            bench.Wiring.Lamp is { } lamp ? Lamp(lamp) : null,
            Sample(limits.TemperatureToK > 500 ? "Si" : "Ge"));
    }

    private static HolderModel Holder(double coldEndK, double linkWPerK, double storeJPerK) => new()
    {
        Stage = new HeatStore(storeJPerK, 0),
        Sample = new HeatStore(storeJPerK / 200, 0),
        ToColdEnd = new HeatLink(linkWPerK, 0),
        ToSample = new HeatLink(storeJPerK / 200 / 8, 0),
        ColdEndK = coldEndK,
        SurroundingsK = RoomK,
        RadiatingAreaM2 = 0,
        StartK = Math.Max(RoomK, coldEndK),
    };

    private static ControllerModel Controller(BenchLimits limits, double powerW, double linkWPerK, double storeJPerK)
    {
        // A closed loop ten times faster than the holder, but not faster than its own sampling allows.
        var closedHz = Math.Min(0.5, 10 * linkWPerK / storeJPerK);
        var proportionalWPerK = 2 * closedHz * storeJPerK;
        return new ControllerModel
        {
            ProportionalWPerK = proportionalWPerK,
            IntegralTimeS = proportionalWPerK / (closedHz * closedHz * storeJPerK),
            DerivativeTimeS = 0,
            FeedForwardJPerK = storeJPerK,
            MostPowerW = powerW,
            SetFromK = 0,
            SetToK = limits.OverTemperatureK,
            MostRampKPerS = limits.RampKPerS,
            SensorNoiseK = 2e-3,
            ResolutionK = 1e-3,
            StageOffsetK = 0,
            SampleOffsetK = 0,
        };
    }

    private static MeterModel Meter(BenchLimits limits) => new()
    {
        MostVoltageV = Math.Max(limits.BiasV, 1),
        Resolution = 1e-6,
        Offset = 2e-5,
        WhiteNoise = 3e-6,
        FlickerNoise = 3e-5,
        ShotNoise = 0,
        LinePickUpA = 1e-9,
        LineFrequencyHz = null,
        CableF = 2e-10,
        SettlingTimeS = 5e-3,
        RangeGlitch = 5e-3,
        RangeGlitchTimeS = 0.15,
        VoltageNoiseV = 5e-6,
    };

    private static LampModel Lamp(LampWiring wiring) => new()
    {
        WavelengthM = wiring.WavelengthM,
        RatedDriveA = wiring.RatedDriveA,
        MostDriveA = 2 * wiring.RatedDriveA,
        IrradianceAtRatedWPerM2 = wiring.IrradianceAtRatedWPerM2,
        DriveExponent = 1,
        WarmUpLoss = 0.03,
        WarmUpTimeS = 60,
        Drift = 1e-3,
        DriftTimeS = 1800,
        MonitorAtRatedA = 5e-5,
        MonitorNoiseA = 5e-9,
    };

    private static SampleModel Sample(string material) => new()
    {
        Material = material,
        DonorsPerM3 = 2e18,
        AcceptorsPerM3 = 1e18,
        DonorEV = 0.03,
        AcceptorEV = 0.03,
        Deep = null,
        Bar = new BarModel(10e-3, 1e-3, 2e-4),
        ContactOhm = 0.5,
        LeakageAt300S = 1e-11,
        LeakageEV = 0.1,
        ContactEmfV = 3e-6,
        ThermoelectricVPerK = 4e-4,
        Photo = new PhotoModel
        {
            Reflectance = 0.35,
            AbsorptionLengthM = 1e-5,
            LifetimeAt300S = 1e-5,
            LifetimeExponent = 0,
            IntensityExponent = 1,
            ReferencePerM3 = 1e18,
            TrapsPerM3 = 0,
            TrapEV = 0.5,
            AttemptHz = 1e12,
            CapturePerM3 = 1e19,
        },
    };
}
