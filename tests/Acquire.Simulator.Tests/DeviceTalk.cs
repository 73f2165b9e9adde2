using System.Buffers;
using System.Globalization;
using System.Text;
using Acquire.Simulator.Tests.Twins;
using Acquire.Simulator.Time;
using Acquire.Simulator.Twins;
using Acquire.Wire;

namespace Acquire.Simulator.Tests;

/// <summary>A simulated bench under virtual time, spoken to without drivers.</summary>
internal sealed class DeviceTalk
{
    private readonly ArrayBufferWriter<byte> _reply = new();

    public DeviceTalk(string bench = "germanium-quick", ulong seed = 1, Func<TwinModel, TwinModel>? change = null)
    {
        Time = new VirtualTime(new DateTimeOffset(2026, 10, 1, 20, 0, 0, TimeSpan.Zero));
        var twin = ShippedBenches.Twin(bench);
        Bench = new SimulatedBench(ShippedBenches.Bench(bench), change?.Invoke(twin) ?? twin, seed, Time.Clock);
    }

    public DeviceTalk(SimulatedBench bench, VirtualTime time) => (Bench, Time) = (bench, time);

    public VirtualTime Time { get; }

    public SimulatedBench Bench { get; }

    /// <summary>How long the device took for the last message.</summary>
    public TimeSpan Took { get; private set; }

    public string Ask(string instrument, string message) => Exchange(Bench.PortFor(instrument), message + "\n");

    public double[] Numbers(string instrument, string message) =>
        [.. Ask(instrument, message).TrimEnd('\n').Split(',', ';').Select(n => double.Parse(n, CultureInfo.InvariantCulture))];

    /// <summary>Sends without expecting a reply, and checks that the device had nothing against it.</summary>
    public void Tell(string instrument, string message)
    {
        Assert.Equal("", Ask(instrument, message));
        Assert.Equal("0,\"No error\"\n", Ask(instrument, "SYST:ERR?"));
    }

    /// <summary>One reading of the source-meter, waiting as long as it takes: current [A], voltage [V], status.</summary>
    public (double CurrentA, double VoltageV, int Status) Read()
    {
        var numbers = Numbers("meter", "READ?");
        Wait(Took.TotalSeconds);
        return (numbers[0], numbers[1], (int)numbers[2]);
    }

    public void Wait(double seconds)
    {
        if (seconds > 0) Time.Run(() => Task.Delay(TimeSpan.FromMilliseconds(Math.Ceiling(seconds * 1000)), Time.Clock));
    }

    public string Exchange(IDevicePort port, string bytes)
    {
        _reply.ResetWrittenCount();
        Took = port.Receive(Encoding.Latin1.GetBytes(bytes), _reply);
        return Encoding.ASCII.GetString(_reply.WrittenSpan);
    }
}
