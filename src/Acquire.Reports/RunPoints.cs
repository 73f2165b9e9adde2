using Acquire.Analysis.Dark;
using Acquire.Bench.Readings;
using Acquire.Runs.Files;
using Acquire.Runs.Records;

namespace Acquire.Reports;

/// <summary>The points of a run as the analysis takes them.</summary>
public static class RunPoints
{
    /// <summary>The points measured in the dark before any light at their temperature; flagged ones carry their reason.</summary>
    public static IReadOnlyList<ConductancePoint> Dark(RunReader run) =>
        [.. run.Points().Where(point => point.Light == LightState.Dark).Select(point => new ConductancePoint(
            point.Index, point.SampleK, Known(point.SampleUncertaintyK), point.ConductanceS, Known(point.ConductanceUncertaintyS), point.Leg,
            point.Quality == Quality.Good ? null : point.Reason ?? point.Quality.ToString()))];

    private static double Known(double uncertainty) => double.IsFinite(uncertainty) ? uncertainty : 0;
}
