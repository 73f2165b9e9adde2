using Acquire.Bench.Readings;
using Acquire.Runs.Records;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>Points in their table, both ways.</summary>
internal static class PointRows
{
    public const string Columns =
        "id, step, leg, direction, light, start_us, end_us, set_point_K, stage_K, sample_K, sample_u_K, bias_V, current_plus_A, current_minus_A, "
        + "conductance_S, conductance_u_S, half_sum_A, range_A, readings, soak_s, signal_settle_s, wavelength_m, irradiance_W_per_m2, monitor_A, "
        + "since_light_s, quality, reason, gates";

    private static readonly int ColumnCount = Columns.Split(',').Length;

    public static void Insert(SqliteConnection connection, PointRecord point)
    {
        object[] values =
        [
            point.Index, point.Step, point.Leg, point.Direction, (int)point.Light, point.StartUs, point.EndUs,
            SqliteFiles.OrNull(point.SetPointK), SqliteFiles.OrNull(point.StageK), SqliteFiles.OrNull(point.SampleK), SqliteFiles.OrNull(point.SampleUncertaintyK),
            SqliteFiles.OrNull(point.BiasV), SqliteFiles.OrNull(point.CurrentPlusA), SqliteFiles.OrNull(point.CurrentMinusA),
            SqliteFiles.OrNull(point.ConductanceS), SqliteFiles.OrNull(point.ConductanceUncertaintyS), SqliteFiles.OrNull(point.HalfSumA), SqliteFiles.OrNull(point.RangeA),
            point.Readings, SqliteFiles.OrNull(point.SoakS), SqliteFiles.OrNull(point.SignalSettleS), SqliteFiles.OrNull(point.WavelengthM),
            SqliteFiles.OrNull(point.IrradianceWPerM2), SqliteFiles.OrNull(point.MonitorA), SqliteFiles.OrNull(point.SinceLightS),
            (int)point.Quality, (object?)point.Reason ?? DBNull.Value, point.GatesJson,
        ];
        var names = Enumerable.Range(1, ColumnCount).Select(index => FormattableString.Invariant($"$v{index}")).ToArray();
        SqliteFiles.Execute(connection, $"INSERT INTO point({Columns}) VALUES({string.Join(", ", names)});", [.. names.Zip(values)]);
    }

    public static PointRecord Read(SqliteDataReader row)
    {
        double Number(int column) => row.IsDBNull(column) ? double.NaN : row.GetDouble(column);
        return new PointRecord
        {
            Index = row.GetInt32(0),
            Step = row.GetInt32(1),
            Leg = row.GetInt32(2),
            Direction = row.GetInt32(3),
            Light = (LightState)row.GetInt32(4),
            StartUs = row.GetInt64(5),
            EndUs = row.GetInt64(6),
            SetPointK = Number(7),
            StageK = Number(8),
            SampleK = Number(9),
            SampleUncertaintyK = Number(10),
            BiasV = Number(11),
            CurrentPlusA = Number(12),
            CurrentMinusA = Number(13),
            ConductanceS = Number(14),
            ConductanceUncertaintyS = Number(15),
            HalfSumA = Number(16),
            RangeA = Number(17),
            Readings = row.GetInt32(18),
            SoakS = Number(19),
            SignalSettleS = Number(20),
            WavelengthM = Number(21),
            IrradianceWPerM2 = Number(22),
            MonitorA = Number(23),
            SinceLightS = Number(24),
            Quality = (Quality)row.GetInt32(25),
            Reason = row.IsDBNull(26) ? null : row.GetString(26),
            GatesJson = row.GetString(27),
        };
    }
}
