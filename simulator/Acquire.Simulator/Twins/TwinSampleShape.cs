using Acquire.Bench.Text;
using static Acquire.Simulator.Twins.TwinFileShape;

namespace Acquire.Simulator.Twins;

/// <summary>What the sample of a twin file looks like.</summary>
internal static class TwinSampleShape
{
    private const double MostPerM3 = 1e27;

    private static readonly MapShape Deep = new("A level deep in the gap.",
        new Key("kind", new ChoiceShape("What it is.", "donor", "acceptor"), true),
        Need("density", Dimension.NumberDensity, "Its density.", "1e11 cm-3", 0, MostPerM3),
        Need("below conduction band", Dimension.Energy, "Its depth.", "0.33 eV", 0, 1e-18));

    private static readonly MapShape Bar = new("A bar between its contacts.",
        Need("length", Dimension.Length, "Between the contacts.", "8 mm", 1e-7, 1),
        Need("width", Dimension.Length, "Across.", "2 mm", 1e-7, 1),
        Need("thickness", Dimension.Length, "Along the light.", "0.50 mm", 1e-9, 0.1));

    private static readonly MapShape Light = new("What light does.",
        Need("reflectance", Dimension.Ratio, "Part of the light that is reflected.", "36 %", 0, 1),
        Need("absorption length", Dimension.Length, "Depth at which the light has fallen to 1/e.", "0.8 um", 1e-9, 1),
        Need("lifetime", Dimension.Time, "Lifetime of excess carriers at 300 K and at the reference density.", "20 us", 1e-12, 1),
        new Key("lifetime exponent", new NumberShape("Power of temperature that the lifetime follows.", -5, 5) { Example = "0.5" }),
        new Key("intensity exponent", new NumberShape("Power of the intensity that the photoconductance follows.", 0.2, 2) { Example = "0.95" }),
        Need("reference density", Dimension.NumberDensity, "Density of excess carriers at which the lifetime is given.", "5e12 cm-3", 1, MostPerM3),
        Can("traps", Dimension.NumberDensity, "Traps for the minority carrier.", "2e10 cm-3", 0, MostPerM3),
        Can("trap depth", Dimension.Energy, "Depth of the traps.", "0.60 eV", 0, 1e-18),
        Can("attempt frequency", Dimension.Frequency, "Attempt frequency of the emission from traps.", "1e9 kHz", 1, 1e16),
        Can("capture density", Dimension.NumberDensity, "Density of excess carriers at which an empty trap fills within a second.", "1e12 cm-3", 1, MostPerM3));

    public static MapShape Shape { get; } = new("The invented sample, with its true values.",
        new Key("material", new ChoiceShape("Material set.", "Ge", "Si", "GaAs"), true),
        Need("donors", Dimension.NumberDensity, "Shallow donors.", "6e11 cm-3", 0, MostPerM3),
        Need("acceptors", Dimension.NumberDensity, "Shallow acceptors.", "3e11 cm-3", 0, MostPerM3),
        Can("donor depth", Dimension.Energy, "Below the conduction band.", "10 meV", 0, 1e-18),
        Can("acceptor depth", Dimension.Energy, "Above the valence band.", "10 meV", 0, 1e-18),
        new Key("deep level", Deep),
        new Key("bar", Bar, true),
        Can("contact resistance", Dimension.Resistance, "Of both contacts together.", "2 ohm", 0, 1e15),
        Can("leakage", Dimension.Conductance, "Beside the bulk, at 300 K.", "1 nS", 0, 1),
        Can("leakage energy", Dimension.Energy, "Activation energy of the leakage.", "0.3 eV", 0, 1e-18),
        Can("contact EMF", Dimension.Voltage, "Constant EMF of the contacts.", "3 uV", -1, 1),
        Can("thermoelectric", Dimension.ThermoelectricPower, "EMF per kelvin between stage and sample.", "0.4 mV/K", -0.1, 0.1),
        new Key("light", Light, true));
}
