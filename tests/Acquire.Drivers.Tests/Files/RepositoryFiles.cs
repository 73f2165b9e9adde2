namespace Acquire.Drivers.Tests.Files;

/// <summary>The files beside the sources that tests compare with.</summary>
internal static class RepositoryFiles
{
    public static string Drivers { get; } = Path.Combine(Root(), "drivers");

    private static string Root()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (folder is not null && !File.Exists(Path.Combine(folder.FullName, "Acquire.sln"))) folder = folder.Parent;
        return folder?.FullName ?? throw new InvalidOperationException("The tests do not run inside the repository.");
    }
}
