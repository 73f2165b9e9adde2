using System.Globalization;
using Acquire.Bench.Text;

namespace Acquire.Bench.Files;

/// <summary>Turns a document that passed its shape into the model, and checks what a shape cannot say.</summary>
internal static class BenchFileReading
{
    public static BenchFile Model(SourceText source, YamlMap root)
    {
        var site = root.Map("site");
        return new BenchFile
        {
            Title = root.Text("bench"),
            Source = source,
            TwinFile = root.Has("twin") ? root.Text("twin") : null,
            Simulated = root.FlagOr("simulated", false),
            Pace = root.NumberOr("pace", 1),
            Laboratory = site.TextOr("laboratory", ""),
            LineFrequencyHz = site.Quantity("line frequency", Dimension.Frequency),
            TimeZone = site.TextOr("time zone", "UTC"),
            MonitorPeriodS = root.MapOrNull("monitor")?.Quantity("period", Dimension.Time) ?? 0.5,
            Instruments = [.. root.Map("instruments").Entries.Select(Instrument)],
            Wiring = Wires(root.Map("wiring")),
            Limits = Limits(root.Map("limits")),
            Protections = [.. root.List("protections").Cast<YamlMap>().Select(OneProtection)],
            Interlocks = root.Find("interlocks"),
        };
    }

    public static void CrossCheck(BenchFile bench, YamlMap root, ShapeReport report)
    {
        CheckWiring(bench, root.Map("wiring"), report);
        var limits = root.Map("limits");
        var allowed = bench.Limits;
        if (!(allowed.TemperatureFromK < allowed.TemperatureToK))
        {
            report.Add(limits.AtOf("temperature"), "the temperature limits are the wrong way round", "", "from below to", "swap them");
        }

        if (!(allowed.OverTemperatureK > allowed.TemperatureToK))
        {
            report.Add(limits.AtOf("over-temperature"), "the over-temperature must lie above the hottest set point", $"'{limits.Text("over-temperature")}'",
                $"above {QuantityText.Format(allowed.TemperatureToK, Dimension.Temperature)}", "raise it, or lower 'temperature: to'");
        }

        if (bench.Simulated && bench.TwinFile is null)
        {
            report.Add(root.At, "a simulated bench needs a twin", "", "", "add 'twin: name.twin.yaml'");
        }

        if (!bench.Simulated && bench.Pace != 1)
        {
            report.Add(root.AtOf("pace"), "only a simulated bench can run faster than life", $"'{root.Text("pace")}'", "1", "remove 'pace', or add 'simulated: true'");
        }

        foreach (var entry in root.List("protections").Cast<YamlMap>())
        {
            if (!IsDate(entry.Text("last test")))
            {
                report.Add(entry.AtOf("last test"), "this is not a date", $"'{entry.Text("last test")}'", "year-month-day", "write the date of the last test");
            }
        }
    }

    private static void CheckWiring(BenchFile bench, YamlMap wiring, ShapeReport report)
    {
        var names = bench.Instruments.Select(instrument => instrument.Name).ToList();
        foreach (var role in wiring.Entries)
        {
            var map = (YamlMap)role.Value;
            if (!names.Contains(map.Text("instrument")))
            {
                report.Add(map.AtOf("instrument"), $"the role '{role.Key}' names an instrument that is not there", $"'{map.Text("instrument")}'", string.Join(", ", names), "name one of them, or add the instrument");
            }
        }

        var taken = wiring.Entries.Select(role => ((YamlMap)role.Value).Text("instrument")).GroupBy(name => name).FirstOrDefault(group => group.Count() > 1);
        if (taken is not null)
        {
            report.Add(wiring.At, "one instrument plays two roles", $"'{taken.Key}'", "one role each", "wire another instrument");
        }

        if (!(bench.Wiring.Loop.SensorFromK < bench.Wiring.Loop.SensorToK))
        {
            report.Add(wiring.Map("temperature loop").AtOf("sensor range"), "the sensor range is the wrong way round", "", "from below to", "swap them");
        }
    }

    private static InstrumentEntry Instrument(YamlEntry entry)
    {
        var map = (YamlMap)entry.Value;
        var serial = map.MapOrNull("serial");
        return new(entry.Key, map.Text("driver"), map.Text("address"), map.QuantityOr("time-out", Dimension.Time, 2),
            new SerialEntry(serial?.IntegerOr("baud", 9600) ?? 9600, serial?.TextOr("parity", "none") ?? "none", serial?.IntegerOr("data bits", 8) ?? 8, serial?.IntegerOr("stop bits", 1) ?? 1), entry.At);
    }

    private static Wiring Wires(YamlMap wiring)
    {
        var loop = wiring.Map("temperature loop");
        var range = loop.Map("sensor range");
        var meter = wiring.Map("source-meter");
        var lamp = wiring.MapOrNull("lamp");
        return new(
            new(loop.Text("instrument"), loop.Quantity("stage uncertainty", Dimension.TemperatureDifference), loop.Quantity("sample uncertainty", Dimension.TemperatureDifference),
                range.Quantity("from", Dimension.Temperature), range.Quantity("to", Dimension.Temperature)),
            new(meter.Text("instrument"), meter.TextOr("connection", "two-wire")),
            lamp is null ? null : new(lamp.Text("instrument"), lamp.Quantity("wavelength", Dimension.Length), lamp.Quantity("rated drive", Dimension.Current),
                lamp.Quantity("irradiance at rated drive", Dimension.Irradiance), lamp.At));
    }

    private static BenchLimits Limits(YamlMap limits) => new()
    {
        TemperatureFromK = limits.Map("temperature").Quantity("from", Dimension.Temperature),
        TemperatureToK = limits.Map("temperature").Quantity("to", Dimension.Temperature),
        OverTemperatureK = limits.Quantity("over-temperature", Dimension.Temperature),
        RampKPerS = limits.Quantity("ramp", Dimension.TemperatureRate),
        HeaterPowerW = limits.Quantity("heater power", Dimension.Power),
        BiasV = limits.Quantity("bias", Dimension.Voltage),
        CurrentA = limits.Quantity("current", Dimension.Current),
        IrradianceWPerM2 = limits.QuantityOr("irradiance", Dimension.Irradiance, 0),
        At = limits.Entries.ToDictionary(entry => entry.Key, entry => entry.At, StringComparer.Ordinal),
    };

    private static Protection OneProtection(YamlMap map) =>
        new(map.Text("what"), IsDate(map.Text("last test")) ? DateOnly.ParseExact(map.Text("last test"), "yyyy-MM-dd", CultureInfo.InvariantCulture) : default);

    private static bool IsDate(string text) => DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out _);
}
