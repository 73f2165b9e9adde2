namespace Acquire.Drivers.Replies;

/// <summary>How an instrument's unit relates to SI: si = Factor * x + Offset.</summary>
/// <param name="Unit">The unit as written in the driver file.</param>
/// <param name="Factor">SI units per instrument unit.</param>
/// <param name="Offset">SI value of the instrument's zero, such as 273.15 for degC.</param>
public readonly record struct UnitScale(string Unit, double Factor, double Offset)
{
    /// <summary>The instrument speaks SI.</summary>
    public static UnitScale None { get; } = new("1", 1, 0);

    /// <summary>From the instrument's unit to SI.</summary>
    public double ToSI(double instrumentValue) => Factor * instrumentValue + Offset;

    /// <summary>From SI to the instrument's unit.</summary>
    public double FromSI(double siValue) => (siValue - Offset) / Factor;
}
