using System.Globalization;
using Acquire.Analysis.Dark;
using Acquire.Reports;
using Acquire.Runs.Files;
using Acquire.Runs.Tables;

namespace Acquire.App.Fitting;

/// <summary>What a fit is made from: a run or a foreign table.</summary>
/// <param name="Title">What it is, for people.</param>
/// <param name="Points">The points.</param>
/// <param name="Material">Material symbol, or empty.</param>
/// <param name="GeometryPerM">Conductivity over conductance [1/m]; NaN when unknown.</param>
/// <param name="TemperatureUncertaintyK">Standard uncertainty common to all temperatures [K].</param>
internal sealed record FitInput(string Title, IReadOnlyList<ConductancePoint> Points, string Material, double GeometryPerM, double TemperatureUncertaintyK)
{
    /// <summary>The dark points of a run.</summary>
    public static FitInput Of(RunReader run) => new(
        $"{run.Header.SampleId}, {run.Header.Title}", RunPoints.Dark(run), run.Header.Material, run.Header.GeometryPerM, run.Header.TemperatureUncertaintyK);

    /// <summary>The rows of a table.</summary>
    public static FitInput Of(ConductanceTable table) => new(
        Path.GetFileName(table.Path),
        [.. table.Rows.Select((row, index) => new ConductancePoint(index + 1, row.TemperatureK, row.TemperatureUncertaintyK, row.Conductance, row.ConductanceUncertainty, 1,
            double.IsFinite(row.TemperatureK) && double.IsFinite(row.Conductance) ? null : string.Create(CultureInfo.InvariantCulture, $"line {row.Line} holds no number")))],
        "", double.NaN, 0);

    /// <summary>Opens a run or a table; problems in words when it is neither.</summary>
    public static (FitInput? Input, IReadOnlyList<string> Problems) Open(string path, IReadOnlyDictionary<string, string> map)
    {
        var looksLikeRun = path.EndsWith(".run", StringComparison.OrdinalIgnoreCase) || (File.Exists(path) && RunReader.LooksLikeOne(path));
        if (looksLikeRun)
        {
            var opening = RunReader.Open(path);
            if (opening.Reader is null)
            {
                return (null, [opening.Problem ?? path]);
            }

            using (opening.Reader)
            {
                return (Of(opening.Reader), []);
            }
        }

        var reading = TableFile.Read(path, map);
        return reading.Table is null ? (null, reading.Problems) : (Of(reading.Table), []);
    }
}
