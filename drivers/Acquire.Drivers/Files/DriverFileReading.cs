using Acquire.Bench.Readings;
using Acquire.Bench.Text;
using Acquire.Drivers.Instruments;
using Acquire.Drivers.Replies;
using Acquire.Wire;

namespace Acquire.Drivers.Files;

/// <summary>Turns a document that passed its shape into the model, and checks what a shape cannot say.</summary>
internal sealed class DriverFileReading(SourceText source, YamlMap root, ShapeReport report)
{
    private readonly IReadOnlyList<OverloadMarker> _markers = Markers(root);

    public DriverFile Model()
    {
        var roles = new[] { "temperature loop", "source-meter", "lamp" };
        if (roles.Count(root.Has) != 1)
            report.Add(root.At, "a driver plays exactly one role", string.Join(", ", roles.Where(root.Has)), string.Join(", ", roles), "keep one of them; write another driver file for another role");
        return new DriverFile
        {
            Name = root.Text("driver"),
            Speaks = root.Text("speaks"),
            Source = source,
            Framing = Framing(),
            Identity = Question(root.Map("identity")),
            Start = [.. root.List("start").Cast<YamlText>().Select(text => text.Value)],
            Errors = root.MapOrNull("errors") is { } errors ? Question(errors) : null,
            MakeSafe = [.. root.List("make safe").Cast<YamlMap>().Select(Step)],
            Loop = root.MapOrNull("temperature loop") is { } loop ? Loop(loop) : null,
            Meter = root.MapOrNull("source-meter") is { } meter ? Meter(meter) : null,
            Lamp = root.MapOrNull("lamp") is { } lamp ? Lamp(lamp) : null,
        };
    }

    private static IReadOnlyList<OverloadMarker> Markers(YamlMap root) => root.Find("overload") switch
    {
        YamlText => OverloadMarker.Scpi,
        YamlList list => [.. list.Items.Cast<YamlMap>().Select(map => new OverloadMarker(map.Number("value"), map.Text("means") switch
        {
            "overrange" => Quality.Overrange,
            "underrange" => Quality.Underrange,
            _ => Quality.Implausible,
        }))],
        _ => [],
    };

    private TextFraming Framing()
    {
        var line = root.MapOrNull("line");
        var end = line?.TextOr("ends with", "LF") switch { "CRLF" => "\r\n", "CR" => "\r", _ => "\n" };
        return new TextFraming { WriteTerminator = end, ReadTerminator = end, LongestReply = line?.IntegerOr("longest reply", 4096) ?? 4096 };
    }

    private LoopCommands Loop(YamlMap map) => new(
        Poll(map.Map("poll"), ("stage", Dimension.Temperature), ("sample", Dimension.Temperature), ("set point", Dimension.Temperature), ("heater power", Dimension.Power)),
        Setting(map.Map("set point"), Dimension.Temperature), Setting(map.Map("ramp"), Dimension.TemperatureRate), TwoPositions(map.Map("heater")));

    private MeterCommands Meter(YamlMap map)
    {
        var status = map.Map("read").Map("fields").MapOrNull("status");
        (string, Dimension)[] fields = [("current", Dimension.Current), ("voltage", Dimension.Voltage)];
        return new MeterCommands
        {
            Read = Poll(map.Map("read"), status is null ? fields : [.. fields, ("status", Dimension.Ratio)]),
            ComplianceBit = status?.Has("compliance bit") == true ? status.Integer("compliance bit") : null,
            OverloadBit = status?.Has("overload bit") == true ? status.Integer("overload bit") : null,
            CurrentLimit = Setting(map.Map("current limit"), Dimension.Current),
            Integration = Setting(map.Map("integration"), Dimension.LineCycles),
            AutorangeOff = map.Text("autorange off"),
            Range = Setting(map.Map("range"), Dimension.Current),
            Bias = Setting(map.Map("bias"), Dimension.Voltage),
            Output = TwoPositions(map.Map("output")),
            RangesA = Ranges(map),
        };
    }

    private LampCommands Lamp(YamlMap map) => new(
        Poll(map.Map("poll"), ("drive", Dimension.Current), ("monitor", Dimension.Current)),
        Setting(map.Map("drive"), Dimension.Current), TwoPositions(map.Map("output")));

    private List<double> Ranges(YamlMap map)
    {
        var ranges = map.List("ranges").Cast<YamlText>().Select(text => QuantityText.ParseOrThrow(text.Value, Dimension.Current)).ToList();
        if (!ranges.SequenceEqual(ranges.Distinct().Order()))
            report.Add(map.AtOf("ranges"), "the ranges do not ascend", "", "each full scale above the one before", "sort them");
        return ranges;
    }

    private Poll Poll(YamlMap map, params ReadOnlySpan<(string Name, Dimension Dimension)> wanted)
    {
        var template = ReplyTemplate.TryParse(map.Text("reply"), out var problem);
        if (template is null)
        {
            report.Add(map.AtOf("reply"), $"this is no form of a reply: {problem}", $"'{map.Text("reply")}'", "names in braces, separated", "correct it");
            return new Poll(map.Text("ask"), ReplyTemplate.TryParse("{x}", out _)!, []);
        }
        List<FieldReader> readers = [.. template.Names.Select(name => new FieldReader(name, UnitScale.None, double.NegativeInfinity, double.PositiveInfinity, _markers))];
        var names = new List<string>();
        foreach (var (name, dimension) in wanted)
        {
            names.Add(name);
            if (template.IndexOf(name) is >= 0 and var at) readers[at] = Field(map.Map("fields").Map(name), name, dimension);
        }
        if (!names.Order(StringComparer.Ordinal).SequenceEqual(template.Names.Order(StringComparer.Ordinal)) || names.Count > PolledNumbers.MostFields)
            report.Add(map.AtOf("reply"), "the reply does not have the fields of this poll", $"'{template.Text}'", string.Join(", ", names.Select(n => $"{{{n}}}")), "name each of them once");
        return new Poll(map.Text("ask"), template, readers);
    }

    private FieldReader Field(YamlMap map, string name, Dimension dimension) => new(name,
        map.Has("unit") ? Scale(map.Text("unit"), dimension) : UnitScale.None,
        map.QuantityOr("from", dimension, double.MinValue), map.QuantityOr("to", dimension, double.MaxValue), _markers);

    private static Setting Setting(YamlMap map, Dimension dimension) =>
        new(map.Text("send"), Scale(map.Text("unit"), dimension), map.Has("decimals") ? map.Integer("decimals") : null);

    private static UnitScale Scale(string symbol, Dimension dimension)
    {
        var unit = QuantityText.UnitsOf(dimension).First(candidate => candidate.Symbol == symbol);
        return new UnitScale(symbol, unit.Factor, unit.Offset);
    }

    private static Switch TwoPositions(YamlMap map) => new(map.Text("send"), map.Text("on"), map.Text("off"));

    private SafeStep Step(YamlMap map) => map.Has("send") ? new SafeStep(map.Text("send"), null) : new SafeStep(null, Question(map));

    private Check Question(YamlMap map)
    {
        var check = Check.TryCreate(map.Text("ask"), map.Text("expect"), out var problem);
        if (check is null) report.Add(map.AtOf("expect"), $"this is no regular expression: {problem}", $"'{map.Text("expect")}'", "a regular expression without back references", "correct it");
        return check ?? Check.TryCreate(map.Text("ask"), "", out _)!;
    }
}
