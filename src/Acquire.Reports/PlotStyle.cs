using ScottPlot;

namespace Acquire.Reports;

/// <summary>One look for all plots: dark on white, legible in grey, told apart by shape and line, not by colour alone.</summary>
internal static class PlotStyle
{
    public const int Width = 800;
    public const int Height = 460;

    /// <summary>Shapes of the legs, in order.</summary>
    private static readonly (MarkerShape Shape, Color Colour)[] Legs =
    [
        (MarkerShape.FilledCircle, Colors.Black), (MarkerShape.OpenSquare, Color.FromHex("#1f5fa8")),
        (MarkerShape.FilledTriangleUp, Color.FromHex("#8a4b08")), (MarkerShape.OpenDiamond, Color.FromHex("#5a5a5a")),
    ];

    /// <summary>An empty plot with titled axes.</summary>
    public static Plot New(string x, string y)
    {
        var plot = new Plot();
        plot.Axes.Bottom.Label.Text = x;
        plot.Axes.Left.Label.Text = y;
        plot.Axes.Bottom.Label.FontSize = 15;
        plot.Axes.Left.Label.FontSize = 15;
        plot.Axes.Bottom.TickLabelStyle.FontSize = 13;
        plot.Axes.Left.TickLabelStyle.FontSize = 13;
        plot.Grid.MajorLineColor = Colors.Black.WithAlpha(0.12);
        plot.Legend.FontSize = 13;
        plot.Legend.ShadowColor = Colors.Transparent;
        return plot;
    }

    /// <summary>Points with error bars.</summary>
    public static void Points(Plot plot, double[] x, double[] y, double[] uy, (int Leg, string Legend) what)
    {
        if (x.Length == 0)
        {
            return;
        }

        var (shape, colour) = Legs[(what.Leg - 1) % Legs.Length];
        if (uy.Any(u => u > 0))
        {
            var bars = plot.Add.ErrorBar(x, y, uy);
            bars.Color = colour;
            bars.CapSize = 3;
        }

        var markers = plot.Add.Markers(x, y);
        markers.MarkerShape = shape;
        markers.MarkerSize = shape is MarkerShape.OpenSquare or MarkerShape.OpenDiamond ? 13 : 8; // hollow ones around filled ones
        markers.Color = colour;
        markers.MarkerLineWidth = 1.5f;
        markers.LegendText = what.Legend;
    }

    /// <summary>Points that do not count: hollow triangles.</summary>
    public static void Excluded(Plot plot, double[] x, double[] y, string legend)
    {
        if (x.Length == 0)
        {
            return;
        }

        var markers = plot.Add.Markers(x, y);
        markers.MarkerShape = MarkerShape.OpenTriangleDown;
        markers.MarkerSize = 10;
        markers.Color = Color.FromHex("#777777");
        markers.MarkerLineWidth = 1.5f;
        markers.LegendText = legend;
    }

    /// <summary>A line.</summary>
    public static void Line(Plot plot, double[] x, double[] y, (string Legend, LinePattern Pattern, string Hex) how)
    {
        if (x.Length < 2)
        {
            return;
        }

        var line = plot.Add.ScatterLine(x, y);
        line.LinePattern = how.Pattern;
        line.LineWidth = 1.8f;
        line.Color = Color.FromHex(how.Hex);
        line.LegendText = how.Legend;
    }

    /// <summary>A little room on every side, and the legend where it hides least.</summary>
    public static Plot Finish(Plot plot, Alignment legend)
    {
        plot.ShowLegend(legend);
        plot.Axes.Margins(0.05, 0.12);
        plot.Axes.AutoScale();
        return plot;
    }
}
