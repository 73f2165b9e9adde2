using System.Globalization;
using Acquire.Bench.Files;
using Acquire.Bench.Text;
using Acquire.Drivers.Files;
using Acquire.Drivers.Instruments;
using Acquire.Runs.Writing;
using Acquire.Sweep.Engine;
using Acquire.Sweep.Loops;
using Acquire.Wire;
using Microsoft.Extensions.Logging.Abstractions;

namespace Acquire.Benchmarks;

/// <summary>What one reading costs the engine (ask, parse, judge, queue for the journal) over loopback TCP, against the same bytes on a bare asynchronous socket.</summary>
internal static class ReadingCost
{
    private const string Answer = "+1.234567E-06,+2.000000E-01,0\n";
    private const int Block = 500;
    private const int Blocks = 12;

    public static Figure Measure()
    {
        using var responder = new Responder(Answer);
        using var other = new Responder(Answer); // one client at a time each, as instruments are
        using var loop = new RealLoop(TimeProvider.System);
        Figure? figure = null;
        loop.Run(async () => figure = await MeasureAsync(responder.Port, other.Port));
        return figure!; // the loop has run to its end
    }

    private static async Task<Figure> MeasureAsync(int port, int barePort)
    {
        var bench = BenchFile.Parse(new SourceText("bench", BenchText(port))).Value!;
        var instruments = InstrumentFactory.Open(bench, new LinkFactory(), DriverCatalogue.Shipped).Value!;
        using var scratch = new ScratchFolder();
        var clock = TimeProvider.System;
        var origin = clock.GetTimestamp();
        await using var recorder = RunWriter.Create(scratch["cost.run"], ScratchFolder.Header, EngineChannels.Of(bench), new WriterOptions(true, clock, origin));
        var log = new RunLog(recorder, clock, origin, NullLogger.Instance);
        var question = "READ?\n"u8.ToArray();
        var (ours, bare) = (new List<double>(), new List<double>());
        for (var block = 0; block < Blocks + 2; block++)
        {
            var engine = new double[Block];
            var good = true;
            for (var i = 0; i < Block; i++)
            {
                var start = clock.GetTimestamp();
                var from = log.NowUs;
                var reading = await instruments.Meter.ReadAsync(CancellationToken.None);
                var to = log.NowUs;
                log.Reading(EngineChannels.Current, from, to, reading.CurrentA);
                log.Reading(EngineChannels.Voltage, from, to, reading.VoltageV);
                engine[i] = clock.GetElapsedTime(start).TotalMicroseconds;
                good &= reading.CurrentA.IsGood && reading.VoltageV.IsGood;
            }

            if (!good || log.Health.Failure is not null)
            {
                throw new InvalidOperationException($"The measured work was not done: readings good {good}, recorder {log.Health.Failure ?? "well"}.");
            }

            var anchor = await BareExchange.RunAsync(barePort, question, Block, CancellationToken.None);
            if (block >= 2)
            {
                ours.AddRange(engine);
                bare.AddRange(anchor);
            }
        }

        await recorder.SealAsync("completed", CancellationToken.None);
        foreach (var instrument in instruments.All)
        {
            await instrument.DisposeAsync();
        }

        return new("engine cost per reading over loopback TCP / bare socket", Series.Median(ours) / Series.Median(bare), "x", 2.0, 1.5,
            $"engine {Series.Words(ours, "us")}; bare {Series.Words(bare, "us")}");
    }

    private static string BenchText(int port) => string.Create(CultureInfo.InvariantCulture, $$"""
        bench: benchmark (invented)
        site: { line frequency: 50 Hz }
        instruments:
          controller: { driver: scpi-temperature-controller, address: "TCPIP::127.0.0.1::{{port}}::SOCKET" }
          meter: { driver: scpi-source-meter, address: "TCPIP::127.0.0.1::{{port}}::SOCKET" }
        wiring:
          temperature loop: { instrument: controller, stage uncertainty: 0.1 K, sample uncertainty: 0.1 K, sensor range: { from: 60 K, to: 500 K } }
          source-meter: { instrument: meter }
        limits: { temperature: { from: 77 K, to: 420 K }, over-temperature: 440 K, ramp: 10 K/min, heater power: 50 W, bias: 10 V, current: 10 mA }
        """);
}
