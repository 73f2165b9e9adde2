using Acquire.Bench.Text;

namespace Acquire.Simulator.Twins;

/// <summary>What a twin file looks like.</summary>
public static class TwinFileShape
{
    private static readonly MapShape Store = new("Something that stores heat.",
        Need("heat capacity", Dimension.HeatCapacity, "Heat capacity at 300 K.", "3 J/K", 1e-6, 1e6),
        Can("Einstein temperature", Dimension.Temperature, "Where the heat capacity falls off towards the cold; without it the heat capacity is constant.", "240 K", 0, 2000));

    private static readonly MapShape Link = new("A thermal link.",
        Need("conductance", Dimension.ThermalConductance, "Conductance at 300 K.", "0.15 W/K", 0, 1e4),
        new Key("exponent", new NumberShape("Power of temperature that the conductance follows.", -3, 3) { Example = "0" }));

    private static readonly MapShape Holder = new("Stage and sample.",
        new Key("stage", Store, true),
        new Key("sample", Store, true),
        new Key("stage to cold end", Link, true),
        new Key("stage to sample", Link, true),
        Need("cold end", Dimension.Temperature, "Temperature of the cold end, or of the room for a furnace.", "205 K", 1, 400),
        Can("surroundings", Dimension.Temperature, "What the stage radiates to.", "295 K", 1, 400),
        Can("radiating area", Dimension.Area, "Emissivity times area of the stage.", "90 cm2", 0, 10),
        Need("start", Dimension.Temperature, "Temperature when the bench is switched on.", "295 K", 1, 1500));

    private static readonly MapShape Controller = new("Temperature controller.",
        Need("proportional", Dimension.ThermalConductance, "Proportional gain.", "2.8 W/K", 0, 1e5),
        Need("integral time", Dimension.Time, "Integral time.", "4 s", 0.1, 1e5),
        Can("derivative time", Dimension.Time, "Derivative time.", "0 s", 0, 1e4),
        Can("feed-forward", Dimension.HeatCapacity, "Heat capacity that the ramp generator reckons with.", "3 J/K", 0, 1e6),
        Need("heater power", Dimension.Power, "Largest heater power.", "40 W", 0, 1e5),
        new Key("set point", new MapShape("Set points that are taken.",
            Need("from", Dimension.Temperature, "Lowest.", "60 K", 0, 2000),
            Need("to", Dimension.Temperature, "Highest.", "450 K", 0, 2000)), true),
        Need("ramp", Dimension.TemperatureRate, "Fastest ramp that is taken.", "40 K/min", 1e-6, 10),
        Need("sensor noise", Dimension.TemperatureDifference, "Standard deviation of one reading.", "2 mK", 0, 10),
        Need("resolution", Dimension.TemperatureDifference, "Smallest step of a displayed temperature.", "1 mK", 1e-6, 1),
        Can("stage offset", Dimension.TemperatureDifference, "By how much the stage sensor reads high, always.", "20 mK", -20, 20),
        Can("sample offset", Dimension.TemperatureDifference, "By how much the sample sensor reads high, always.", "30 mK", -20, 20));

    private static readonly MapShape Meter = new("Source-meter.",
        Need("source voltage", Dimension.Voltage, "Largest magnitude of the source voltage.", "20 V", 1e-3, 1100),
        Need("resolution", Dimension.Ratio, "Smallest step of a reading, as a part of the range.", "1 ppm", 1e-8, 0.01),
        Can("offset", Dimension.Ratio, "Zero error as a part of the range.", "20 ppm", -0.01, 0.01),
        Need("white noise", Dimension.Ratio, "Input noise in 1 Hz as a part of the range.", "2 ppm", 0, 0.1),
        Can("flicker noise", Dimension.Ratio, "Relative 1/f noise of a current.", "20 ppm", 0, 0.1),
        Can("shot noise", Dimension.Ratio, "Part of full shot noise; an ohmic bulk shows little of it.", "0", 0, 1),
        Can("line pick-up", Dimension.Current, "Amplitude of the current picked up from the mains.", "1 nA", 0, 1),
        Can("line frequency", Dimension.Frequency, "True frequency of the mains; without it the nominal one of the bench.", "50.02 Hz", 45, 65),
        Need("cable", Dimension.Capacitance, "Capacitance of cable and sample.", "150 pF", 0, 1e-3),
        Need("settling", Dimension.Time, "Fastest settling of the instrument itself.", "5 ms", 1e-6, 100),
        Can("range glitch", Dimension.Ratio, "Transient after a change of range, as a part of the new range.", "0.5 %", 0, 1),
        Can("range glitch time", Dimension.Time, "Time constant of that transient.", "0.2 s", 1e-4, 100),
        Can("voltage noise", Dimension.Voltage, "Standard deviation of the measured voltage at one line cycle.", "5 uV", 0, 1));

    private static readonly MapShape Lamp = new("Lamp.",
        Need("wavelength", Dimension.Length, "Wavelength.", "940 nm", 100e-9, 20e-6),
        Need("rated drive", Dimension.Current, "Drive current at which the irradiance is given.", "0.5 A", 1e-6, 100),
        Need("drive", Dimension.Current, "Largest drive current that is taken.", "1 A", 1e-6, 100),
        Need("irradiance at rated drive", Dimension.Irradiance, "True irradiance on the sample, cold.", "4.9 mW/cm2", 0, 1e6),
        new Key("drive exponent", new NumberShape("Power of the drive current that the light follows.", 0.1, 3) { Example = "1" }),
        Can("warm-up loss", Dimension.Ratio, "Part of the light that is lost when warm at the rated drive.", "4 %", 0, 0.9),
        Can("warm-up time", Dimension.Time, "Time constant of warming up.", "2 min", 0.1, 1e5),
        Can("drift", Dimension.Ratio, "Relative standard deviation of the slow drift.", "0.1 %", 0, 0.1),
        Can("drift time", Dimension.Time, "Correlation time of the slow drift.", "30 min", 1, 1e6),
        Need("monitor at rated", Dimension.Current, "Monitor current at the rated irradiance.", "50 uA", 0, 1),
        Can("monitor noise", Dimension.Current, "Noise of the monitor.", "5 nA", 0, 1));

    /// <summary>The shape.</summary>
    public static MapShape Shape { get; } = new("A twin: how the simulator plays a bench, with the true values that no instrument knows.",
        new Key("twin", new TextShape("Name of the twin.") { Example = "germanium quick holder (invented)" }, true),
        new Key("holder", Holder, true),
        new Key("controller", Controller, true),
        new Key("meter", Meter, true),
        new Key("lamp", Lamp),
        new Key("sample", TwinSampleShape.Shape, true));

    internal static Key Need(string name, Dimension dimension, string description, string example, double least, double most) =>
        new(name, new QuantityShape(description, dimension, least, most) { Example = example }, true);

    internal static Key Can(string name, Dimension dimension, string description, string example, double least, double most) =>
        new(name, new QuantityShape(description, dimension, least, most) { Example = example });
}
