using System.Text.RegularExpressions;
using Acquire.Analysis.Dark;
using Acquire.Bench.Readings;
using Acquire.Physics;
using Acquire.Runs.Files;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;
using SkiaSharp;
using Xunit;

namespace Acquire.Reports.Tests;

public sealed partial class ReportWriterTests : IDisposable
{
    private static int _count;
    private readonly string _folder = Path.Combine(Path.GetTempPath(), FormattableString.Invariant($"acquire-reports-{Environment.ProcessId}-{Interlocked.Increment(ref _count)}"));

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    [Fact]
    public async Task Report_OfARun_IsOnePageWithSixPlotsAndEverythingEncoded()
    {
        using var run = await RunAsync(withReadings: true);
        var fit = DarkFit.Fit(RunPoints.Dark(run), new FitSettings { Material = Material.Ge, GeometryPerM = 8000, CommonTemperatureUncertaintyK = 0.1 });
        Assert.NotNull(fit.ActivationEnergy);
        var page = ReportWriter.Write(run, fit, new("abc123", true, []), _folder);
        var html = await File.ReadAllTextAsync(page);

        Assert.Contains("G-&lt;b&gt;7", html, StringComparison.Ordinal);
        Assert.DoesNotContain("G-<b>7", html, StringComparison.Ordinal);
        Assert.DoesNotMatch("(src|href)=\"https?:", html);
        Assert.Equal(6, Regex.Count(html, "<svg"));
        Assert.Equal(6, Regex.Count(html, "aria-label=\"[^\"]{20,}\""));
        Assert.Contains("these data are invented", html, StringComparison.Ordinal);
        Assert.Contains("abc123", html, StringComparison.Ordinal);
        Assert.Contains("net active doping", html, StringComparison.Ordinal);
        Assert.DoesNotContain("NaN", html, StringComparison.Ordinal);
        Assert.Equal(6, Directory.EnumerateFiles(_folder, "*.png").Count());
    }

    [Fact]
    public async Task Svgs_InOnePage_ShareNoIdentifiers()
    {
        using var run = await RunAsync(withReadings: true);
        var html = await File.ReadAllTextAsync(ReportWriter.Write(run, null, new("", true, []), _folder));
        var ids = Identifier().Matches(html).Select(match => match.Groups[1].Value).ToList();
        Assert.Equal(ids.Distinct().Count(), ids.Count);
    }

    [Fact]
    public async Task Png_WhereFontsExist_HasTextBelowItsAxis()
    {
        Assert.SkipUnless(SKFontManager.Default.FontFamilies.Any(), "No fonts on this machine.");
        using var run = await RunAsync(withReadings: true);
        ReportWriter.Write(run, null, new("", true, []), _folder);
        using var picture = SKBitmap.Decode(Path.Combine(_folder, "arrhenius.png"));
        Assert.Equal(800, picture.Width);
        var dark = 0;
        for (var x = 100; x < 700; x++)
        {
            for (var y = picture.Height - 30; y < picture.Height - 4; y++)
            {
                dark += picture.GetPixel(x, y).Red < 100 ? 1 : 0;
            }
        }

        Assert.True(dark > 50, $"{dark} dark pixels where the axis title should be");
    }

    [Fact]
    public async Task Report_OfARefusedFit_GivesTheReasonsAndNoNumber()
    {
        using var run = await RunAsync(withReadings: false);
        var fit = DarkFit.Fit([.. RunPoints.Dark(run).Take(3)], new FitSettings { Material = Material.Ge });
        var html = await File.ReadAllTextAsync(ReportWriter.Write(run, fit, new("", false, ["block 3 does not match its hash"]), _folder));
        Assert.Contains("Result: refused", html, StringComparison.Ordinal);
        Assert.Contains("only 3 usable points", html, StringComparison.Ordinal);
        Assert.Contains("block 3 does not match its hash", html, StringComparison.Ordinal);
        Assert.Contains("Nothing to draw", html, StringComparison.Ordinal);
    }

