namespace Acquire.Runs.Files;

/// <summary>One run of a folder.</summary>
/// <param name="Path">The file.</param>
/// <param name="Sample">Sample identifier.</param>
/// <param name="StartUtc">Start.</param>
/// <param name="State">State in words.</param>
/// <param name="Points">Measured points.</param>
/// <param name="AnalysisJson">The newest stored dark analysis, or null.</param>
/// <param name="Problem">Why it cannot be read; null when it can.</param>
public sealed record RunEntry(string Path, string Sample, DateTimeOffset StartUtc, string State, long Points, string? AnalysisJson, string? Problem);

/// <summary>Lists the runs of a folder.</summary>
public static class RunCatalogue
{
    /// <summary>Every <c>*.run</c> file of the folder, newest first; damaged ones are listed with their problem.</summary>
    public static IReadOnlyList<RunEntry> List(string folder) =>
        [.. Directory.EnumerateFiles(folder, "*.run").Select(Entry).OrderByDescending(entry => entry.StartUtc).ThenBy(entry => entry.Path, StringComparer.Ordinal)];

    private static RunEntry Entry(string path)
    {
        var opening = RunReader.Open(path);
        if (opening.Reader is null)
        {
            return new(path, "", default, "unreadable", 0, null, opening.Problem);
        }

        using var reader = opening.Reader;
        return new(path, reader.Header.SampleId, reader.Header.StartUtc, reader.State, reader.Count(RunTable.Points), reader.LatestAnalysis("dark"), null);
    }
}
