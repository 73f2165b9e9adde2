using Acquire.Bench.Readings;
using Acquire.Runs.Records;
using Acquire.Runs.Writing;

namespace Acquire.Runs.Tests;

/// <summary>A folder of its own for a test, and small invented runs in it.</summary>
internal sealed class RunFolder : IDisposable
{
    private static int _count;

    public RunFolder()
    {
        Folder = Path.Combine(Path.GetTempPath(), FormattableString.Invariant($"acquire-runs-{Environment.ProcessId}-{Interlocked.Increment(ref _count)}"));
        Directory.CreateDirectory(Folder);
    }

    public string Folder { get; }

    public string this[string name] => Path.Combine(Folder, name);

    public static RunHeader Header { get; } = new()
    {
        RunId = "20260101T000000Z-x",
        Kind = "run",
        Title = "a test (invented)",
        Operator = "A. Tester",
        SampleId = "G-1",
        Material = "Ge",
        StartUtc = new DateTimeOffset(2026, 1, 1, 18, 0, 0, TimeSpan.Zero),
        Software = "test",
        Simulated = true,
        Seed = 7,
        GeometryPerM = 8000,
        Texts = [new("protocol", "a.protocol.yaml", "protocol: a\n")],
        Instruments = [new("meter", "scpi-source-meter", "SIM::meter::INSTR", "X,Y,1,1")],
    };

    public static Channel[] Channels { get; } = [new(1, "stage temperature", "K", "controller"), new(2, "current", "A", "meter")];

    /// <summary>Writes a run of so many readings with an event every 100 and a point every 300; returns what was committed at the end.</summary>
    public static async Task<RecorderHealth> WriteAsync(string path, int readings, bool durable, string? end = "completed")
    {
        var clock = TimeProvider.System;
        var recorder = RunWriter.Create(path, Header, Channels, new WriterOptions(durable, clock, clock.GetTimestamp()));
        await using (recorder)
        {
            for (var i = 0; i < readings; i++)
            {
                recorder.Append(Reading(i));
                if (i % 100 == 99)
                {
                    recorder.Append(new RunEvent(i, "step", Severity.Note, "sequence", "an event; with a 'quote' and µ", "{\"i\":1}"));
                }

                if (i % 300 == 299)
                {
                    recorder.Append(Point((i / 300) + 1, i));
                }
            }

            await recorder.CommitAsync(CancellationToken.None);
            if (end is not null)
            {
                await recorder.SealAsync(end, CancellationToken.None);
            }

            return recorder.Health;
        }
    }

    public static Reading Reading(int i) => i % 97 == 0
        ? new(2, i * 1000L, double.NaN, Quality.Overrange, "9.91E37")
        : new(1 + (i % 2), i * 1000L, 300 + Math.Sin(i), Quality.Good, null);

    public static PointRecord Point(int index, long us) => new()
    {
        Index = index,
        Step = index,
        Leg = 1,
        Direction = -1,
        Light = LightState.Dark,
        StartUs = us - 10,
        EndUs = us,
        SetPointK = 300,
        StageK = 300.01,
        SampleK = 299.9,
        SampleUncertaintyK = 0.01,
        BiasV = 0.2,
        CurrentPlusA = 1e-6,
        CurrentMinusA = -1e-6,
        ConductanceS = 5e-6,
        ConductanceUncertaintyS = 1e-9,
        HalfSumA = 1e-12,
        RangeA = 1e-5,
        Readings = 80,
        SoakS = 60,
        SignalSettleS = 2,
        WavelengthM = double.NaN,
        IrradianceWPerM2 = double.NaN,
        MonitorA = double.NaN,
        SinceLightS = double.NaN,
        Quality = Quality.Good,
        Reason = null,
        GatesJson = "{}",
    };

    public void Dispose() => Directory.Delete(Folder, recursive: true);
}
