using Acquire.Bench.Text;
using Acquire.Simulator.Instruments;
using Acquire.Simulator.Samples;
using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Twins;

/// <summary>Turns a twin document that passed its shape into the model, and checks what a shape cannot say.</summary>
internal static class TwinFileReading
{
    private const double JoulePerEV = 1.602176634e-19;

    public static TwinModel Model(YamlMap root) => new(
        root.Text("twin"),
        Holder(root.Map("holder")),
        Controller(root.Map("controller")),
        Meter(root.Map("meter")),
        root.MapOrNull("lamp") is { } lamp ? Lamp(lamp) : null,
        Sample(root.Map("sample")));

    public static void CrossCheck(YamlMap root, ShapeReport report)
    {
        var range = root.Map("controller").Map("set point");
        if (!(range.Quantity("from", Dimension.Temperature) < range.Quantity("to", Dimension.Temperature)))
            report.Add(root.Map("controller").AtOf("set point"), "the set points are the wrong way round", "", "from below to", "swap them");
        var light = root.Map("sample").Map("light");
        if (light.QuantityOr("traps", Dimension.NumberDensity, 0) > 0 && !(light.Has("trap depth") && light.Has("capture density")))
            report.Add(light.AtOf("traps"), "the traps have no depth, or nothing fills them", "", "", "add 'trap depth' and 'capture density', or remove 'traps'");
    }

    private static HolderModel Holder(YamlMap map) => new()
    {
        Stage = Store(map.Map("stage")),
        Sample = Store(map.Map("sample")),
        ToColdEnd = Link(map.Map("stage to cold end")),
        ToSample = Link(map.Map("stage to sample")),
        ColdEndK = map.Quantity("cold end", Dimension.Temperature),
        SurroundingsK = map.QuantityOr("surroundings", Dimension.Temperature, 295),
        RadiatingAreaM2 = map.QuantityOr("radiating area", Dimension.Area, 0),
        StartK = map.Quantity("start", Dimension.Temperature),
    };

    private static HeatStore Store(YamlMap map) =>
        new(map.Quantity("heat capacity", Dimension.HeatCapacity), map.QuantityOr("Einstein temperature", Dimension.Temperature, 0));

    private static HeatLink Link(YamlMap map) =>
        new(map.Quantity("conductance", Dimension.ThermalConductance), map.NumberOr("exponent", 0));

    private static ControllerModel Controller(YamlMap map) => new()
    {
        ProportionalWPerK = map.Quantity("proportional", Dimension.ThermalConductance),
        IntegralTimeS = map.Quantity("integral time", Dimension.Time),
        DerivativeTimeS = map.QuantityOr("derivative time", Dimension.Time, 0),
        FeedForwardJPerK = map.QuantityOr("feed-forward", Dimension.HeatCapacity, 0),
        MostPowerW = map.Quantity("heater power", Dimension.Power),
        SetFromK = map.Map("set point").Quantity("from", Dimension.Temperature),
        SetToK = map.Map("set point").Quantity("to", Dimension.Temperature),
        MostRampKPerS = map.Quantity("ramp", Dimension.TemperatureRate),
        SensorNoiseK = map.Quantity("sensor noise", Dimension.TemperatureDifference),
        ResolutionK = map.Quantity("resolution", Dimension.TemperatureDifference),
        StageOffsetK = map.QuantityOr("stage offset", Dimension.TemperatureDifference, 0),
        SampleOffsetK = map.QuantityOr("sample offset", Dimension.TemperatureDifference, 0),
    };

    private static MeterModel Meter(YamlMap map) => new()
    {
        MostVoltageV = map.Quantity("source voltage", Dimension.Voltage),
        Resolution = map.Quantity("resolution", Dimension.Ratio),
        Offset = map.QuantityOr("offset", Dimension.Ratio, 0),
        WhiteNoise = map.Quantity("white noise", Dimension.Ratio),
        FlickerNoise = map.QuantityOr("flicker noise", Dimension.Ratio, 0),
        ShotNoise = map.QuantityOr("shot noise", Dimension.Ratio, 0),
        LinePickUpA = map.QuantityOr("line pick-up", Dimension.Current, 0),
        LineFrequencyHz = map.Has("line frequency") ? map.Quantity("line frequency", Dimension.Frequency) : null,
        CableF = map.Quantity("cable", Dimension.Capacitance),
        SettlingTimeS = map.Quantity("settling", Dimension.Time),
        RangeGlitch = map.QuantityOr("range glitch", Dimension.Ratio, 0),
        RangeGlitchTimeS = map.QuantityOr("range glitch time", Dimension.Time, 0.1),
        VoltageNoiseV = map.QuantityOr("voltage noise", Dimension.Voltage, 0),
    };

