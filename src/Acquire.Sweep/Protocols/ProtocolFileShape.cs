using Acquire.Bench.Text;

namespace Acquire.Sweep.Protocols;

/// <summary>What a protocol file looks like.</summary>
public static class ProtocolFileShape
{
    private static readonly Key[] Measurement =
    [
        new("bias", new QuantityShape("Bias magnitude; both polarities are applied. Keep it ohmic: a slope of ln I against ln V of 1.00.", Dimension.Voltage, 1e-6, 1100) { Example = "0.2 V" }, true),
        new("reversals", new NumberShape("Pairs of polarities; the half-difference cancels thermal EMF and background, the half-sum is kept as a warning.", 1, 100, Whole: true) { Example = "4" }),
        new("readings", new NumberShape("Readings per polarity and pair.", 2, 1000, Whole: true) { Example = "10" }),
        new("integrate", new QuantityShape("Integration per reading. Only whole line cycles reject pick-up.", Dimension.LineCycles, 0.01, 100) { Example = "5 line cycles" }),
        new("settled", new QuantityShape("The signal has settled when the means of two adjacent windows differ by less than this, twice in a row.", Dimension.Ratio, 1e-6, 0.5) { Example = "0.2 %" }),
        new("settle time-out", new QuantityShape("Bound on that wait; then the point is taken and flagged as unsettled.", Dimension.Time, 0, 86400) { Example = "2 min" }),
    ];

    private static readonly MapShape Leg = new("One leg: temperatures from one end to the other.",
        new Key("from", new QuantityShape("First temperature.", Dimension.Temperature, 1) { Example = "420 K" }, true),
        new Key("to", new QuantityShape("Last temperature.", Dimension.Temperature, 1) { Example = "250 K" }, true),
        new Key("points", new NumberShape("Number of temperatures, before floor and cap on the step act.", 2, 1000, Whole: true) { Example = "30" }, true),
        new Key("spacing", new ChoiceShape("Equal steps in 1/T weight an Arrhenius fit evenly; equal steps in T suit a survey.", "reciprocal", "equal")),
        new Key("least step", new QuantityShape("Floor on the step.", Dimension.TemperatureDifference, 0.01, 500) { Example = "1 K" }),
        new Key("largest step", new QuantityShape("Cap on the step: longer steps are divided.", Dimension.TemperatureDifference, 0.01, 500) { Example = "10 K" }),
        new Key("ramp", new QuantityShape("Rate between temperatures. The sample lags the stage by ramp times time constant.", Dimension.TemperatureRate, 1e-6, 10) { Example = "3 K/min" }, true),
        new Key("at each", new ListShape("What is measured at each temperature, in this order. Dark always comes first: light fills traps that may not empty for hours.",
            new ChoiceShape("A measurement.", "dark", "lit"), 1, 3)));

    /// <summary>The shape.</summary>
    public static MapShape Shape { get; } = new("A scripted temperature sweep.",
        new Key("protocol", new TextShape("Title of the sweep.") { Example = "dark and lit, warming" }, true),
        new Key("purpose", new TextShape("What the sweep is for.") { Example = "is this wafer intrinsic above 300 K?" }),
        new Key("sample", new MapShape("The sample on the holder.",
            new Key("id", new TextShape("Identifier of the sample.") { Example = "G-0417" }, true),
            new Key("material", new ChoiceShape("Material: names the set of constants that the verdict uses.", "Ge", "Si", "GaAs")),
            new Key("geometry", new MapShape("Shape of the sample.",
                new Key("bar", new MapShape("A bar: conductivity = G length / (width thickness).",
                    new Key("length", new QuantityShape("Between the contacts that measure.", Dimension.Length, 1e-6, 1) { Example = "8 mm" }, true),
                    new Key("width", new QuantityShape("Width.", Dimension.Length, 1e-6, 1) { Example = "2 mm" }, true),
                    new Key("thickness", new QuantityShape("Thickness.", Dimension.Length, 1e-9, 0.1) { Example = "0.50 mm" }, true)), true))),
            new Key("expected net doping", new QuantityShape("A guess, for the plan's expected signal only; negative for acceptors.", Dimension.NumberDensity) { Example = "1e12 cm-3" })), true),
        new Key("measure", new MapShape("How the conductance is measured.",
            new Key("dark", new MapShape("In the dark.", Measurement), true),
            new Key("lit", new MapShape("Under light.",
            [
                new("wavelength", new QuantityShape("Wavelength; the bench's lamp must have it.", Dimension.Length, 100e-9, 20e-6) { Example = "940 nm" }, true),
                new("irradiance", new QuantityShape("Irradiance on the sample.", Dimension.Irradiance, 1e-9) { Example = "1 mW/cm2" }, true),
                .. Measurement,
                new("recover", new QuantityShape("After light, wait until the dark conductance is back within this of the value before.", Dimension.Ratio, 1e-6, 1) { Example = "2 %" }),
                new("recover time-out", new QuantityShape("Bound on that wait; then the dark point after light is taken and flagged. Warming clears traps, waiting rarely does.", Dimension.Time, 0, 86400) { Example = "10 min" }),
            ]))), true),
        new Key("settle", new MapShape("When a temperature counts as reached. Band and drift come from the physics (Ea/kT^2) unless given.",
            new Key("window", new QuantityShape("The gate must hold over this long; practice: the longer of 3 min and five sample time constants.", Dimension.Time, 2, 36000) { Example = "3 min" }),
            new Key("band", new QuantityShape("Largest distance of the stage from the target.", Dimension.TemperatureDifference, 1e-4, 50) { Example = "0.1 K" }),
            new Key("drift", new QuantityShape("Largest drift of the sample over the window.", Dimension.TemperatureRate, 1e-9, 1) { Example = "30 mK/min" }),
            new Key("time-out", new QuantityShape("Bound on the wait after the ramp's end.", Dimension.Time, 1, 86400) { Example = "30 min" }),
            new Key("on time-out", new ChoiceShape("flag: measure and flag the point; skip: leave it out; hold: wait for a person; end: make safe and end.", "flag", "skip", "hold", "end")))),
        new Key("legs", new ListShape("The legs in order.", Leg, 1, 100), true),
        new Key("finish", new ChoiceShape("The end state: heater off, bias 0, light off.", "safe")));
}
