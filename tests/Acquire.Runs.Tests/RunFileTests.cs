using Acquire.Runs.Files;
using Acquire.Runs.Writing;
using Microsoft.Data.Sqlite;
using Xunit;

namespace Acquire.Runs.Tests;

public sealed class RunFileTests
{
    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public async Task Run_WrittenAndRead_IsTheSame(bool durable)
    {
        using var folder = new RunFolder();
        var health = await RunFolder.WriteAsync(folder["a.run"], 2500, durable);
        Assert.Equal(new RecorderHealth(2500, 2500, null), health);

        using var reader = RunReader.Open(folder["a.run"]).Reader!;
        Assert.Equal("ended: completed", reader.State);
        Assert.Equal(RunFolder.Header with { Texts = reader.Header.Texts, Instruments = reader.Header.Instruments }, reader.Header);
        Assert.Equal(RunFolder.Header.Texts, reader.Header.Texts);
        Assert.Equal(RunFolder.Channels, reader.Channels);
        var readings = reader.Readings();
        Assert.Equal(Enumerable.Range(0, 2500).Select(RunFolder.Reading), readings.Select(row => row.Reading));
        Assert.Equal(25, reader.Events().Count);
        Assert.Equal([RunFolder.Point(1, 299), RunFolder.Point(2, 599)], reader.Points().Take(2));
        Assert.Equal(["a.run"], Directory.EnumerateFiles(folder.Folder).Select(Path.GetFileName)); // sealed: one plain file, no lock, no ballast
    }

    [Fact]
    public async Task ChainHead_OfTheSameRecords_IsTheSameForBothHosts()
    {
        using var folder = new RunFolder();
        await RunFolder.WriteAsync(folder["a.run"], 3000, durable: true);
        await RunFolder.WriteAsync(folder["b.run"], 3000, durable: false);
        var (a, _) = RunVerifier.Verify(folder["a.run"]);
        var (b, _) = RunVerifier.Verify(folder["b.run"]);
        Assert.Empty(a!.Findings);
        Assert.Equal(a.ChainHead, b!.ChainHead);
        Assert.Equal((3000, 10, 30), (a.Readings, a.Points, a.Events));
    }

    [Theory]
    [InlineData("UPDATE reading SET value = value + 1e-9 WHERE id = 1234", "block")]
    [InlineData("DELETE FROM reading WHERE id = 1234", "missing")]
    [InlineData("UPDATE point SET conductance_S = 1 WHERE id = 3", "block")]
    [InlineData("UPDATE event SET text = 'nothing happened' WHERE id = 4", "block")]
    [InlineData("DELETE FROM block WHERE id = (SELECT max(id) FROM block)", "covered by no whole block")]
    [InlineData("UPDATE text SET text = 'protocol: b'", "protocol text")]
    public async Task Verify_AfterAnEdit_NamesIt(string edit, string finding)
    {
        using var folder = new RunFolder();
        await RunFolder.WriteAsync(folder["a.run"], 3000, durable: false);
        using (var connection = new SqliteConnection($"Data Source={folder["a.run"]};Pooling=False"))
        {
            connection.Open();
            using var command = connection.CreateCommand();
            command.CommandText = edit;
            Assert.True(command.ExecuteNonQuery() > 0);
        }

        var (report, _) = RunVerifier.Verify(folder["a.run"]);
        Assert.Contains(report!.Findings, text => text.Contains(finding, StringComparison.Ordinal));
    }

    [Fact]
    public async Task Run_WhoseWriterWentAway_IsCutAndSound()
    {
        using var folder = new RunFolder();
        await RunFolder.WriteAsync(folder["a.run"], 1500, durable: true, end: null);
        using var reader = RunReader.Open(folder["a.run"]).Reader!;
        Assert.Equal("cut", reader.State);
        var (report, _) = RunVerifier.Verify(folder["a.run"]);
        Assert.Empty(report!.Findings);
        Assert.Equal(1500, report.Readings);
    }

    [Fact]
    public async Task Run_WhileItsWriterLives_IsRunningAndNobodyElseMayWrite()
    {
        using var folder = new RunFolder();
        var clock = TimeProvider.System;
        await using var recorder = RunWriter.Create(folder["a.run"], RunFolder.Header, RunFolder.Channels, new WriterOptions(true, clock, clock.GetTimestamp()));
        recorder.Append(RunFolder.Reading(1));
        await recorder.CommitAsync(CancellationToken.None);
        using var reader = RunReader.Open(folder["a.run"]).Reader!;
        Assert.Equal("running", reader.State);
        Assert.Equal(1, reader.Count(RunTable.Readings));
        Assert.Throws<RunFileException>(() => RunWriter.Create(folder["a.run"], RunFolder.Header, RunFolder.Channels, new WriterOptions(true, clock, 0)));
        Assert.NotNull(AnalysisStore.Append(folder["a.run"], "dark", "{}", "{}", ("test", clock)));
    }

