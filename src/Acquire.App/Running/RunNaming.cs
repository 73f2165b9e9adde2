using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Acquire.App.CommandLine;
using Acquire.App.Planning;
using Acquire.Runs.Records;
using Acquire.Sweep.Planning;

namespace Acquire.App.Running;

/// <summary>Names, identifiers and headers of runs: all from seed, clock and texts.</summary>
internal static class RunNaming
{
    /// <summary>The header of a run that starts at an instant.</summary>
    public static RunHeader Header(PreparedRun prepared, string kind, string operatorName, ulong seed, DateTimeOffset startUtc)
    {
        var stamp = startUtc.UtcDateTime.ToString("yyyyMMdd'T'HHmmss'Z'", CultureInfo.InvariantCulture);
        var digest = SHA256.HashData(Encoding.UTF8.GetBytes(string.Create(CultureInfo.InvariantCulture, $"{stamp}|{seed}|{startUtc.Ticks}|{string.Join('|', prepared.Texts.Select(text => text.Sha256))}")));
        var sample = prepared.Protocol.Sample;
        return new RunHeader
        {
            RunId = $"{stamp}-{Convert.ToHexStringLower(digest)[..8]}",
            Kind = kind,
            Title = prepared.Protocol.Title,
            Operator = operatorName,
            SampleId = sample.Id,
            Material = sample.Material ?? "",
            GeometryPerM = sample.GeometryPerM,
            TemperatureUncertaintyK = prepared.Bench.Wiring.Loop.SampleUncertaintyK,
            StartUtc = startUtc,
            Software = Software.Name,
            Seed = seed,
            Simulated = prepared.Bench.Simulated || kind == "rehearsal",
            Pace = kind == "rehearsal" ? 1 : prepared.Bench.Pace,
            PlanJson = PlanJson.Write(prepared.Plan),
            ConstantSet = sample.Material is { } symbol ? Physics.Material.Find(symbol)?.Set ?? "" : "",
            Texts = prepared.Texts,
        };
    }

    /// <summary>A free name below <c>runs/</c> in the current folder.</summary>
    public static string FreePath(PreparedRun prepared, string kind, DateTimeOffset nowUtc)
    {
        var sample = string.Concat(prepared.Protocol.Sample.Id.Select(letter => char.IsAsciiLetterOrDigit(letter) || letter is '-' or '_' ? letter : '_'));
        var stem = $"{nowUtc.UtcDateTime.ToString("yyyyMMdd-HHmmss", CultureInfo.InvariantCulture)}-{sample}{(kind == "rehearsal" ? "-rehearsal" : "")}";
        for (var copy = 1; ; copy++)
        {
            var path = Path.Combine("runs", copy == 1 ? stem + ".run" : string.Create(CultureInfo.InvariantCulture, $"{stem}-{copy}.run"));
            if (!File.Exists(path))
            {
                return path;
            }
        }
    }

    /// <summary>The folder of a run's report, beside the run.</summary>
    public static string ReportFolder(string runPath) => Path.ChangeExtension(runPath, null) + "-report";
}
