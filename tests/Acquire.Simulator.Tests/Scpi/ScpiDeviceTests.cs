using System.Text;
using Acquire.Simulator.Scpi;
using CsCheck;

namespace Acquire.Simulator.Tests.Scpi;

public sealed class ScpiDeviceTests
{
    private readonly DeviceTalk _talk = new();

    [Theory]
    [InlineData("controller", "ACQUIRE,SIMULATED TEMPERATURE CONTROLLER,S1,1\n")]
    [InlineData("meter", "ACQUIRE,SIMULATED SOURCE-METER,S1,1\n")]
    [InlineData("lamp", "ACQUIRE,SIMULATED LAMP,S1,1\n")]
    public void Identity_Asked_HasFourFields(string instrument, string identity) => Assert.Equal(identity, _talk.Ask(instrument, "*IDN?"));

    [Theory]
    [InlineData("SOUR:VOLT 0.25")]
    [InlineData("source:voltage 0.25")]
    [InlineData(":SOURce:VOLTage:LEVel 2.5E-1")]
    [InlineData("  SoUr:vOlT:lEv\t+.25\r")]
    public void Header_ShortLongAndMixedCase_AreTheSame(string message)
    {
        _talk.Tell("meter", message);
        Assert.Equal("0.25\n", _talk.Ask("meter", "SOUR:VOLT?"));
    }

    [Theory]
    // Number and text of each error as in SCPI-1999, volume 2, section 21.8.
    [InlineData("SOUR:VOLTA 1", "-113,\"Undefined header\"")]
    [InlineData("NONSENSE", "-113,\"Undefined header\"")]
    [InlineData("READ", "-113,\"Undefined header\"")]
    [InlineData("SOUR:VOLT 1000", "-222,\"Data out of range\"")]
    [InlineData("SOUR:VOLT", "-109,\"Missing parameter\"")]
    [InlineData("SOUR:VOLT abc", "-104,\"Data type error\"")]
    [InlineData("SOUR:VOLT 1,2", "-108,\"Parameter not allowed\"")]
    [InlineData("SOUR:VOLT NAN", "-222,\"Data out of range\"")]
    [InlineData("OUTP MAYBE", "-224,\"Illegal parameter value\"")]
    [InlineData("SENS:CURR:NPLC 11", "-222,\"Data out of range\"")]
    [InlineData("SOUR:VOLT?;;SOUR:VOLT?", "-102,\"Syntax error\"")]
    [InlineData("SOUR:VOLT 0\u00b5", "-101,\"Invalid character\"")]
    public void Message_Wrong_IsReportedOnceInTheErrorQueue(string message, string error)
    {
        _talk.Ask("meter", message);
        Assert.Equal(error + "\n", _talk.Ask("meter", "SYST:ERR?"));
        Assert.Equal("0,\"No error\"\n", _talk.Ask("meter", "SYST:ERR:NEXT?"));
    }

    [Fact]
    public void Setting_Refused_ChangesNothing()
    {
        _talk.Tell("controller", "SOUR:TEMP:SPO 300");
        _talk.Ask("controller", "SOUR:TEMP:SPO 5000");
        Assert.Equal("300\n", _talk.Ask("controller", "SOUR:TEMP:SPO:TARG?"));
    }

    [Fact]
    public void Compound_ColonsAndPaths_FollowTheTree()
    {
        Assert.Equal("0;1\n", _talk.Ask("meter", ":SOUR:VOLT?;:SENS:CURR:NPLC?"));
        // RANG continues at SENS:CURR, where NPLC stood; *OPC? in between leaves that place alone.
        Assert.Equal("1;1;1.0E-004\n", _talk.Ask("meter", "SENS:CURR:NPLC?;*OPC?;RANG?"));
        Assert.Equal("1\n", _talk.Ask("meter", "SENS:CURR:NPLC?;SENS:CURR:NPLC?"));
        Assert.StartsWith("-113", _talk.Ask("meter", "SYST:ERR?"), StringComparison.Ordinal);
    }

    [Fact]
    public void Compound_ErrorInTheMiddle_KeepsTheRepliesBeforeAndSkipsTheRest()
    {
        Assert.Equal("1\n", _talk.Ask("meter", "*OPC?;:WRONG;:SOUR:VOLT 1"));
        Assert.Equal("0\n", _talk.Ask("meter", "SOUR:VOLT?"));
    }

    [Fact]
    public void ErrorQueue_TooManyErrors_EndsWithOverflow()
    {
        for (var i = 0; i < 30; i++) _talk.Ask("lamp", "WRONG");
        var errors = Enumerable.Range(0, 21).Select(_ => _talk.Ask("lamp", "SYST:ERR?")).ToList();
        Assert.Equal(19, errors.Count(e => e.StartsWith("-113", StringComparison.Ordinal)));
        Assert.Equal("-350,\"Queue overflow\"\n", errors[19]);
        Assert.Equal("0,\"No error\"\n", errors[20]);
    }

