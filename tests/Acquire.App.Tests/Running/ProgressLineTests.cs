using Acquire.App.CommandLine;
using Acquire.App.Running;
using Acquire.Control;
using Xunit;

namespace Acquire.App.Tests.Running;

public sealed class ProgressLineTests
{
    private static readonly EngineStatusMessage Status =
        new("r", "a.run", "running", "soak", 1, 2, 7, 60, 300.1, 300.05, 301.25, 3725, 4321, "sample drift 0.080 K/min, needs 0.030");

    [Fact]
    public void Line_ShowsLegTemperaturePointWaitAndTimeLeft() => Assert.Equal(
        "leg 1/2  sample 300.05 K, target 301.25 K  point 7/60  soak, sample drift 0.080 K/min, needs 0.030  1 h 02 min left  on disk 4321 readings",
        ProgressLine.Text(Status));

    [Fact]
    public void Line_WhenRedirected_ComesOncePerPoint()
    {
        var output = new StringWriter();
        var line = new ProgressLine(Terminal.Of(output, output));
        line.Show(Status);
        line.Show(Status);
        line.Show(Status with { Point = 8 });
        Assert.Equal(2, output.ToString().Split('\n', StringSplitOptions.RemoveEmptyEntries).Length);
    }

    [Theory]
    [InlineData(4, "4 s")]
    [InlineData(95, "1 min 35 s")]
    [InlineData(7260, "2 h 01 min")]
    [InlineData(double.NaN, "unknown")]
    [InlineData(-3, "0 s")]
    public void Duration_ReadsAsPeopleSayIt(double seconds, string text) => Assert.Equal(text, DurationText.Of(seconds));
}
