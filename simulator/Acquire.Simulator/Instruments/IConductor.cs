namespace Acquire.Simulator.Instruments;

/// <summary>What a source-meter has between its terminals.</summary>
internal interface IConductor
{
    /// <summary>Conductance seen at the terminals [S].</summary>
    double ConductanceS { get; }

    /// <summary>Voltage that the sample makes by itself [V].</summary>
    double EmfV { get; }

    /// <summary>Temperature of what conducts [K], for its thermal noise.</summary>
    double TemperatureK { get; }

    /// <summary>Tells the sample what heats it [W].</summary>
    void Dissipate(double powerW);
}