    [Fact]
    public void Status_AfterErrors_FollowsIeee4882()
    {
        Assert.Equal("128\n", _talk.Ask("lamp", "*ESR?"));
        _talk.Ask("lamp", "WRONG");
        _talk.Ask("lamp", "SOUR:CURR 50");
        Assert.Equal("4\n", _talk.Ask("lamp", "*STB?"));
        _talk.Ask("lamp", "*ESE 32;*SRE 32");
        Assert.Equal("100\n", _talk.Ask("lamp", "*STB?"));
        Assert.Equal("48\n", _talk.Ask("lamp", "*ESR?"));
        Assert.Equal("0\n", _talk.Ask("lamp", "*ESR?"));
        _talk.Ask("lamp", "*CLS");
        Assert.Equal("0\n", _talk.Ask("lamp", "*STB?"));
        _talk.Ask("lamp", "*OPC");
        Assert.Equal("1\n", _talk.Ask("lamp", "*ESR?"));
    }

    [Fact]
    public void Message_InPieces_GivesTheSameReplyAsInOne() =>
        Gen.Int[1, 12].Sample(size =>
        {
            const string message = "*IDN?;:SOUR:VOLT 0.5;:SOUR:VOLT?\n";
            var talk = new DeviceTalk();
            var port = talk.Bench.PortFor("meter");
            var reply = new StringBuilder();
            for (var at = 0; at < message.Length; at += size)
                reply.Append(talk.Exchange(port, message.Substring(at, Math.Min(size, message.Length - at))));
            Assert.Equal("ACQUIRE,SIMULATED SOURCE-METER,S1,1;0.5\n", reply.ToString());
        }, iter: 20);

    [Fact]
    public void Message_TooLong_IsDroppedToItsEndAndReported()
    {
        Assert.Equal("", _talk.Ask("meter", new string('x', 100_000)));
        Assert.Equal("-363,\"Input buffer overrun\"\n", _talk.Ask("meter", "SYST:ERR?"));
        Assert.Equal("1\n", _talk.Ask("meter", "*OPC?"));
    }

    [Fact]
    public void Link_Reopened_ForgetsHalfAMessage()
    {
        var port = _talk.Bench.PortFor("meter");
        _talk.Exchange(port, "SOUR:VO");
        port.Connected(false);
        port.Connected(true);
        Assert.Equal("1\n", _talk.Ask("meter", "*OPC?"));
    }

    [Fact]
    public void Bytes_Any_NeverThrowAndTheDeviceStillAnswers() =>
        Gen.Byte.Array[0, 300].Sample(bytes =>
        {
            var talk = new DeviceTalk();
            var port = talk.Bench.PortFor("controller");
            talk.Exchange(port, Encoding.Latin1.GetString(bytes));
            talk.Exchange(port, "\n");
            Assert.Equal("1\n", talk.Ask("controller", "*OPC?"));
        }, iter: 200);

    [Fact]
    public void Reset_AfterSettings_LeavesEverythingOff()
    {
        _talk.Tell("controller", "SOUR:TEMP:SPO 330;:OUTP ON");
        _talk.Tell("meter", "SOUR:VOLT 0.5;:OUTP ON");
        _talk.Tell("lamp", "SOUR:CURR 0.4;:OUTP ON");
        foreach (var instrument in new[] { "controller", "meter", "lamp" })
        {
            _talk.Tell(instrument, "*RST");
            Assert.Equal("0\n", _talk.Ask(instrument, "OUTP?"));
        }
        Assert.Equal("0\n", _talk.Ask("meter", "SOUR:VOLT?"));
        Assert.Equal("0\n", _talk.Ask("lamp", "SOUR:CURR?"));
        _talk.Wait(1);
        Assert.Equal(0, _talk.Numbers("controller", "MEAS:POW?")[0]);
        Assert.Equal(0, _talk.Bench.Truth().IrradianceWPerM2);
    }

    [Fact]
    public void Channel_NotThere_IsOutOfRange()
    {
        Assert.Equal("", _talk.Ask("controller", "MEAS:TEMP? (@3)"));
        Assert.Equal("-222,\"Data out of range\"\n", _talk.Ask("controller", "SYST:ERR?"));
    }

    [Fact]
    public void EventBit_EachClassOfErrors_IsTheOneOfTheStandard()
    {
        Assert.Equal(32, ScpiError.UndefinedHeader.EventBit);
        Assert.Equal(16, ScpiError.DataOutOfRange.EventBit);
        Assert.Equal(8, ScpiError.QueueOverflow.EventBit);
        Assert.Equal(0, ScpiError.None.EventBit);
    }
}
