using Acquire.Bench.Text;

namespace Acquire.Bench.Files;

/// <summary>What a bench file looks like.</summary>
public static class BenchFileShape
{
    private static readonly MapShape Site = new("Where the bench stands.",
        new Key("laboratory", new TextShape("Name of the laboratory.") { Example = "evening laboratory (invented)" }),
        new Key("line frequency", new QuantityShape("Frequency of the mains; readings integrate over whole cycles of it.", Dimension.Frequency, 45, 65) { Example = "50 Hz" }, true),
        new Key("time zone", new TextShape("IANA name of the site's time zone; stamps are UTC.") { Example = "Europe/Madrid" }));

    private static readonly MapShape Serial = new("Framing of a serial line.",
        new Key("baud", new NumberShape("Speed [baud].", 300, 4_000_000, Whole: true) { Example = "115200" }),
        new Key("parity", new ChoiceShape("Parity bit.", "none", "odd", "even")),
        new Key("data bits", new NumberShape("Data bits.", 7, 8, Whole: true) { Example = "8" }),
        new Key("stop bits", new NumberShape("Stop bits.", 1, 2, Whole: true) { Example = "1" }));

    private static readonly MapShape Instrument = new("One instrument.",
        new Key("driver", new TextShape("Name of a driver file without its ending; looked up beside the bench file, in the user's folder, among the shipped ones.") { Example = "scpi-source-meter" }, true),
        new Key("address", new TextShape("Address in VISA resource syntax.", @"^(TCPIP[0-9]*::[^:]+::[0-9]+::SOCKET|ASRL.+::INSTR|SIM::.+::INSTR)$", "TCPIP::host::port::SOCKET or ASRL<device>::INSTR") { Example = "TCPIP::127.0.0.1::5025::SOCKET" }, true),
        new Key("time-out", new QuantityShape("Longest wait for an answer, in real time.", Dimension.Time, 0.05, 60) { Example = "2 s" }),
        new Key("serial", Serial));

    private static readonly MapShape Range = new("A range of temperatures.",
        new Key("from", new QuantityShape("Lower end.", Dimension.Temperature, 0) { Example = "77 K" }, true),
        new Key("to", new QuantityShape("Upper end.", Dimension.Temperature, 0) { Example = "420 K" }, true));

    private static readonly TextShape InstrumentName = new("Name of an instrument above.");

    private static readonly MapShape Wiring = new("Who plays which role.",
        new Key("temperature loop", new MapShape("Who heats and reads the temperatures.",
            new Key("instrument", InstrumentName, true),
            new Key("stage uncertainty", new QuantityShape("Standard uncertainty common to all stage readings.", Dimension.TemperatureDifference, 0) { Example = "0.1 K" }, true),
            new Key("sample uncertainty", new QuantityShape("Standard uncertainty common to all sample readings.", Dimension.TemperatureDifference, 0) { Example = "0.1 K" }, true),
            new Key("sensor range", Range, true)), true),
        new Key("source-meter", new MapShape("Who applies the bias and reads the current.",
            new Key("instrument", InstrumentName, true),
            new Key("connection", new ChoiceShape("How the sample is connected.", "two-wire"))), true),
        new Key("lamp", new MapShape("Who lights the sample.",
            new Key("instrument", InstrumentName, true),
            new Key("wavelength", new QuantityShape("Wavelength of the light.", Dimension.Length, 100e-9, 20e-6) { Example = "940 nm" }, true),
            new Key("rated drive", new QuantityShape("Rated drive current.", Dimension.Current, 1e-6, 100) { Example = "0.5 A" }, true),
            new Key("irradiance at rated drive", new QuantityShape("Irradiance on the sample at the rated drive.", Dimension.Irradiance, 0) { Example = "5 mW/cm2" }, true))));

    private static readonly MapShape Limits = new("What the bench may be asked for.",
        new Key("temperature", Range, true),
        new Key("over-temperature", new QuantityShape("Stage or sample above this trips.", Dimension.Temperature, 0) { Example = "440 K" }, true),
        new Key("ramp", new QuantityShape("Fastest ramp.", Dimension.TemperatureRate, 1e-6) { Example = "10 K/min" }, true),
        new Key("heater power", new QuantityShape("Rating of the heater.", Dimension.Power, 0) { Example = "50 W" }, true),
        new Key("bias", new QuantityShape("Largest bias magnitude. Above 60 V dc an interlocked enclosure is needed.", Dimension.Voltage, 0, 1100) { Example = "10 V" }, true),
        new Key("current", new QuantityShape("Current limit of the source.", Dimension.Current, 0) { Example = "10 mA" }, true),
        new Key("irradiance", new QuantityShape("Largest irradiance.", Dimension.Irradiance, 0) { Example = "10 mW/cm2" }));

    /// <summary>The shape.</summary>
    public static MapShape Shape { get; } = new("A bench: instruments, wiring, limits, protections.",
        new Key("bench", new TextShape("Name of the bench.") { Example = "germanium cryostat (invented)" }, true),
        new Key("twin", new TextShape("Twin file beside this one: how the simulator plays this bench.") { Example = "germanium-cryostat.twin.yaml" }),
        new Key("simulated", new FlagShape("True when our own simulator serves the addresses: then nothing real is ever opened.") { Example = "true" }),
        new Key("pace", new NumberShape("How many times faster than life a simulated bench runs.", 1, 60) { Example = "60" }),
        new Key("site", Site, true),
        new Key("monitor", new MapShape("The monitor loop.",
            new Key("period", new QuantityShape("Period of the monitor loop, over which interlocks are judged.", Dimension.Time, 0.1, 1) { Example = "0.5 s" }, true))),
        new Key("instruments", new NamesShape("Instruments by name.", Instrument), true),
        new Key("wiring", Wiring, true),
        new Key("limits", Limits, true),
        new Key("protections", new ListShape("Protections that exist in hardware.", new MapShape("One protection.",
            new Key("what", new TextShape("What it is.") { Example = "over-temperature limiter" }, true),
            new Key("last test", new TextShape("Date of its last test.", "^[0-9]{4}-[0-9]{2}-[0-9]{2}$", "a date, year-month-day") { Example = "2026-10-01" }, true)))),
        new Key("interlocks", new OpenShape("Thresholds and rows of the interlock table.")));
}
