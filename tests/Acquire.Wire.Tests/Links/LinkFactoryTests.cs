using Acquire.Testing;

namespace Acquire.Wire.Tests.Links;

public class LinkFactoryTests
{
    [Fact]
    public async Task Create_ByAddress_GivesTheLinkAndItsClock()
    {
        var clock = new TestClock();
        var factory = new LinkFactory(name => name == "meter" ? new ScriptedDevice() : null, clock);
        await using var tcp = factory.Create("TCPIP::localhost::5025::SOCKET", LinkSettings.Default);
        await using var serial = factory.Create("ASRL/dev/ttyUSB0::INSTR", LinkSettings.Default);
        await using var device = factory.Create("SIM::meter::INSTR", LinkSettings.Default);
        Assert.IsType<TcpLink>(tcp);
        Assert.IsType<SerialLink>(serial);
        Assert.IsType<InProcessLink>(device);
        Assert.Equal((TimeProvider.System, TimeProvider.System, clock), (tcp.TimeOutClock, serial.TimeOutClock, device.TimeOutClock));
        Assert.Equal((true, false, true), (tcp.ReopenSeparates, serial.ReopenSeparates, device.ReopenSeparates));
    }

    [Theory]
    [InlineData("SIM::lamp::INSTR", "no device named 'lamp' lives in this process")]
    [InlineData("USB::1::INSTR", "its interface is not one that this version speaks")]
    public void Create_ImpossibleAddress_SaysWhy(string address, string why)
    {
        var refused = Assert.Throws<LinkException>(() => new LinkFactory().Create(address, LinkSettings.Default));
        Assert.Contains(why, refused.Message, StringComparison.Ordinal);
    }
}
