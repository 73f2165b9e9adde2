using CsCheck;

namespace Acquire.Wire.Tests.Addresses;

public class ResourceAddressTests
{
    [Theory]
    [InlineData("TCPIP::127.0.0.1::5025::SOCKET", "127.0.0.1", 5025)]
    [InlineData("tcpip0::cryostat.local::1394::socket", "cryostat.local", 1394)]
    [InlineData("TCPIP::[::1]::0::SOCKET", "::1", 0)]
    public void Parse_OfSocket_GivesHostAndPort(string text, string host, int port)
    {
        var tcp = Assert.IsType<TcpAddress>(ResourceAddress.Parse(text).Address);
        Assert.Equal((host, port, text), (tcp.Host, tcp.Port, tcp.Text));
    }

    [Theory]
    [InlineData("ASRL/dev/pts/3::INSTR", "/dev/pts/3")]
    [InlineData("ASRL/dev/serial/by-id/usb-1::instr", "/dev/serial/by-id/usb-1")]
    public void Parse_OfSerialPath_GivesPath(string text, string path) =>
        Assert.Equal(path, Assert.IsType<SerialAddress>(ResourceAddress.Parse(text).Address).Path);

    [Fact]
    public void Parse_OfSerialNumber_CountsFromOne() =>
        Assert.Equal(OperatingSystem.IsWindows() ? "COM1" : "/dev/ttyS0", Assert.IsType<SerialAddress>(ResourceAddress.Parse("ASRL1::INSTR").Address).Path);

    [Fact]
    public void Parse_OfInProcess_GivesName() =>
        Assert.Equal("meter", Assert.IsType<InProcessAddress>(ResourceAddress.Parse("SIM::meter::INSTR").Address).Name);

    [Theory]
    [InlineData("", "its interface is not one")]
    [InlineData("GPIB0::22::INSTR", "its interface is not one")]
    [InlineData("TCPIP::127.0.0.1::inst0::INSTR", "only raw sockets")]
    [InlineData("TCPIP::127.0.0.1::65536::SOCKET", "the port '65536' is not a number from 0 to 65535")]
    [InlineData("TCPIP::127.0.0.1::-1::SOCKET", "the port '-1'")]
    [InlineData("TCPIP::::5025::SOCKET", "the host is missing")]
    [InlineData("TCPIPx::h::5025::SOCKET", "not TCPIP or TCPIP<board>")]
    [InlineData("ASRL::INSTR", "a serial address is ASRL")]
    [InlineData("SIM::a::b::INSTR", "SIM::<name>::INSTR")]
    [InlineData("SIM::a\n::INSTR", "control characters")]
    public void Parse_OfOtherText_SaysWhyAndWhatIsAllowed(string text, string why)
    {
        var parse = ResourceAddress.Parse(text);
        Assert.Null(parse.Address);
        Assert.Contains(why, parse.Problem, StringComparison.Ordinal);
        Assert.Contains("Allowed: TCPIP::<host>::<port>::SOCKET", parse.Problem, StringComparison.Ordinal);
    }

    [Fact]
    public void Parse_OfAnyText_GivesExactlyOneOfAddressAndProblem() =>
        Check.Sample(Gen.OneOf(Gen.String, Gen.String.Select(s => "TCPIP::" + s), Gen.String.Select(s => "ASRL" + s + "::INSTR")), text =>
        {
            var parse = ResourceAddress.Parse(text);
            return parse.Address is null != parse.Problem is null;
        });
}
