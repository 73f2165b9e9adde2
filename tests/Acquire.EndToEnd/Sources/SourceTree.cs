namespace Acquire.EndToEnd.Sources;

/// <summary>The checkout that these tests were built from.</summary>
internal static class SourceTree
{
    /// <summary>The folder that holds the solution.</summary>
    public static string Root { get; } = FindRoot();

    /// <summary>Files below the root that match a pattern, without build output, as paths relative to the root with forward slashes.</summary>
    public static IReadOnlyList<string> Files(string pattern) =>
        [.. Directory.EnumerateFiles(Root, pattern, SearchOption.AllDirectories)
            .Select(path => Path.GetRelativePath(Root, path).Replace('\\', '/'))
            .Where(path => !path.Split('/').Any(part => part is "bin" or "obj" or ".git" or "TestResults" or "runs"))
            .Order(StringComparer.Ordinal)];

    /// <summary>The text of one file.</summary>
    public static string Read(string relative) => File.ReadAllText(Path.Combine(Root, relative));

    private static string FindRoot()
    {
        for (var folder = new DirectoryInfo(AppContext.BaseDirectory); folder is not null; folder = folder.Parent)
        {
            if (File.Exists(Path.Combine(folder.FullName, "Acquire.sln")))
            {
                return folder.FullName;
            }
        }

        throw new DirectoryNotFoundException($"No Acquire.sln above {AppContext.BaseDirectory}.");
    }
}
