namespace Acquire.Bench.Text;

/// <summary>What a quantity measures. A temperature and a temperature difference are different things.</summary>
public enum Dimension
{
    Temperature,
    TemperatureDifference,
    TemperatureRate,
    Voltage,
    Current,
    Resistance,
    Conductance,
    Conductivity,
    Resistivity,
    Capacitance,
    Power,
    Energy,
    Time,
    Frequency,
    Length,
    Area,
    Irradiance,
    NumberDensity,
    Mobility,
    HeatCapacity,
    ThermalConductance,
    Ratio,
    LineCycles,
    ThermoelectricPower,
}
