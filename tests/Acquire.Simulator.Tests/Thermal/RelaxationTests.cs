using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Tests.Thermal;

public sealed class RelaxationTests
{
    [Theory]
    [InlineData(0, 0)]
    [InlineData(1e-12, 9.999999999995e-13)]
    [InlineData(1, 0.63212055882855767)]
    [InlineData(1e12, 1)]
    public void Gone_AfterAnyTime_KeepsItsDigits(double timeConstants, double expected) =>
        Assert.InRange(Relaxation.Gone(timeConstants), expected * (1 - 1e-14), expected * (1 + 1e-14));
}
