using Acquire.Bench.Text;

namespace Acquire.Drivers.Files;

/// <summary>What a driver file looks like.</summary>
public static class DriverFileShape
{
    private static readonly TextShape Message = new("A message to the instrument, without its line end.", @"^[ -~]+$", "printable ASCII");

    private static readonly TextShape Expect = new("Regular expression that the whole of a right answer matches.");

    private static readonly TextShape Reply = new("Form of the reply: names of fields in braces, everything else as it stands.", @"\{[^{}]+\}", "at least one name in braces") { Example = "{stage};{sample}" };

    private static readonly MapShape Question = new("A question and its right answer.",
        new Key("ask", Message, true),
        new Key("expect", Expect, true));

    private static readonly MapShape Step = new("Something sent.", new Key("send", Message, true));

    private static readonly MapShape Marker = new("A number that stands for no number.",
        new Key("value", new NumberShape("The number, before scaling.") { Example = "9.9E37" }, true),
        new Key("means", new ChoiceShape("What it says about the reading.", "overrange", "underrange", "implausible"), true));

    private static readonly MapShape Switch = new("A command with two positions.",
        new Key("send", WithValue("1"), true),
        new Key("on", new TextShape("The word for on.") { Example = "'1'" }, true),
        new Key("off", new TextShape("The word for off.") { Example = "'0'" }, true));

    private static readonly NumberShape Bit = new("Number of the bit, from 0.", 0, 30, Whole: true);

    private static readonly MapShape Loop = new("A temperature controller with its heater, a stage sensor and a sample sensor.",
        new Key("poll", Poll("Stage and sample temperature, set point now and heater power, in one exchange.",
            Field("stage", Dimension.Temperature), Field("sample", Dimension.Temperature), Field("set point", Dimension.Temperature), Field("heater power", Dimension.Power)), true),
        new Key("set point", Setting(Dimension.Temperature), true),
        new Key("ramp", Setting(Dimension.TemperatureRate), true),
        new Key("heater", Switch, true));

    private static readonly MapShape Meter = new("A source of voltage that measures the current it drives.",
        new Key("read", Poll("One reading.", Field("current", Dimension.Current), Field("voltage", Dimension.Voltage),
            new Key("status", new MapShape("A number whose bits say what is wrong with the current.",
                new Key("compliance bit", Bit), new Key("overload bit", Bit)))), true),
        new Key("current limit", Setting(Dimension.Current), true),
        new Key("integration", Setting(Dimension.LineCycles), true),
        new Key("autorange off", Message, true),
        new Key("range", Setting(Dimension.Current), true),
        new Key("bias", Setting(Dimension.Voltage), true),
        new Key("output", Switch, true),
        new Key("ranges", new ListShape("Full scales of the current ranges, ascending.", new QuantityShape("A full scale.", Dimension.Current, 1e-15, 1e3) { Example = "1 uA" }, 1, 100), true));

    private static readonly MapShape Lamp = new("A light source driven by a current, with a monitor detector.",
        new Key("poll", Poll("Drive and monitor current, in one exchange.", Field("drive", Dimension.Current), Field("monitor", Dimension.Current)), true),
        new Key("drive", Setting(Dimension.Current), true),
        new Key("output", Switch, true));

    /// <summary>The shape.</summary>
    public static MapShape Shape { get; } = new("How to talk to one kind of instrument, and how to make it safe. Exactly one of temperature loop, source-meter and lamp.",
        new Key("driver", new TextShape("Name of the driver, the file's own name without its ending.", DriverCatalogue.NamePattern, "small letters, digits and hyphens") { Example = "scpi-lamp" }, true),
        new Key("speaks", new TextShape("The language, named by its standard.") { Example = "SCPI-1999 over IEEE 488.2, one message a line" }, true),
        new Key("line", new MapShape("How messages are cut out of bytes.",
            new Key("ends with", new ChoiceShape("What ends a message.", "LF", "CRLF", "CR")),
            new Key("longest reply", new NumberShape("Longest answer [bytes].", 64, 65_536, Whole: true) { Example = "4096" }))),
        new Key("identity", Question, true),
        new Key("start", new ListShape("Sent once, after the identity was found right.", Message, 0, 20)),
        new Key("errors", Question with { Description = "Asked after every setting; the answer when there is no error." }),
        new Key("overload", new EitherShape("Numbers that stand for no number: those of SCPI-1999 (9.9E37, -9.9E37, 9.91E37), or a list.",
            new ChoiceShape("The numbers of SCPI-1999.", "scpi"), new ListShape("Numbers that stand for no number.", Marker, 0, 20))),
        new Key("temperature loop", Loop),
        new Key("source-meter", Meter),
        new Key("lamp", Lamp),
        new Key("make safe", new ListShape("De-energises the instrument and reads back that it is.", new EitherShape("Something sent, or asked.", Step, Question), 1, 20), true));

    private static TextShape WithValue(string example) =>
        new("The message; {value} is where the value goes.", @"^[ -~]*\{value\}[ -~]*$", "printable ASCII with {value} in it") { Example = $"OUTP {example.Replace("1", "{value}", StringComparison.Ordinal)}" };

    private static MapShape Setting(Dimension dimension) => new($"A command with a {QuantityText.NameOf(dimension)} in it.",
        new Key("send", WithValue("1"), true),
        new Key("unit", Unit(dimension), true),
        new Key("decimals", new NumberShape("Decimals of a number without exponent; up to 12 significant digits without it.", 0, 15, Whole: true) { Example = "3" }));

    private static Key Field(string name, Dimension dimension) => new(name, new MapShape($"A {QuantityText.NameOf(dimension)}.",
        new Key("unit", Unit(dimension), true),
        new Key("from", new QuantityShape("Least plausible value.", dimension)),
        new Key("to", new QuantityShape("Greatest plausible value.", dimension))), true);

    private static MapShape Poll(string description, params Key[] fields) => new(description,
        new Key("ask", Message, true),
        new Key("reply", Reply, true),
        new Key("fields", new MapShape("How each field is read.", fields), true));

    private static ChoiceShape Unit(Dimension dimension) =>
        new("The instrument's unit.", [.. QuantityText.UnitsOf(dimension).Select(unit => unit.Symbol)]);
}
