using Acquire.Bench.Text;
using Acquire.Runs.Plans;

namespace Acquire.Sweep.Protocols;

/// <summary>Turns a document that passed its shape into the model, and checks what a shape cannot say.</summary>
internal static class ProtocolReading
{
    public static ProtocolFile Model(SourceText source, YamlMap root, ShapeReport report)
    {
        var measure = root.Map("measure");
        var lit = measure.MapOrNull("lit");
        var protocol = new ProtocolFile
        {
            Title = root.Text("protocol"),
            Source = source,
            Purpose = root.TextOr("purpose", ""),
            Sample = Sample(root.Map("sample")),
            Dark = Measurement(measure.Map("dark")),
            Lit = lit is null ? null : Measurement(lit),
            Light = lit is null ? null : Light(lit),
            Settling = Settling(root.MapOrNull("settle")),
            Legs = [.. root.List("legs").Cast<YamlMap>().Select(leg => Leg(leg, lit is not null, report))],
        };
        return protocol;
    }

    private static ProtocolSample Sample(YamlMap map)
    {
        var bar = map.MapOrNull("geometry")?.Map("bar");
        var geometry = bar is null ? double.NaN
            : bar.Quantity("length", Dimension.Length) / (bar.Quantity("width", Dimension.Length) * bar.Quantity("thickness", Dimension.Length));
        return new(map.Text("id"), map.Has("material") ? map.Text("material") : null, geometry, map.QuantityOr("expected net doping", Dimension.NumberDensity, 0), map.At);
    }

    private static ProtocolMeasurement Measurement(YamlMap map) => new(
        map.Quantity("bias", Dimension.Voltage), map.IntegerOr("reversals", 4), map.IntegerOr("readings", 10),
        map.QuantityOr("integrate", Dimension.LineCycles, 5), map.QuantityOr("settled", Dimension.Ratio, 0.002), map.QuantityOr("settle time-out", Dimension.Time, 120), map.At);

    private static ProtocolLight Light(YamlMap map) => new(
        map.Quantity("wavelength", Dimension.Length), map.Quantity("irradiance", Dimension.Irradiance),
        map.QuantityOr("recover", Dimension.Ratio, double.NaN), map.QuantityOr("recover time-out", Dimension.Time, 600), map.At);

    private static ProtocolSettling Settling(YamlMap? map) => map is null ? new(180, double.NaN, double.NaN, 1800, TimeOutPolicy.Flag) : new(
        map.QuantityOr("window", Dimension.Time, 180), map.QuantityOr("band", Dimension.TemperatureDifference, double.NaN),
        map.QuantityOr("drift", Dimension.TemperatureRate, double.NaN), map.QuantityOr("time-out", Dimension.Time, 1800),
        Enum.Parse<TimeOutPolicy>(map.TextOr("on time-out", "flag"), ignoreCase: true));

    private static ProtocolLeg Leg(YamlMap map, bool hasLit, ShapeReport report)
    {
        var order = map.List("at each").Cast<YamlText>().Select(text => text.Value).ToArray();
        var lit = order.Contains("lit");
        if (order.Length > 0 && order[0] == "lit")
        {
            report.Add(map.AtOf("at each"), "light comes before dark", "'[lit ...]'", "dark first", "write '[dark, lit, dark]': light fills traps that may not empty for hours");
        }
        else if (order.Length > 0 && !order.SequenceEqual(["dark"]) && !order.SequenceEqual(["dark", "lit", "dark"]) && !order.SequenceEqual(["dark", "lit"]))
        {
            report.Add(map.AtOf("at each"), "this order is not known", $"'[{string.Join(", ", order)}]'", "[dark] or [dark, lit, dark]", "write one of them");
        }

        if (lit && !hasLit)
        {
            report.Add(map.AtOf("at each"), "the leg is lit and 'measure' says nothing about light", "'lit'", "", "add 'measure: lit:', or measure dark only");
        }

        var leg = new ProtocolLeg(
            map.Quantity("from", Dimension.Temperature), map.Quantity("to", Dimension.Temperature), map.Integer("points"), map.TextOr("spacing", "reciprocal") == "reciprocal",
            map.QuantityOr("least step", Dimension.TemperatureDifference, 0), map.QuantityOr("largest step", Dimension.TemperatureDifference, double.PositiveInfinity),
            map.Quantity("ramp", Dimension.TemperatureRate), lit, map);
        if (leg.FromK == leg.ToK)
        {
            report.Add(map.AtOf("to"), "the leg goes nowhere", $"'{map.Text("to")}'", "another temperature than 'from'", "change one of them");
        }

        if (leg.LeastStepK > leg.LargestStepK)
        {
            report.Add(map.AtOf("least step"), "the floor on the step lies above its cap", $"'{map.Text("least step")}'", "at most the largest step", "lower it");
        }

        return leg;
    }
}
