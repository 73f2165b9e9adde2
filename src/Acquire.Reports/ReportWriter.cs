using System.Text;
using Acquire.Analysis.Dark;
using Acquire.Runs.Files;
using SkiaSharp;

namespace Acquire.Reports;

/// <summary>What a check of the run file found, as the report states it.</summary>
public sealed record VerifySummary(string ChainHead, bool Sound, IReadOnlyList<string> Findings);

/// <summary>Writes the report of a run: one self-contained page with its plots inline, and the plots as PNG files beside it.</summary>
public static class ReportWriter
{
    /// <summary>Writes into a folder, which is made when needed; the path of the page.</summary>
    public static string Write(RunReader run, FitResult? fit, VerifySummary seal, string folder)
    {
        Directory.CreateDirectory(folder);
        var points = run.Points();
        var plots = RunPlots.Draw(run, points, fit);
        foreach (var plot in plots)
        {
            plot.Plot?.SavePng(Path.Combine(folder, plot.Name + ".png"), PlotStyle.Width, PlotStyle.Height);
        }

        var page = Path.Combine(folder, "report.html");
        var html = new ReportPage(run, points, fit, seal, HasFonts).Write(plots);
        File.WriteAllText(page, html, new UTF8Encoding(false));
        return page;
    }

    /// <summary>Without any font on the system a PNG has no text and says nothing about it.</summary>
    private static bool HasFonts => SKFontManager.Default.FontFamilies.Any();
}
