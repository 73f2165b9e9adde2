using System.Text.RegularExpressions;

namespace Acquire.Runs.Tables;

/// <summary>What a column holds.</summary>
internal enum ColumnKind
{
    Temperature,
    TemperatureUncertainty,
    Conductance,
    Conductivity,
    Resistance,
    Resistivity,
    Current,
    Voltage,
    ConductanceUncertainty,
}

/// <summary>Which columns of a foreign table are used, and how they become SI.</summary>
internal sealed partial class TableColumns
{
    private static readonly (string Unit, ColumnKind Kind, double Factor, double Offset)[] Units =
    [
        ("K", ColumnKind.Temperature, 1, 0), ("degC", ColumnKind.Temperature, 1, 273.15), ("C", ColumnKind.Temperature, 1, 273.15), ("°C", ColumnKind.Temperature, 1, 273.15),
        ("S", ColumnKind.Conductance, 1, 0), ("mS", ColumnKind.Conductance, 1e-3, 0), ("uS", ColumnKind.Conductance, 1e-6, 0), ("nS", ColumnKind.Conductance, 1e-9, 0),
        ("S/m", ColumnKind.Conductivity, 1, 0), ("S_per_m", ColumnKind.Conductivity, 1, 0), ("S/cm", ColumnKind.Conductivity, 100, 0), ("S_per_cm", ColumnKind.Conductivity, 100, 0),
        ("ohm", ColumnKind.Resistance, 1, 0), ("kohm", ColumnKind.Resistance, 1e3, 0), ("Mohm", ColumnKind.Resistance, 1e6, 0), ("Gohm", ColumnKind.Resistance, 1e9, 0),
        ("ohm_sq", ColumnKind.Resistance, 1, 0), ("ohm/sq", ColumnKind.Resistance, 1, 0),
        ("ohm_m", ColumnKind.Resistivity, 1, 0), ("ohm m", ColumnKind.Resistivity, 1, 0), ("ohm_cm", ColumnKind.Resistivity, 0.01, 0), ("ohm cm", ColumnKind.Resistivity, 0.01, 0),
        ("A", ColumnKind.Current, 1, 0), ("mA", ColumnKind.Current, 1e-3, 0), ("uA", ColumnKind.Current, 1e-6, 0), ("nA", ColumnKind.Current, 1e-9, 0), ("pA", ColumnKind.Current, 1e-12, 0),
        ("V", ColumnKind.Voltage, 1, 0), ("mV", ColumnKind.Voltage, 1e-3, 0),
    ];

    private static readonly ColumnKind[] Signals = [ColumnKind.Conductance, ColumnKind.Conductivity, ColumnKind.Resistance, ColumnKind.Resistivity];

    private readonly Column _temperature;
    private readonly Column _signal;
    private readonly Column? _voltage;
    private readonly Column? _temperatureUncertainty;
    private readonly Column? _signalUncertainty;

    private TableColumns(Column temperature, Column signal, Column? voltage, List<Column> all)
    {
        _temperature = temperature;
        _signal = signal;
        _voltage = voltage;
        _temperatureUncertainty = Uncertainty(all, temperature);
        _signalUncertainty = Uncertainty(all, signal);
        Understood = [.. new[] { temperature, signal, voltage, _temperatureUncertainty, _signalUncertainty }.OfType<Column>()
            .Select(column => $"'{column.Header}' is {column.Words}")];
    }

    /// <summary>What the columns were taken for, in words.</summary>
    public IReadOnlyList<string> Understood { get; }

    /// <summary>Chooses columns by their units and the user's map; an ambiguity is a problem that lists the candidates.</summary>
    public static (TableColumns? Columns, string? Problem) Choose(string path, string[] header, IReadOnlyDictionary<string, string> map)
    {
        var all = header.Select(Parse).OfType<Column>().ToList();
        foreach (var (role, name) in map)
        {
            if (!header.Contains(name, StringComparer.Ordinal))
            {
                return (null, $"{path}:1:1: the map names a column that is not there; found {role}={name}; allowed {string.Join(", ", header)}");
            }
        }

        var (temperature, problem) = One(path, header, all, map, "temperature", [ColumnKind.Temperature]);
        if (temperature is null)
        {
            return (null, problem);
        }

        var hasSignal = all.Exists(column => !column.IsUncertainty && Signals.Contains(column.Kind)) || map.Keys.Any(key => key is "conductance" or "resistance");
        if (hasSignal)
        {
            (var signal, problem) = One(path, header, all, map, "conductance", Signals);
            return signal is null ? (null, problem) : (new(temperature, signal, null, all), null);
        }

        (var current, problem) = One(path, header, all, map, "current", [ColumnKind.Current]);
        if (current is null)
        {
            return (null, problem);
        }

        (var voltage, problem) = One(path, header, all, map, "voltage", [ColumnKind.Voltage]);
        return voltage is null ? (null, problem) : (new(temperature, current, voltage, all), null);
    }

