using System.Globalization;
using Acquire.App.CommandLine;
using Acquire.Control;

namespace Acquire.App.Running;

/// <summary>Where the run is, on one line: rewritten in place on a terminal, a line for each new point otherwise.</summary>
/// <remarks>Best effort: a terminal that went away never stops a run.</remarks>
internal sealed class ProgressLine(Terminal terminal)
{
    private int _lastPoint = -1;
    private bool _lost;
    private int _width;

    /// <summary>The line.</summary>
    public static string Text(EngineStatusMessage status)
    {
        var waiting = status.Waiting.Length > 0 ? ", " + status.Waiting : "";
        return string.Create(CultureInfo.InvariantCulture,
            $"leg {status.Leg}/{status.Legs}  sample {status.SampleK:F2} K, target {status.TargetK:F2} K  point {status.Point}/{status.Points}  {(status.State == "running" ? "" : status.State + ", ")}{status.Phase}{waiting}  {DurationText.Of(status.TimeLeftS)} left  on disk {status.Committed} readings");
    }

    /// <summary>Shows a status.</summary>
    public void Show(EngineStatusMessage status)
    {
        if (_lost || (!terminal.Interactive && status.Point == _lastPoint))
        {
            return;
        }

        _lastPoint = status.Point;
        Write(terminal.Interactive ? "\r" + Fit(Text(status)) : Text(status) + Environment.NewLine);
    }

    /// <summary>Leaves the line.</summary>
    public void End()
    {
        if (terminal.Interactive && _width > 0)
        {
            Write(Environment.NewLine);
        }
    }

    private string Fit(string text)
    {
        var width = Math.Max(20, terminal.Console.Profile.Width - 1);
        var cut = text.Length > width ? text[..width] : text;
        var padded = cut.PadRight(Math.Min(_width, width));
        _width = cut.Length;
        return padded;
    }

    private void Write(string text)
    {
        try
        {
            terminal.Out.Write(text);
            terminal.Out.Flush();
        }
        catch (IOException)
        {
            _lost = true;
        }
    }
}
