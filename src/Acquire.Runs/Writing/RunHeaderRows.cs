using System.Globalization;
using Acquire.Runs.Records;
using Microsoft.Data.Sqlite;

namespace Acquire.Runs.Writing;

/// <summary>The header in its tables, both ways.</summary>
internal static class RunHeaderRows
{
    public static void Insert(SqliteConnection connection, RunHeader header, IReadOnlyList<Channel> channels)
    {
        SqliteFiles.Execute(connection, "BEGIN IMMEDIATE;");
        foreach (var (key, value) in Values(header))
        {
            SqliteFiles.Execute(connection, "INSERT INTO run(key, value) VALUES($key, $value);", ("$key", key), ("$value", value));
        }

        foreach (var text in header.Texts)
        {
            SqliteFiles.Execute(connection, "INSERT INTO text(role, name, sha256, text) VALUES($role, $name, $sha, $text);",
                ("$role", text.Role), ("$name", text.Name), ("$sha", text.Sha256), ("$text", text.Text));
        }

        foreach (var instrument in header.Instruments)
        {
            SqliteFiles.Execute(connection, "INSERT INTO instrument(name, driver, address, identity) VALUES($name, $driver, $address, $identity);",
                ("$name", instrument.Name), ("$driver", instrument.Driver), ("$address", instrument.Address), ("$identity", instrument.Identity));
        }

        foreach (var channel in channels)
        {
            SqliteFiles.Execute(connection, "INSERT INTO channel(id, name, unit, instrument) VALUES($id, $name, $unit, $instrument);",
                ("$id", channel.Id), ("$name", channel.Name), ("$unit", channel.Unit), ("$instrument", channel.Instrument));
        }

        SqliteFiles.Execute(connection, "COMMIT;");
    }

    public static RunHeader Read(SqliteConnection connection)
    {
        var values = new Dictionary<string, string>(StringComparer.Ordinal);
        Each(connection, "SELECT key, value FROM run;", row => values[row.GetString(0)] = row.GetString(1));
        var texts = new List<RunText>();
        Each(connection, "SELECT role, name, text FROM text ORDER BY id;", row => texts.Add(new(row.GetString(0), row.GetString(1), row.GetString(2))));
        var instruments = new List<RunInstrument>();
        Each(connection, "SELECT name, driver, address, identity FROM instrument ORDER BY id;",
            row => instruments.Add(new(row.GetString(0), row.GetString(1), row.GetString(2), row.GetString(3))));
        string Value(string key) => values.GetValueOrDefault(key, "");
        double Number(string key, double missing) => double.TryParse(Value(key), NumberStyles.Float, CultureInfo.InvariantCulture, out var number) ? number : missing;
        return new RunHeader
        {
            RunId = Value("run_id"),
            Kind = Value("kind"),
            Title = Value("title"),
            Operator = Value("operator"),
            SampleId = Value("sample"),
            Material = Value("material"),
            GeometryPerM = Number("geometry_per_m", double.NaN),
            TemperatureUncertaintyK = Number("temperature_uncertainty_K", 0),
            StartUtc = DateTimeOffset.TryParse(Value("start_utc"), CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal, out var start) ? start.ToUniversalTime() : default,
            Software = Value("software"),
            Seed = ulong.TryParse(Value("seed"), NumberStyles.None, CultureInfo.InvariantCulture, out var seed) ? seed : 0,
            Simulated = Value("simulated") == "true",
            Pace = Number("pace", 1),
            PlanJson = Value("plan"),
            ConstantSet = Value("constants"),
            Texts = texts,
            Instruments = instruments,
        };
    }

    /// <summary>Calls back for each row of a query.</summary>
    public static void Each(SqliteConnection connection, string sql, Action<SqliteDataReader> take, params (string Name, object Value)[] values)
    {
        using var command = SqliteFiles.Command(connection, sql, values);
        using var rows = command.ExecuteReader();
        while (rows.Read())
        {
            take(rows);
        }
    }

    private static IEnumerable<(string Key, string Value)> Values(RunHeader header) =>
    [
        ("state", "running"),
        ("run_id", header.RunId),
        ("kind", header.Kind),
        ("title", header.Title),
        ("operator", header.Operator),
        ("sample", header.SampleId),
        ("material", header.Material),
        ("geometry_per_m", header.GeometryPerM.ToString("R", CultureInfo.InvariantCulture)),
        ("temperature_uncertainty_K", header.TemperatureUncertaintyK.ToString("R", CultureInfo.InvariantCulture)),
        ("start_utc", header.StartUtc.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss.fff'Z'", CultureInfo.InvariantCulture)),
        ("software", header.Software),
        ("seed", header.Seed.ToString(CultureInfo.InvariantCulture)),
        ("simulated", header.Simulated ? "true" : "false"),
        ("pace", header.Pace.ToString("R", CultureInfo.InvariantCulture)),
        ("plan", header.PlanJson),
        ("constants", header.ConstantSet),
    ];
}
