using System.Globalization;
using System.Text;
using CsvHelper;

namespace Acquire.Runs.Tables;

/// <summary>A foreign table of temperature and conductance.</summary>
/// <param name="Path">The file.</param>
/// <param name="Rows">Its rows in order.</param>
/// <param name="Understood">What the columns were taken for, in words.</param>
public sealed record ConductanceTable(string Path, IReadOnlyList<ConductanceRow> Rows, IReadOnlyList<string> Understood);

/// <summary>One row of a foreign table.</summary>
/// <param name="Line">Line in the file, from 1.</param>
/// <param name="TemperatureK">Temperature [K].</param>
/// <param name="TemperatureUncertaintyK">Standard uncertainty [K]; zero when not given.</param>
/// <param name="Conductance">Conductance [S], or conductivity [S/m] when the table gives that.</param>
/// <param name="ConductanceUncertainty">Standard uncertainty in the same unit; zero when not given.</param>
public readonly record struct ConductanceRow(int Line, double TemperatureK, double TemperatureUncertaintyK, double Conductance, double ConductanceUncertainty);

/// <summary>A table, or why there is none.</summary>
public sealed record TableReading(ConductanceTable? Table, IReadOnlyList<string> Problems);

/// <summary>Reads tables that other programs wrote: comma or semicolon, one header line with units, numbers with a point.</summary>
/// <remarks>Nothing is guessed: an ambiguous header is an error that lists the candidates, and a map settles it.</remarks>
public static class TableFile
{
    private const long LargestBytes = 200_000_000;
    private const int MostProblems = 10;

    /// <summary>Reads a table. The map names columns: <c>temperature=T_K</c>, <c>conductance=G_S</c> ...</summary>
    public static TableReading Read(string path, IReadOnlyDictionary<string, string>? map = null)
    {
        try
        {
            var length = new FileInfo(path).Length;
            if (length > LargestBytes)
            {
                return Refused(string.Create(CultureInfo.InvariantCulture, $"{path}:1:1: the table is too large; found {length / 1e6:F0} MB; allowed at most 200 MB; split it"));
            }

            var text = new UTF8Encoding(false, throwOnInvalidBytes: true).GetString(File.ReadAllBytes(path)).TrimStart('\uFEFF');
            return text.Contains('\0', StringComparison.Ordinal) || text.StartsWith("PK\u0003\u0004", StringComparison.Ordinal)
                ? Refused($"{path}:1:1: this is not a text table; found binary data; save it as CSV text and try again")
                : Parse(path, text, map ?? new Dictionary<string, string>());
        }
        catch (CsvFormatException problem)
        {
            return Refused($"{path}: this is not a well-formed table ({problem.Message}); look at its quotes.");
        }
        catch (DecoderFallbackException)
        {
            return Refused($"{path}:1:1: this is not a UTF-8 text table; found other bytes; save it as UTF-8 CSV and try again");
        }
        catch (Exception problem) when (problem is FileNotFoundException or DirectoryNotFoundException)
        {
            return Refused($"{path}: there is no such file; the current folder is {Directory.GetCurrentDirectory()}.");
        }
        catch (Exception problem) when (problem is IOException or UnauthorizedAccessException)
        {
            return Refused($"{path}: the table cannot be read ({problem.Message}); check its permissions.");
        }
    }

    private static TableReading Refused(params string[] problems) => new(null, problems);

    private static TableReading Parse(string path, string text, IReadOnlyDictionary<string, string> map)
    {
        var lines = text.Split('\n', 2);
        var separator = lines[0].Count(letter => letter == ';') > lines[0].Count(letter => letter == ',') ? ';' : ',';
        using var csv = CsvReader.FromText(text, new CsvReaderOptions { Separator = separator, TrimWhitespace = true, TrackLineNumbers = true, SkipEmptyLines = true });
        csv.ReadHeader();
        var header = csv.Headers.ToArray();
        if (header.Length == 0 || Array.TrueForAll(header, name => name.Length == 0))
        {
            return Refused($"{path}:1:1: the table is empty; a header line with names and units is needed, for example 'T_K,G_S'");
        }

        var (columns, problem) = TableColumns.Choose(path, header, map);
        return columns is null ? Refused(problem!) : ReadRows(path, csv, header, columns); // a refusal has its sentence
    }

    private static TableReading ReadRows(string path, CsvReader csv, string[] header, TableColumns columns)
    {
        var rows = new List<ConductanceRow>();
        var problems = new List<string>();
        while (csv.Read() && problems.Count < MostProblems)
        {
            var fields = Enumerable.Range(0, csv.FieldCount).Select(csv.GetString).ToArray();
            if (Array.TrueForAll(fields, field => field.Length == 0))
            {
                continue;
            }

            var line = (int)csv.LineNumber;
            var row = columns.Row(line, column => Number(column < fields.Length ? fields[column] : "", out var number)
                ? number
                : Complain(string.Create(CultureInfo.InvariantCulture, $"{path}:{line}:{column + 1}: a number is needed in column '{header[column]}'; found '{fields[column]}'; allowed digits with a decimal point; correct the cell or remove the row"), problems));
            rows.Add(row);
        }

        if (rows.Count == 0 && problems.Count == 0)
        {
            problems.Add($"{path}:2:1: the table has a header and no rows");
        }

        return problems.Count > 0 ? new(null, problems) : new(new(path, rows, columns.Understood), []);
    }

    /// <summary>Reads a cell: an empty one and an overload marker of SCPI-1999 are no number, but no mistake either.</summary>
    private static bool Number(string field, out double number)
    {
        number = double.NaN;
        if (field.Length == 0)
        {
            return true;
        }

        if (!double.TryParse(field, NumberStyles.Float, CultureInfo.InvariantCulture, out var value))
        {
            return false;
        }

        number = Math.Abs(value) >= 9e37 ? double.NaN : value;
        return true;
    }

    private static double Complain(string problem, List<string> problems)
    {
        problems.Add(problem);
        return double.NaN;
    }
}
