using System.Globalization;
using System.Net;
using System.Text;
using System.Text.Json;
using System.Text.RegularExpressions;
using Acquire.Analysis.Dark;
using Acquire.Runs.Files;
using Acquire.Runs.Records;

namespace Acquire.Reports;

/// <summary>The page, section by section. Everything that came from a user is encoded.</summary>
internal sealed partial class ReportPage(RunReader run, IReadOnlyList<PointRecord> points, FitResult? fit, VerifySummary seal, bool hasFonts)
{
    private readonly StringBuilder _html = new();

    public string Write(IReadOnlyList<ReportPlot> plots)
    {
        _html.Append("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<title>").Append(Text($"{run.Header.SampleId}: {run.Header.Title}")).Append("</title>\n<style>\n").Append(Style).Append("</style>\n</head>\n<body>\n");
        _html.Append("<h1>").Append(Text(run.Header.Title)).Append("</h1>\n");
        if (run.Header.Simulated)
        {
            _html.Append("<p class=\"banner\">Simulated bench: these data are invented.</p>\n");
        }

        Identification();
        Result();
        foreach (var plot in plots)
        {
            Draw(plot);
        }

        PointTable();
        Events();
        Record();
        return _html.Append("</body>\n</html>\n").ToString();
    }

    private void Identification()
    {
        var header = run.Header;
        Table("Identification",
        [
            ("sample", header.SampleId), ("material", header.Material), ("operator", header.Operator), ("start (UTC)", header.StartUtc.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", CultureInfo.InvariantCulture)),
            ("kind", header.Kind), ("state", run.State), ("run", header.RunId), ("software", header.Software), ("set of constants", header.ConstantSet),
            .. header.Instruments.Select(instrument => ("instrument " + instrument.Name, $"{instrument.Identity} ({instrument.Driver}, {instrument.Address})")),
            .. header.Texts.Select(text => (text.Role + " file", $"{text.Name}, SHA-256 {text.Sha256}")),
        ]);
    }

    private void Result()
    {
        if (fit is null)
        {
            _html.Append("<h2>Result</h2>\n<p>No dark analysis was made.</p>\n");
            return;
        }

        if (fit.ActivationEnergy is not { } energy || fit.Window is not { } window)
        {
            _html.Append("<h2>Result: refused</h2>\n<p>The data cannot carry an activation energy:</p>\n");
            Bullets(fit.Intrinsic.Reasons);
            return;
        }

        List<(string, string)> rows =
        [
            ("activation energy (raw slope)", Number($"{energy.ValueEV:F4} eV, u = {energy.StandardUncertaintyEV:F4} eV, 95 % interval {energy.Low95EV:F4} to {energy.High95EV:F4} eV (k = 2)")),
            ("window", Number($"{window.FromK:F1} K to {window.ToK:F1} K, {fit.Used.Count} points of {fit.Total}; rule: {window.Rule}; {window.Rejected} candidates rejected")),
        ];
        if (fit.Corrected is { } corrected)
        {
            rows.Add(("twice the corrected slope", Number($"{corrected.TwiceEV:F4} eV, u = {corrected.StandardUncertaintyEV:F4} eV; removed: T^{corrected.DensityExponent:F2} of the densities of states and T^-{corrected.MobilityExponent:F2} of the mobility")));
            rows.Add(("expected linear gap", Number($"{corrected.ExpectedLinearGapEV:F4} eV; {corrected.ExpectedSource}")));
        }

        if (fit.Goodness is { } goodness)
        {
            rows.Add(("goodness", Number($"reduced chi-square {goodness.ReducedChiSquare:G3}; runs test p {goodness.RunsTestP:G2}; quadratic term p {goodness.QuadraticTermP:G2}")));
        }

        rows.Add(("intrinsic behaviour", fit.Intrinsic.Verdict));
        if (double.IsFinite(fit.Intrinsic.NTypeBoundPerCm3))
        {
            rows.Add(("net active doping still possible", Number($"n-type below {fit.Intrinsic.NTypeBoundPerCm3:G2} cm-3, p-type below {fit.Intrinsic.PTypeBoundPerCm3:G2} cm-3")));
        }

        Table("Result", rows);
        Bullets(fit.Intrinsic.Reasons);
        Bullets([.. fit.Warnings.Select(warning => "Warning: " + warning)]);
        Table("Uncertainty budget of the activation energy", [.. fit.Budget.Select(line => ($"{line.Name} (type {line.Type})", Number($"{1000 * line.ContributionEV:F2} meV")))]);
        Table("Other laws on the same points", [.. fit.Alternatives.Select(law => (law.Law, Number($"BIC difference {law.DeltaBic:F1}") + (law.Comparable ? "" : " (range or scatter do not allow the comparison)")))]);
    }

    private void Draw(ReportPlot plot)
    {
        _html.Append("<h2>").Append(Text(plot.Title)).Append("</h2>\n");
        if (plot.Plot is null)
        {
            _html.Append("<p>Nothing to draw: this run holds no data for this plot.</p>\n");
            return;
        }

        var svg = Fonts().Replace(plot.Plot.GetSvgXml(PlotStyle.Width, PlotStyle.Height), "font-family=\"sans-serif\"");
        // Six drawings in one page may not share the names of their clip paths: the first would clip them all.
        svg = svg.Replace("id=\"", $"id=\"{plot.Name}-", StringComparison.Ordinal).Replace("url(#", $"url(#{plot.Name}-", StringComparison.Ordinal)
            .Replace("href=\"#", $"href=\"#{plot.Name}-", StringComparison.Ordinal);
        var start = svg.IndexOf("<svg", StringComparison.Ordinal);
        _html.Append("<figure role=\"img\" aria-label=\"").Append(Text(plot.Alternative)).Append("\">\n").Append(svg[start..]).Append("\n<figcaption>").Append(Text(plot.Alternative)).Append("</figcaption>\n</figure>\n");
    }

    private void PointTable()
    {
        _html.Append("<h2>Points</h2>\n<details open>\n<summary>").Append(Number($"{points.Count} points")).Append("</summary>\n<table>\n<tr><th>no.</th><th>leg</th><th>light</th><th>T / K</th><th>u(T) / K</th><th>G / S</th><th>u(G) / S</th><th>background / A</th><th>range / A</th><th>soak / s</th><th>drift / (mK/min)</th><th>off target / K</th><th>gate met</th><th>remarks</th></tr>\n");
        foreach (var point in points)
        {
            var (met, drift, distance) = Gates(point.GatesJson);
            string[] cells =
            [
                Number($"{point.Index}"), Number($"{point.Leg}"), point.Light switch { LightState.Lit => "lit", LightState.DarkAfter => "dark after", _ => "dark" },
                Number($"{point.SampleK:F3}"), Number($"{point.SampleUncertaintyK:G2}"), Number($"{point.ConductanceS:G6}"), Number($"{point.ConductanceUncertaintyS:G2}"),
                Number($"{point.HalfSumA:G3}"), Number($"{point.RangeA:G2}"), Number($"{point.SoakS:F0}"), drift, distance, met, point.Reason ?? (point.Quality == Bench.Readings.Quality.Good ? "" : point.Quality.ToString()),
            ];
            _html.Append("<tr>").AppendJoin("", cells.Select(cell => $"<td>{Text(cell.Replace("NaN", "", StringComparison.Ordinal))}</td>")).Append("</tr>\n");
        }

        _html.Append("</table>\n</details>\n");
    }

    private static (string Met, string Drift, string Distance) Gates(string gates)
    {
        try
        {
            using var json = JsonDocument.Parse(gates);
            var met = json.RootElement.TryGetProperty("met", out var found) ? found.ValueKind == JsonValueKind.True ? "yes" : "no" : "";
            var drift = json.RootElement.TryGetProperty("achieved_drift_K_per_s", out var number) && number.ValueKind == JsonValueKind.Number ? Number($"{number.GetDouble() * 60_000:F1}") : "";
            var distance = json.RootElement.TryGetProperty("achieved_distance_K", out var off) && off.ValueKind == JsonValueKind.Number ? Number($"{off.GetDouble():F3}") : "";
            return (met, drift, distance);
        }
        catch (JsonException)
        {
            return ("", "", "");
        }
    }

    private void Events()
    {
        var notable = run.Events().Select(entry => entry.Event).Where(entry => entry.Severity >= Severity.Warning || entry.Kind is "operator" or "safe").ToList();
        Table("Events", [.. notable.Select(entry => (Number($"{entry.TimeUs * 1e-6:F1} s, {entry.Severity.ToString().ToLowerInvariant()}, {entry.Source}"), entry.Text))]);
    }

    private void Record()
    {
        Table("Record",
        [
            ("file", Path.GetFileName(run.Path)), ("chain head (SHA-256)", seal.ChainHead), ("verified", seal.Sound ? "sound, no findings" : "damaged: " + string.Join("; ", seal.Findings)),
        ]);
        if (!hasFonts)
        {
            _html.Append("<p>This machine has no fonts: the PNG files beside this page carry no text; the plots in the page do.</p>\n");
        }

        _html.Append("<p class=\"caution\">Software is not the safety system: heaters, cryogens, bias and light need protections in hardware, local codes and licensed practice govern. Conductivity sees net active doping only.</p>\n");
    }

    private void Table(string title, List<(string What, string Value)> rows)
    {
        if (rows.Count == 0)
        {
            return;
        }

        _html.Append("<h2>").Append(Text(title)).Append("</h2>\n<table>\n");
        foreach (var (what, value) in rows)
        {
            _html.Append("<tr><th>").Append(Text(what)).Append("</th><td>").Append(Text(value)).Append("</td></tr>\n");
        }

        _html.Append("</table>\n");
    }

    private void Bullets(IReadOnlyList<string> lines)
    {
        if (lines.Count > 0)
        {
            _html.Append("<ul>\n").AppendJoin("", lines.Select(line => $"<li>{Text(line)}</li>\n")).Append("</ul>\n");
        }
    }

    private static string Text(string text) => WebUtility.HtmlEncode(text);

    private static string Number(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);

    [GeneratedRegex("font-family=\"[^\"]*\"")]
    private static partial Regex Fonts();

    private const string Style = """
        body { font: 15px/1.45 sans-serif; color: #111; background: #fff; max-width: 60em; margin: 2em auto; padding: 0 1em; }
        h1 { font-size: 1.5em; } h2 { font-size: 1.15em; margin-top: 1.8em; border-bottom: 1px solid #999; }
        table { border-collapse: collapse; } th, td { border: 1px solid #bbb; padding: 0.2em 0.6em; text-align: left; vertical-align: top; overflow-wrap: anywhere; }
        th { background: #f3f3f3; font-weight: 600; } figure { margin: 1em 0; } figcaption { color: #333; font-size: 0.9em; } svg { max-width: 100%; height: auto; }
        .banner { border: 2px solid #111; padding: 0.5em 1em; font-weight: 600; } .caution { border-top: 1px solid #999; margin-top: 2em; padding-top: 0.5em; }
        @media print { body { margin: 0; max-width: none; } h2 { break-after: avoid; } figure { break-inside: avoid; } }

        """;
}
