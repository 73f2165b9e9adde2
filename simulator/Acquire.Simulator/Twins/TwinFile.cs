using Acquire.Bench.Files;
using Acquire.Bench.Text;

namespace Acquire.Simulator.Twins;

/// <summary>A twin file: how the simulator plays a bench.</summary>
/// <param name="Source">The file and its exact text.</param>
/// <param name="Model">What it says.</param>
public sealed record TwinFile(SourceText Source, TwinModel Model)
{
    /// <summary>Reads the twin file that a bench file names: beside it, or else the shipped one of that name.</summary>
    public static Parsed<TwinFile> Beside(BenchFile bench)
    {
        ArgumentNullException.ThrowIfNull(bench);
        if (bench.TwinFile is null)
        {
            return Parsed.Bad<TwinFile>([new Diagnostic(bench.Source.File, Position.Start, "the bench names no twin, so the simulator cannot play it",
                "", "", "add 'twin: name.twin.yaml'")]);
        }
        var source = SourceText.Read(Path.Combine(Path.GetDirectoryName(bench.Source.File) ?? "", bench.TwinFile));
        if (source.Value is null && ShippedBenchFiles.Find(bench.TwinFile) is { } shipped) source = Parsed.Good(shipped);
        if (source.Value is null) return Parsed.Bad<TwinFile>(source.Diagnostics);
        var twin = Parse(source.Value);
        return twin.Value is null ? twin : AgreesWith(bench, twin.Value);
    }

    /// <summary>Parses the text of a twin file.</summary>
    public static Parsed<TwinFile> Parse(SourceText source)
    {
        ArgumentNullException.ThrowIfNull(source);
        var document = YamlDocument.Parse(source);
        if (document.Value is null) return Parsed.Bad<TwinFile>(document.Diagnostics);
        var report = new ShapeReport(source.File);
        TwinFileShape.Shape.Check(document.Value, report);
        if (report.Diagnostics.Count > 0) return Parsed.Bad<TwinFile>(report.Diagnostics);
        var root = (YamlMap)document.Value;
        TwinFileReading.CrossCheck(root, report);
        return report.Diagnostics.Count > 0
            ? Parsed.Bad<TwinFile>(report.Diagnostics)
            : Parsed.Good(new TwinFile(source, TwinFileReading.Model(root)));
    }

    private static Parsed<TwinFile> AgreesWith(BenchFile bench, TwinFile twin) =>
        bench.Wiring.Lamp is null || twin.Model.Lamp is not null
            ? Parsed.Good(twin)
            : Parsed.Bad<TwinFile>([new Diagnostic(twin.Source.File, Position.Start, $"the bench {bench.Source.File} has a lamp and its twin has none",
                "", "", "add 'lamp:' here, or take it out of the wiring there")]);
}