    [Fact]
    public async Task DarkPoints_OfARun_LeaveLitOnesOutAndKeepReasons()
    {
        using var run = await RunAsync(withReadings: false);
        var dark = RunPoints.Dark(run);
        Assert.Equal(24, dark.Count);
        Assert.Equal("temperature not steady", Assert.Single(dark, point => point.ExcludedReason is not null).ExcludedReason);
    }

    /// <summary>An invented run of intrinsic germanium: a cooling leg in the dark, a warming leg in the dark and lit, one flagged point.</summary>
    private async Task<RunReader> RunAsync(bool withReadings)
    {
        Directory.CreateDirectory(_folder);
        var path = Path.Combine(_folder, "a.run");
        var clock = TimeProvider.System;
        var header = new RunHeader
        {
            RunId = "r1",
            Kind = "run",
            Title = "an <i>invented</i> night",
            Operator = "A. \"Tester\"",
            SampleId = "G-<b>7",
            Material = "Ge",
            StartUtc = new(2026, 1, 1, 18, 0, 0, TimeSpan.Zero),
            Software = "test",
            Simulated = true,
            Texts = [new("protocol", "p.protocol.yaml", "protocol: p")],
            Instruments = [new("meter", "scpi-source-meter", "SIM::meter::INSTR", "A,B,1,1")],
        };
        var channels = new[] { new Channel(1, "stage temperature", "K", "c"), new Channel(2, "sample temperature", "K", "c"), new Channel(3, "set point", "K", "c"), new Channel(7, "current", "A", "m") };
        await using (var recorder = RunWriter.Create(path, header, channels, new WriterOptions(false, clock, clock.GetTimestamp())))
        {
            for (var i = 0; withReadings && i < 400; i++)
            {
                foreach (var channel in channels)
                {
                    recorder.Append(new Reading(channel.Id, i * 10_000_000L, channel.Unit == "A" ? 1e-6 * (i + 1) : 340 - (i * 0.2), Quality.Good, null));
                }
            }

            recorder.Append(new RunEvent(1, "fault", Severity.Warning, "meter", "an event with <script>alert(1)</script>"));
            var index = 0;
            for (var i = 0; i < 36; i++)
            {
                var (leg, light, step) = i < 12 ? (1, LightState.Dark, i) : (2, i % 2 == 0 ? LightState.Dark : LightState.Lit, (35 - i) / 2);
                var temperatureK = 340 - (step * 5.0);
                var conductance = Material.Ge.IntrinsicConductivitySPerM(temperatureK) / 8000 * (light == LightState.Lit ? 1.3 : 1);
                recorder.Append(Point(++index, leg, light, temperatureK, conductance) with { Quality = i == 3 ? Quality.UnstableTemperature : Quality.Good, Reason = i == 3 ? "temperature not steady" : null });
            }

            await recorder.SealAsync("completed", CancellationToken.None);
        }

        return RunReader.Open(path).Reader!;
    }

    private static PointRecord Point(int index, int leg, LightState light, double temperatureK, double conductance) => new()
    {
        Index = index,
        Step = index,
        Leg = leg,
        Direction = leg == 1 ? -1 : 1,
        Light = light,
        StartUs = 0,
        EndUs = 1,
        SetPointK = temperatureK,
        StageK = temperatureK,
        SampleK = temperatureK,
        SampleUncertaintyK = 0.005,
        BiasV = 0.2,
        CurrentPlusA = conductance * 0.2,
        CurrentMinusA = -conductance * 0.2,
        ConductanceS = conductance,
        ConductanceUncertaintyS = conductance * 1e-3,
        HalfSumA = 1e-9,
        RangeA = 1e-3,
        Readings = 40,
        SoakS = 30,
        SignalSettleS = 1,
        WavelengthM = double.NaN,
        IrradianceWPerM2 = double.NaN,
        MonitorA = double.NaN,
        SinceLightS = double.NaN,
        Quality = Quality.Good,
        Reason = null,
        GatesJson = "{\"met\":true,\"achieved_drift_K_per_s\":1e-5,\"achieved_distance_K\":0.03}",
    };

    [GeneratedRegex(" id=\"([^\"]+)\"")]
    private static partial Regex Identifier();
}
