using System.Globalization;

namespace Acquire.App.Running;

/// <summary>Durations as people say them.</summary>
internal static class DurationText
{
    /// <summary>Hours and minutes from an hour on, minutes and seconds below, seconds below a minute.</summary>
    public static string Of(double seconds)
    {
        if (!double.IsFinite(seconds))
        {
            return "unknown";
        }

        var whole = (long)Math.Round(Math.Max(0, seconds));
        return whole switch
        {
            >= 3600 => string.Create(CultureInfo.InvariantCulture, $"{whole / 3600} h {whole % 3600 / 60:00} min"),
            >= 60 => string.Create(CultureInfo.InvariantCulture, $"{whole / 60} min {whole % 60:00} s"),
            _ => string.Create(CultureInfo.InvariantCulture, $"{whole} s"),
        };
    }
}
