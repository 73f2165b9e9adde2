namespace Acquire.Simulator.Serving;

/// <summary>A device that is being served to other processes until it is disposed.</summary>
public interface IDeviceServer : IDisposable
{
    /// <summary>Where it is found, in VISA resource syntax.</summary>
    string Address { get; }
}
