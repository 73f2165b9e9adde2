using System.Globalization;
using Acquire.Bench.Readings;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;

namespace Acquire.Runs.Tables;

/// <summary>Brings a foreign table into a run file: its rows become points, its text is kept whole.</summary>
public static class RunImport
{
    /// <summary>Writes the run; throws <see cref="RunFileException"/> when it cannot be made.</summary>
    public static async Task WriteAsync(ConductanceTable table, string outPath, RunHeader header, TimeProvider clock)
    {
        var recorder = RunWriter.Create(outPath, header, [], new WriterOptions(true, clock, clock.GetTimestamp()));
        await using (recorder)
        {
            recorder.Append(new RunEvent(0, "import", Severity.Note, "import", string.Create(CultureInfo.InvariantCulture,
                $"{table.Rows.Count} rows imported from {Path.GetFileName(table.Path)}: {string.Join("; ", table.Understood)}.")));
            for (var i = 0; i < table.Rows.Count; i++)
            {
                recorder.Append(Point(i + 1, table.Rows[i], i > 0 ? table.Rows[i - 1].TemperatureK : double.NaN));
            }

            await recorder.SealAsync("imported", CancellationToken.None);
            if (recorder.Health.Failure is { } failure)
            {
                throw new RunFileException(failure);
            }
        }
    }

    private static PointRecord Point(int index, ConductanceRow row, double beforeK) => new()
    {
        Index = index,
        Step = index - 1,
        Leg = 1,
        Direction = double.IsNaN(beforeK) ? 0 : Math.Sign(row.TemperatureK - beforeK),
        Light = LightState.Dark,
        StartUs = 0,
        EndUs = 0,
        SetPointK = double.NaN,
        StageK = double.NaN,
        SampleK = row.TemperatureK,
        SampleUncertaintyK = row.TemperatureUncertaintyK,
        BiasV = double.NaN,
        CurrentPlusA = double.NaN,
        CurrentMinusA = double.NaN,
        ConductanceS = row.Conductance,
        ConductanceUncertaintyS = row.ConductanceUncertainty,
        HalfSumA = double.NaN,
        RangeA = double.NaN,
        Readings = 1,
        SoakS = double.NaN,
        SignalSettleS = double.NaN,
        WavelengthM = double.NaN,
        IrradianceWPerM2 = double.NaN,
        MonitorA = double.NaN,
        SinceLightS = double.NaN,
        Quality = double.IsFinite(row.TemperatureK) && double.IsFinite(row.Conductance) ? Quality.Good : Quality.Implausible,
        Reason = double.IsFinite(row.TemperatureK) && double.IsFinite(row.Conductance) ? null : string.Create(CultureInfo.InvariantCulture, $"line {row.Line} holds no number"),
        GatesJson = "{}",
    };
}
