using Acquire.Bench.Text;

namespace Acquire.App.Fitting;

/// <summary>A settings file for fits: what is said there wins over the run, what is said on the command line wins over it.</summary>
internal static class FitSettingsFile
{
    private static readonly MapShape Shape = new("Settings of a dark fit.",
        new Key("material", new ChoiceShape("Material: names the set of constants.", "Ge", "Si", "GaAs")),
        new Key("temperature uncertainty", new QuantityShape("Standard uncertainty common to all temperatures.", Dimension.TemperatureDifference, 0, 50) { Example = "0.1 K" }),
        new Key("density exponent", new NumberShape("Exponent of the density-of-states prefactor.", 0, 5) { Example = "1.5" }),
        new Key("mobility exponent", new NumberShape("Exponent by which the mobility falls with temperature.", -5, 5) { Example = "1.9" }));

    /// <summary>Reads the file.</summary>
    public static Parsed<FitOptions> Read(string path)
    {
        var source = SourceText.Read(path);
        if (source.Value is null)
        {
            return Parsed.Bad<FitOptions>(source.Diagnostics);
        }

        var document = YamlDocument.Parse(source.Value);
        if (document.Value is null)
        {
            return Parsed.Bad<FitOptions>(document.Diagnostics);
        }

        var report = new ShapeReport(path);
        Shape.Check(document.Value, report);
        if (report.Diagnostics.Count > 0 || document.Value is not YamlMap map)
        {
            return Parsed.Bad<FitOptions>(report.Diagnostics);
        }

        return Parsed.Good(new FitOptions
        {
            Material = map.Has("material") ? map.Text("material") : null,
            TemperatureUncertaintyK = map.Has("temperature uncertainty") ? map.Quantity("temperature uncertainty", Dimension.TemperatureDifference) : null,
            DensityExponent = map.Has("density exponent") ? map.Number("density exponent") : null,
            MobilityExponent = map.Has("mobility exponent") ? map.Number("mobility exponent") : null,
        });
    }
}