    [Fact]
    public async Task Run_CutAtAnyByte_OpensAsAPrefixOrSaysWhy()
    {
        using var folder = new RunFolder();
        await RunFolder.WriteAsync(folder["a.run"], 800, durable: false);
        var whole = await File.ReadAllBytesAsync(folder["a.run"]);
        for (var length = 0; length < whole.Length; length += 331)
        {
            await File.WriteAllBytesAsync(folder["cut.run"], whole[..length]);
            var (report, problem) = RunVerifier.Verify(folder["cut.run"]);
            Assert.True(problem is not null || report!.Findings.Count > 0, $"cut at {length} of {whole.Length} went unnoticed");
            using var reader = RunReader.Open(folder["cut.run"]).Reader;
            Assert.True(problem is null || problem.Contains("cut.run", StringComparison.Ordinal));
        }
    }

    [Fact]
    public async Task Run_OfANewerVersion_IsRefusedWithTheRemedy()
    {
        using var folder = new RunFolder();
        await RunFolder.WriteAsync(folder["a.run"], 10, durable: false);
        using (var connection = new SqliteConnection($"Data Source={folder["a.run"]};Pooling=False"))
        {
            connection.Open();
            using var command = connection.CreateCommand();
            command.CommandText = "PRAGMA user_version=99";
            command.ExecuteNonQuery();
        }

        Assert.Contains("newer version (file version 99", RunReader.Open(folder["a.run"]).Problem, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("")]
    [InlineData("not a run")]
    [InlineData("SQLite format 3\0 and then nothing sound")]
    public async Task File_ThatIsNoRun_IsRefused(string content)
    {
        using var folder = new RunFolder();
        await File.WriteAllTextAsync(folder["x.run"], content);
        Assert.Contains("x.run", RunReader.Open(folder["x.run"]).Problem, StringComparison.Ordinal);
        Assert.NotNull(RunVerifier.Verify(folder["x.run"]).Problem);
    }

    [Fact]
    public async Task Analysis_Appended_StaysOutsideTheChain()
    {
        using var folder = new RunFolder();
        await RunFolder.WriteAsync(folder["a.run"], 500, durable: false);
        var before = RunVerifier.Verify(folder["a.run"]).Report!.ChainHead;
        Assert.Null(AnalysisStore.Append(folder["a.run"], "dark", "{}", "{\"v\":1}", ("test", TimeProvider.System)));
        Assert.Null(AnalysisStore.Append(folder["a.run"], "dark", "{}", "{\"v\":2}", ("test", TimeProvider.System)));
        using var reader = RunReader.Open(folder["a.run"]).Reader!;
        Assert.Equal("{\"v\":2}", reader.LatestAnalysis("dark"));
        Assert.Equal(before, RunVerifier.Verify(folder["a.run"]).Report!.ChainHead);
    }

    [Fact]
    public async Task Summary_OfAChannel_HoldsItsExtremes()
    {
        using var folder = new RunFolder();
        await RunFolder.WriteAsync(folder["a.run"], 2000, durable: false);
        using var reader = RunReader.Open(folder["a.run"]).Reader!;
        var good = reader.Readings(channel: 1).Select(row => row.Reading).Where(reading => reading.Quality == 0).ToList();
        var rows = reader.Summary(1);
        Assert.True(rows.Count >= 4);
        Assert.Equal(good.Min(reading => reading.Value), rows.Min(row => row.Least));
        Assert.Equal(good.Max(reading => reading.Value), rows.Max(row => row.Most));
    }

    [Fact]
    public async Task Catalogue_OfAFolder_ListsSoundAndDamagedRuns()
    {
        using var folder = new RunFolder();
        await RunFolder.WriteAsync(folder["a.run"], 400, durable: false);
        await File.WriteAllTextAsync(folder["b.run"], "garbage");
        var entries = RunCatalogue.List(folder.Folder);
        Assert.Equal(("G-1", "ended: completed", 1L), entries.Where(entry => entry.Problem is null).Select(entry => (entry.Sample, entry.State, entry.Points)).Single());
        Assert.Single(entries, entry => entry.Problem is not null);
    }
}
