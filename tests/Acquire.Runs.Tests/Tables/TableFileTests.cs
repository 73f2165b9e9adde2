using Acquire.Runs.Tables;
using CsCheck;
using Xunit;

namespace Acquire.Runs.Tests.Tables;

public sealed class TableFileTests
{
    [Theory]
    [InlineData("T_K,G_S\n300,1e-6\n310,2e-6\n", 300, 1e-6)]
    [InlineData("T (degC);R (kohm)\n26.85;1000\n", 300, 1e-6)]
    [InlineData("temperature [K],rho [ohm cm]\n300,50\n", 300, 2)]
    [InlineData("T_K,I_uA,V_V\n300,0.2,0.2\n", 300, 1e-6)]
    [InlineData("\"T_K\",\"u(T)_K\",\"sigma_S/cm\"\n300,0.1,0.02\n", 300, 2)]
    public void Table_WithUnitsInItsHeader_BecomesSi(string text, double temperatureK, double conductance)
    {
        var table = Read(text).Table!;
        Assert.Equal(temperatureK, table.Rows[0].TemperatureK, 1e-9);
        Assert.Equal(conductance, table.Rows[0].Conductance, conductance * 1e-12);
    }

    [Fact]
    public void Uncertainties_OfAResistance_ArePropagated()
    {
        var row = Read("T_K,T_u_K,R_ohm,R_u_ohm\n300,0.05,1000,10\n").Table!.Rows[0];
        Assert.Equal((0.05, 1e-3, 1e-5), (row.TemperatureUncertaintyK, row.Conductance, Math.Round(row.ConductanceUncertainty, 12)));
    }

    [Theory]
    [InlineData("", ":1:1: the table is empty")]
    [InlineData("T_K,G_S\n", ":2:1: the table has a header and no rows")]
    [InlineData("T_K,G_S\n300,oops\n", ":2:2: a number is needed in column 'G_S'; found 'oops'")]
    [InlineData("a,b\n1,2\n", "no column for the temperature; found 'a', 'b'")]
    [InlineData("T_K,b\n1,2\n", "no column for the current")]
    [InlineData("T_K,G_S,R_ohm\n300,1,2\n", "several columns could be the conductance; found 'G_S' (a conductance), 'R_ohm' (a resistance); choose one with --map conductance=COLUMN")]
    [InlineData("T1_K,T2_K,G_S\n300,1,2\n", "several columns could be the temperature")]
    public void Table_ThatCannotBeUnderstood_SaysWhereAndWhy(string text, string problem)
    {
        var reading = Read(text);
        Assert.Null(reading.Table);
        Assert.Contains(problem, reading.Problems[0], StringComparison.Ordinal);
    }

    [Fact]
    public void Table_WithAMap_TakesTheNamedColumn()
    {
        var table = Read("T_K,G_S,R_ohm\n300,1,4\n", ("conductance", "R_ohm")).Table!;
        Assert.Equal(0.25, table.Rows[0].Conductance);
        Assert.Contains("names a column that is not there", Read("T_K,G_S\n300,1\n", ("conductance", "X")).Problems[0], StringComparison.Ordinal);
    }

    [Fact]
    public void OverloadMarker_InATable_IsNoNumber() => Assert.True(double.IsNaN(Read("T_K,G_S\n300,9.91E37\n").Table!.Rows[0].Conductance));

    [Fact]
    public void AnyBytes_GiveATableOrProblems_NeverAnException()
    {
        using var folder = new RunFolder();
        var path = folder["x.csv"];
        Gen.Select(Gen.Byte.Array[0, 120], Gen.Char["T_KGSR,;\"\n\r 0123.eE-()[]°"].Array[0, 80]).Sample((noise, letters) =>
        {
            File.WriteAllBytes(path, [.. "T_K,G_S\n"u8, .. System.Text.Encoding.UTF8.GetBytes(letters)]);
            AssertTotal(path);
            File.WriteAllBytes(path, noise);
            AssertTotal(path);
        }, iter: 1500, threads: 1);
    }

    private static void AssertTotal(string path)
    {
        var reading = TableFile.Read(path);
        Assert.Equal(reading.Table is null, reading.Problems.Count > 0);
    }

    private static TableReading Read(string text, params (string Role, string Column)[] map)
    {
        using var folder = new RunFolder();
        File.WriteAllText(folder["t.csv"], text);
        return TableFile.Read(folder["t.csv"], map.ToDictionary(entry => entry.Role, entry => entry.Column));
    }
}