    /// <summary>One row in SI.</summary>
    public ConductanceRow Row(int line, Func<int, double> number)
    {
        var temperatureK = (number(_temperature.Index) * _temperature.Factor) + _temperature.Offset;
        var temperatureU = _temperatureUncertainty is { } tu ? number(tu.Index) * tu.Factor : 0;
        var value = number(_signal.Index) * _signal.Factor;
        var uncertainty = _signalUncertainty is { } su ? number(su.Index) * su.Factor : 0;
        return _signal.Kind switch
        {
            ColumnKind.Conductance or ColumnKind.Conductivity => new(line, temperatureK, temperatureU, value, uncertainty),
            ColumnKind.Current => new(line, temperatureK, temperatureU, value / (number(_voltage!.Index) * _voltage.Factor), uncertainty / Math.Abs(number(_voltage.Index) * _voltage.Factor)),
            _ => new(line, temperatureK, temperatureU, 1 / value, uncertainty / (value * value)),
        };
    }

    private static (Column? Column, string? Problem) One(string path, string[] header, List<Column> all, IReadOnlyDictionary<string, string> map, string role, ColumnKind[] kinds)
    {
        if (map.TryGetValue(role, out var name) || (role == "conductance" && map.TryGetValue("resistance", out name)))
        {
            var named = all.Find(column => column.Header == name && kinds.Contains(column.Kind));
            return named is null
                ? (null, $"{path}:1:1: the column '{name}' carries no unit of a {role}; rename it with its unit, for example '{Example(role)}'")
                : (named, null);
        }

        var candidates = all.Where(column => !column.IsUncertainty && kinds.Contains(column.Kind)).ToList();
        return candidates.Count switch
        {
            1 => (candidates[0], null),
            0 => (null, $"{path}:1:1: no column for the {role}; found {string.Join(", ", header.Select(column => $"'{column}'"))}; allowed a name with its unit, for example '{Example(role)}'; rename the column or name it with --map {role}=COLUMN"),
            _ => (null, $"{path}:1:1: several columns could be the {role}; found {string.Join(", ", candidates.Select(column => $"'{column.Header}' ({column.Words})"))}; choose one with --map {role}=COLUMN"),
        };
    }

    private static string Example(string role) => role switch { "temperature" => "T_K", "current" => "I_A", "voltage" => "V_V", _ => "G_S" };

    private static Column? Uncertainty(List<Column> all, Column of) =>
        all.Find(column => column.IsUncertainty && column.Kind == of.Kind && (column.Stem == of.Stem || all.Count(other => other.IsUncertainty && other.Kind == of.Kind) == 1));

    /// <summary><c>name_unit</c>, <c>name (unit)</c> or <c>name [unit]</c>; <c>u(name)_unit</c>, <c>u_name_unit</c> and <c>name_u_unit</c> are uncertainties.</summary>
    private static Column? Parse(string header, int index)
    {
        foreach (var (unit, kind, factor, offset) in Units.OrderByDescending(entry => entry.Unit.Length))
        {
            string? stem = null;
            foreach (var ending in new[] { $"_{unit}", $" ({unit})", $" [{unit}]", $"({unit})", $"[{unit}]" })
            {
                if (header.EndsWith(ending, StringComparison.Ordinal) && header.Length > ending.Length)
                {
                    stem = header[..^ending.Length];
                    break;
                }
            }

            if (stem is not null)
            {
                var match = UncertaintyName().Match(stem);
                var name = match.Success ? match.Groups.Values.Skip(1).First(group => group.Success).Value : stem;
                return new(index, header, name, kind, factor, match.Success ? 0 : offset, match.Success);
            }
        }

        return null;
    }

    [GeneratedRegex(@"^u\((.+)\)$|^u_(.+)$|^(.+)_u$", RegexOptions.IgnoreCase)]
    private static partial Regex UncertaintyName();

    private sealed record Column(int Index, string Header, string Stem, ColumnKind Kind, double Factor, double Offset, bool IsUncertainty)
    {
        public string Words => (IsUncertainty ? "an uncertainty of " : "a ") + Kind.ToString().ToLowerInvariant();
    }
}
