using System.Text.RegularExpressions;
using Acquire.Bench.Text;

namespace Acquire.Drivers.Files;

/// <summary>Finds driver files by name: beside the bench file, in the user's folder, among those shipped in the program.</summary>
public sealed partial class DriverCatalogue
{
    /// <summary>The form of a driver's name; nothing in it can lead out of a folder.</summary>
    public const string NamePattern = "^[a-z0-9][a-z0-9-]*$";

    private const string Ending = ".driver.yaml";
    private readonly IReadOnlyList<string> _folders;

    private DriverCatalogue(IReadOnlyList<string> folders) => _folders = folders;

    /// <summary>The shipped drivers only.</summary>
    public static DriverCatalogue Shipped { get; } = new([]);

    /// <summary>Names of the shipped drivers.</summary>
    public static IReadOnlyList<string> ShippedNames { get; } = [.. typeof(DriverCatalogue).Assembly.GetManifestResourceNames()
        .Where(name => name.EndsWith(Ending, StringComparison.Ordinal)).Select(name => name[..^Ending.Length]).Order(StringComparer.Ordinal)];

    /// <summary>Looks beside a bench file, then in the user's folder, then among the shipped ones.</summary>
    public static DriverCatalogue For(string benchPath, string? userFolder = null) =>
        new([Path.GetDirectoryName(Path.GetFullPath(benchPath)) ?? ".", userFolder ?? UserFolder()]);

    /// <summary>Reads the first driver file of a name that is found.</summary>
    public Parsed<DriverFile> Find(string name)
    {
        if (!NameForm().IsMatch(name)) return NotFound(name, "this is not a name of a driver");
        foreach (var folder in _folders)
        {
            var path = Path.Combine(folder, name + Ending);
            if (File.Exists(path)) return Named(name, DriverFile.Read(path));
        }
        using var resource = typeof(DriverCatalogue).Assembly.GetManifestResourceStream(name + Ending);
        if (resource is null) return NotFound(name, "there is no driver of this name");
        using var reader = new StreamReader(resource);
        return Named(name, DriverFile.Parse(new SourceText(name + Ending, reader.ReadToEnd())));
    }

    // The name inside decides what a run records, so it must be the one that was asked for.
    private static Parsed<DriverFile> Named(string name, Parsed<DriverFile> found) =>
        found.Value is not { } driver || driver.Name == name ? found
        : Parsed.Bad<DriverFile>([new Diagnostic(driver.Source.File, Position.Start, "the driver's name is not that of its file", $"'{driver.Name}'", $"'{name}'", "rename the file, or correct 'driver:' in it")]);

    private Parsed<DriverFile> NotFound(string name, string what) =>
        Parsed.Bad<DriverFile>([new Diagnostic(name + Ending, Position.Start, what, $"'{name}'", string.Join(", ", ShippedNames),
            _folders.Count > 0 ? $"name one of them, or put {name}{Ending} into {string.Join(" or ", _folders)}" : "name one of them")]);

    private static string UserFolder()
    {
        var home = Environment.GetEnvironmentVariable("XDG_CONFIG_HOME");
        if (string.IsNullOrEmpty(home) || !Path.IsPathRooted(home)) home = Environment.GetFolderPath(Environment.SpecialFolder.ApplicationData);
        return Path.Combine(home, "acquire", "drivers");
    }

    [GeneratedRegex(NamePattern, RegexOptions.CultureInvariant)]
    private static partial Regex NameForm();
}
