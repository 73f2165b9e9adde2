using Acquire.Bench.Files;
using Acquire.Bench.Roles;
using Acquire.Bench.Text;
using Acquire.Drivers.Files;
using Acquire.Wire;

namespace Acquire.Drivers.Instruments;

/// <summary>Makes the instruments of a bench, by role; nothing is opened until an instrument is first asked.</summary>
public static class InstrumentFactory
{
    /// <summary>The driver of every instrument, by the instrument's name.</summary>
    public static Parsed<IReadOnlyDictionary<string, DriverFile>> Drivers(BenchFile bench, DriverCatalogue catalogue)
    {
        List<Diagnostic> diagnostics = [];
        var drivers = new Dictionary<string, DriverFile>(StringComparer.Ordinal);
        foreach (var entry in bench.Instruments)
        {
            var found = catalogue.Find(entry.Driver);
            if (found.Value is { } driver) drivers[entry.Name] = driver;
            // A driver that is nowhere has no place of its own; the bench file names it.
            else diagnostics.AddRange(found.Diagnostics.Select(d => d.File == entry.Driver + ".driver.yaml" ? d with { File = bench.Source.File, At = entry.At } : d));
        }
        return diagnostics.Count > 0 ? Parsed.Bad<IReadOnlyDictionary<string, DriverFile>>(diagnostics) : Parsed.Good<IReadOnlyDictionary<string, DriverFile>>(drivers);
    }

    /// <summary>Makes the instruments. Addresses of the bench file may be overridden by instrument name, as a simulated bench needs.</summary>
    /// <remarks>Time-outs run on each link's own clock: real time on a wire, the device's clock in process.</remarks>
    public static Parsed<BenchInstruments> Open(
        BenchFile bench, ILinkFactory links, DriverCatalogue catalogue, IReadOnlyDictionary<string, string>? addressOverrides = null)
    {
        var drivers = Drivers(bench, catalogue);
        if (drivers.Value is null) return Parsed.Bad<BenchInstruments>(drivers.Diagnostics);
        var making = new Making(bench, links, drivers.Value, addressOverrides);
        var loop = making.Play(bench.Wiring.Loop.Instrument, "temperature loop", d => d.Loop, (talk, commands) => new TextTemperatureLoop(talk, commands));
        var meter = making.Play(bench.Wiring.Meter.Instrument, "source-meter", d => d.Meter, (talk, commands) => new TextSourceMeter(talk, commands));
        var lamp = bench.Wiring.Lamp is { } wired
            ? making.Play(wired.Instrument, "lamp", d => d.Lamp, (talk, commands) => new TextLamp(talk, commands))
            : null;
        return making.Diagnostics.Count > 0 || loop is null || meter is null
            ? Parsed.Bad<BenchInstruments>(making.Diagnostics)
            : Parsed.Good(new BenchInstruments(loop, meter, lamp));
    }

    private sealed class Making(BenchFile bench, ILinkFactory links, IReadOnlyDictionary<string, DriverFile> drivers, IReadOnlyDictionary<string, string>? overrides)
    {
        public List<Diagnostic> Diagnostics { get; } = [];

        public TInstrument? Play<TCommands, TInstrument>(string name, string role, Func<DriverFile, TCommands?> commandsOf, Func<InstrumentTalk, TCommands, TInstrument> make)
            where TCommands : class
            where TInstrument : class
        {
            var entry = bench.Instruments.First(instrument => instrument.Name == name);
            var driver = drivers[name];
            if (commandsOf(driver) is not { } commands)
            {
                Add(entry, $"the driver cannot play the role '{role}'", $"'{entry.Driver}'", $"a driver file with '{role}:' in it", "name another driver, or wire another instrument");
                return null;
            }
            try
            {
                var link = links.Create(overrides?.GetValueOrDefault(name) ?? entry.Address, new LinkSettings { Serial = SerialOf(entry.Serial) });
                var exchange = new TextExchange(link, driver.Framing, link.TimeOutClock);
                return make(new InstrumentTalk(name, driver, exchange, TimeSpan.FromSeconds(entry.TimeOutS)), commands);
            }
            catch (LinkException e)
            {
                Add(entry, $"the instrument '{name}' cannot be reached: {e.Message}", "", "", "");
                return null;
            }
        }

        private void Add(InstrumentEntry entry, string what, string found, string allowed, string remedy) =>
            Diagnostics.Add(new Diagnostic(bench.Source.File, entry.At, what, found, allowed, remedy));

        private static SerialSettings SerialOf(SerialEntry entry) => new()
        {
            Baud = entry.Baud,
            DataBits = entry.DataBits,
            StopBits = entry.StopBits,
            Parity = entry.Parity switch { "odd" => SerialParity.Odd, "even" => SerialParity.Even, _ => SerialParity.None },
        };
    }
}
