namespace Acquire.Physics.Sensors;

/// <summary>Thermocouple type K with its reference junction at 0 degC.</summary>
/// <remarks>
/// Model      E(t) = sum c_i t^i, above 0 degC plus a0 exp(a1 (t - a2)^2); E in mV, t in degC
/// Valid      -270 to 1372 degC direct, -200 to 1372 degC inverse; outside there is no value, never an extrapolation
/// Numerics   the inverse is bisection on the direct function, which rises strictly: 1e-10 degC
/// Source     NIST Monograph 175 (Burns et al. 1993); IEC 60584-1
/// </remarks>
public static class ThermocoupleK
{
    private const double ColdestC = -270;
    private const double ColdestInverseC = -200;
    private const double HottestC = 1372;

    /// <summary>Voltage [V] at a temperature [degC]; NaN outside the range.</summary>
    public static double VoltageV(double celsius)
    {
        if (!(celsius >= ColdestC && celsius <= HottestC))
        {
            return double.NaN;
        }

        if (celsius < 0)
        {
            return 1e-3 * Polynomial(ThermocoupleKCoefficients.Cold, celsius);
        }

        var e = ThermocoupleKCoefficients.Exponential;
        var distance = celsius - e[2];
        return celsius == 0 ? 0 : 1e-3 * (Polynomial(ThermocoupleKCoefficients.Hot, celsius) + (e[0] * Math.Exp(e[1] * distance * distance)));
    }

    /// <summary>Temperature [degC] of a voltage [V] with the reference junction at a temperature [degC]; NaN outside the range.</summary>
    public static double Celsius(double voltageV, double referenceJunctionC = 0)
    {
        var whole = voltageV + VoltageV(referenceJunctionC);
        if (!(whole >= VoltageV(ColdestInverseC) && whole <= VoltageV(HottestC)))
        {
            return double.NaN;
        }

        var low = ColdestInverseC;
        var high = HottestC;
        for (var step = 0; step < 60; step++)
        {
            var middle = (low + high) / 2;
            if (VoltageV(middle) < whole)
            {
                low = middle;
            }
            else
            {
                high = middle;
            }
        }

        return (low + high) / 2;
    }

    private static double Polynomial(double[] coefficients, double x)
    {
        var sum = 0.0;
        for (var i = coefficients.Length - 1; i >= 0; i--)
        {
            sum = (sum * x) + coefficients[i];
        }

        return sum;
    }
}