    private static LampModel Lamp(YamlMap map) => new()
    {
        WavelengthM = map.Quantity("wavelength", Dimension.Length),
        RatedDriveA = map.Quantity("rated drive", Dimension.Current),
        MostDriveA = map.Quantity("drive", Dimension.Current),
        IrradianceAtRatedWPerM2 = map.Quantity("irradiance at rated drive", Dimension.Irradiance),
        DriveExponent = map.NumberOr("drive exponent", 1),
        WarmUpLoss = map.QuantityOr("warm-up loss", Dimension.Ratio, 0),
        WarmUpTimeS = map.QuantityOr("warm-up time", Dimension.Time, 60),
        Drift = map.QuantityOr("drift", Dimension.Ratio, 0),
        DriftTimeS = map.QuantityOr("drift time", Dimension.Time, 1800),
        MonitorAtRatedA = map.Quantity("monitor at rated", Dimension.Current),
        MonitorNoiseA = map.QuantityOr("monitor noise", Dimension.Current, 0),
    };

    private static SampleModel Sample(YamlMap map) => new()
    {
        Material = map.Text("material"),
        DonorsPerM3 = map.Quantity("donors", Dimension.NumberDensity),
        AcceptorsPerM3 = map.Quantity("acceptors", Dimension.NumberDensity),
        DonorEV = EnergyEV(map, "donor depth", 0.01),
        AcceptorEV = EnergyEV(map, "acceptor depth", 0.01),
        Deep = map.MapOrNull("deep level") is { } deep ? Deep(deep) : null,
        Bar = Bar(map.Map("bar")),
        ContactOhm = map.QuantityOr("contact resistance", Dimension.Resistance, 0),
        LeakageAt300S = map.QuantityOr("leakage", Dimension.Conductance, 0),
        LeakageEV = EnergyEV(map, "leakage energy", 0),
        ContactEmfV = map.QuantityOr("contact EMF", Dimension.Voltage, 0),
        ThermoelectricVPerK = map.QuantityOr("thermoelectric", Dimension.ThermoelectricPower, 0),
        Photo = Photo(map.Map("light")),
    };

    private static DeepLevelModel Deep(YamlMap map) =>
        new(map.Text("kind") == "donor", map.Quantity("density", Dimension.NumberDensity), EnergyEV(map, "below conduction band", 0));

    private static BarModel Bar(YamlMap map) =>
        new(map.Quantity("length", Dimension.Length), map.Quantity("width", Dimension.Length), map.Quantity("thickness", Dimension.Length));

    private static PhotoModel Photo(YamlMap map) => new()
    {
        Reflectance = map.Quantity("reflectance", Dimension.Ratio),
        AbsorptionLengthM = map.Quantity("absorption length", Dimension.Length),
        LifetimeAt300S = map.Quantity("lifetime", Dimension.Time),
        LifetimeExponent = map.NumberOr("lifetime exponent", 0),
        IntensityExponent = map.NumberOr("intensity exponent", 1),
        ReferencePerM3 = map.Quantity("reference density", Dimension.NumberDensity),
        TrapsPerM3 = map.QuantityOr("traps", Dimension.NumberDensity, 0),
        TrapEV = EnergyEV(map, "trap depth", 0.5),
        AttemptHz = map.QuantityOr("attempt frequency", Dimension.Frequency, 1e12),
        CapturePerM3 = map.QuantityOr("capture density", Dimension.NumberDensity, 1e18),
    };

    private static double EnergyEV(YamlMap map, string key, double fallbackEV) =>
        map.Has(key) ? map.Quantity(key, Dimension.Energy) / JoulePerEV : fallbackEV;
}
