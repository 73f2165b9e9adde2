using UnitsNet;

namespace Acquire.Bench.Text;

/// <summary>One unit: its text, and how it becomes SI: <c>si = offset + factor * value</c>.</summary>
public readonly record struct Unit(string Symbol, double Factor, double Offset = 0);

/// <summary>The units that files may use, the trade's ASCII spellings, for each dimension; the first one is the one we print.</summary>
/// <remarks>Factors come from UnitsNet where it has the unit; the others are products of powers of ten and the second.</remarks>
internal static class Units
{
    /// <summary>Exact since 2019 (SI Brochure, 9th edition); the library still carries the CODATA 2010 value, 4e-8 off.</summary>
    private const double ElectronvoltJ = 1.602176634e-19;

    /// <summary>Units of one dimension.</summary>
    public static Unit[] Of(Dimension dimension) => dimension switch
    {
        Dimension.Temperature => [new("K", 1), new("degC", 1, Temperature.FromDegreesCelsius(0).Kelvins), new("mK", 1e-3)],
        Dimension.TemperatureDifference => [new("K", 1), new("mK", TemperatureDelta.FromMillidegreesCelsius(1).Kelvins)],
        Dimension.TemperatureRate => [new("K/min", 1.0 / 60), new("K/s", 1), new("K/h", 1.0 / 3600), new("mK/min", 1e-3 / 60)],
        Dimension.Voltage => [new("V", 1), new("mV", ElectricPotential.FromMillivolts(1).Volts), new("uV", ElectricPotential.FromMicrovolts(1).Volts), new("kV", ElectricPotential.FromKilovolts(1).Volts)],
        Dimension.Current => [new("A", 1), new("mA", ElectricCurrent.FromMilliamperes(1).Amperes), new("uA", ElectricCurrent.FromMicroamperes(1).Amperes), new("nA", ElectricCurrent.FromNanoamperes(1).Amperes), new("pA", ElectricCurrent.FromPicoamperes(1).Amperes)],
        Dimension.Resistance => [new("ohm", 1), new("kohm", ElectricResistance.FromKiloohms(1).Ohms), new("Mohm", ElectricResistance.FromMegaohms(1).Ohms), new("Gohm", ElectricResistance.FromGigaohms(1).Ohms), new("Tohm", 1e12)],
        Dimension.Conductance => [new("S", 1), new("mS", ElectricConductance.FromMillisiemens(1).Siemens), new("uS", ElectricConductance.FromMicrosiemens(1).Siemens), new("nS", 1e-9), new("pS", 1e-12)],
        Dimension.Conductivity => [new("S/m", 1), new("S/cm", ElectricConductivity.FromSiemensPerCentimeter(1).SiemensPerMeter)],
        Dimension.Resistivity => [new("ohm m", 1), new("ohm cm", ElectricResistivity.FromOhmsCentimeter(1).OhmMeters)],
        Dimension.Capacitance => [new("F", 1), new("uF", 1e-6), new("nF", 1e-9), new("pF", 1e-12)],
        Dimension.Power => [new("W", 1), new("mW", (double)Power.FromMilliwatts(1).Watts), new("kW", (double)Power.FromKilowatts(1).Watts)],
        Dimension.Energy => [new("eV", ElectronvoltJ), new("meV", 1e-3 * ElectronvoltJ), new("J", 1)],
        Dimension.Time => [new("s", 1), new("ms", 1e-3), new("us", 1e-6), new("min", Duration.FromMinutes(1).Seconds), new("h", Duration.FromHours(1).Seconds), new("d", Duration.FromDays(1).Seconds)],
        Dimension.Frequency => [new("Hz", 1), new("kHz", Frequency.FromKilohertz(1).Hertz), new("mHz", 1e-3)],
        Dimension.Length => [new("m", 1), new("cm", Length.FromCentimeters(1).Meters), new("mm", Length.FromMillimeters(1).Meters), new("um", Length.FromMicrometers(1).Meters), new("nm", Length.FromNanometers(1).Meters)],
        Dimension.Area => [new("m2", 1), new("cm2", Area.FromSquareCentimeters(1).SquareMeters), new("mm2", Area.FromSquareMillimeters(1).SquareMeters)],
        Dimension.Irradiance => [new("W/m2", 1), new("mW/cm2", Irradiance.FromMilliwattsPerSquareCentimeter(1).WattsPerSquareMeter), new("W/cm2", Irradiance.FromWattsPerSquareCentimeter(1).WattsPerSquareMeter), new("uW/cm2", 1e-2)],
        Dimension.NumberDensity => [new("cm-3", 1e6), new("m-3", 1)],
        Dimension.Mobility => [new("m2/Vs", 1), new("cm2/Vs", 1e-4)],
        Dimension.HeatCapacity => [new("J/K", 1), new("mJ/K", 1e-3)],
        Dimension.ThermalConductance => [new("W/K", 1), new("mW/K", 1e-3)],
        Dimension.Ratio => [new("1", 1), new("%", Ratio.FromPercent(1).DecimalFractions), new("ppm", Ratio.FromPartsPerMillion(1).DecimalFractions)],
        Dimension.LineCycles => [new("line cycles", 1), new("line cycle", 1)],
        Dimension.ThermoelectricPower => [new("V/K", 1), new("mV/K", 1e-3), new("uV/K", 1e-6)],
        _ => throw new ArgumentOutOfRangeException(nameof(dimension)),
    };
}
