namespace Acquire.Wire;

/// <summary>Makes the link that an address asks for.</summary>
public interface ILinkFactory
{
    /// <summary>Makes a closed link. Throws <see cref="LinkException"/> when the address cannot be served, with what is allowed.</summary>
    ILink Create(string address, LinkSettings settings);
}

/// <summary>The links that this program has: sockets, serial lines and, when given, devices in this process.</summary>
/// <param name="portFor">Finds a device in this process by name; null when there are none.</param>
/// <param name="deviceClock">The clock on which devices in this process take their time.</param>
public sealed class LinkFactory(Func<string, IDevicePort?>? portFor = null, TimeProvider? deviceClock = null) : ILinkFactory
{
    /// <inheritdoc/>
    public ILink Create(string address, LinkSettings settings)
    {
        var parse = ResourceAddress.Parse(address);
        return parse.Address switch
        {
            TcpAddress tcp => new TcpLink(tcp),
            SerialAddress serial => new SerialLink(serial, settings.Serial),
            InProcessAddress device => InProcess(device),
            _ => throw new LinkException(parse.Problem ?? $"Address '{address}' refused."),
        };
    }

    private InProcessLink InProcess(InProcessAddress device)
    {
        var port = portFor?.Invoke(device.Name) ?? throw new LinkException(
            $"Address '{device.Text}' refused: no device named '{device.Name}' lives in this process. Use a real address, or rehearse a simulated bench.");
        return new InProcessLink(port, device.Text, deviceClock ?? TimeProvider.System);
    }
}
