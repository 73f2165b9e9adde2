namespace Acquire.App.Checking;

/// <summary>What a file a user names is meant to be, by its name.</summary>
internal enum FileKind
{
    Unknown = 0,
    Bench = 1,
    Twin = 2,
    Driver = 3,
    Protocol = 4,
}

/// <summary>Tells the kinds apart.</summary>
internal static class FileKinds
{
    private static readonly (string Ending, FileKind Kind)[] Endings =
    [
        (".bench.yaml", FileKind.Bench),
        (".twin.yaml", FileKind.Twin),
        (".driver.yaml", FileKind.Driver),
        (".protocol.yaml", FileKind.Protocol),
    ];

    /// <summary>The endings that are known, for messages.</summary>
    public static string Known => string.Join(", ", Endings.Select(entry => "*" + entry.Ending));

    /// <summary>The kind of a file by its name.</summary>
    public static FileKind Of(string path) =>
        Endings.FirstOrDefault(entry => path.EndsWith(entry.Ending, StringComparison.OrdinalIgnoreCase)).Kind;
}
