namespace Acquire.Physics.Sensors;

/// <summary>Industrial platinum thermometers.</summary>
/// <remarks>
/// Model      t >= 0: R = R0 (1 + A t + B t^2);  t &lt; 0: R = R0 (1 + A t + B t^2 + C (t - 100) t^3), t in degrees Celsius
/// Valid      -200 to 850 degC; outside there is no value, never an extrapolation
/// Source     IEC 60751:2022
/// </remarks>
public static class PlatinumIec60751
{
    private const double A = 3.9083e-3;
    private const double B = -5.775e-7;
    private const double C = -4.183e-12;
    private const double ColdestC = -200;
    private const double HottestC = 850;

    /// <summary>Resistance [ohm] of a sensor of nominal resistance R0 [ohm] at t [degC]; NaN outside the range.</summary>
    public static double ResistanceOhm(double celsius, double nominalOhm = 100)
    {
        if (!(celsius >= ColdestC && celsius <= HottestC))
        {
            return double.NaN;
        }

        var ratio = 1 + (celsius * (A + (B * celsius)));
        return nominalOhm * (celsius < 0 ? ratio + (C * (celsius - 100) * celsius * celsius * celsius) : ratio);
    }

    /// <summary>Temperature [degC] of a resistance [ohm], refined to the direct function; NaN outside the range.</summary>
    public static double Celsius(double resistanceOhm, double nominalOhm = 100)
    {
        if (!(resistanceOhm >= ResistanceOhm(ColdestC, nominalOhm) && resistanceOhm <= ResistanceOhm(HottestC, nominalOhm)))
        {
            return double.NaN;
        }

        // The quadratic branch in closed form is exact above 0 degC and the start of Newton's method below.
        var ratio = resistanceOhm / nominalOhm;
        var celsius = (-A + Math.Sqrt((A * A) - (4 * B * (1 - ratio)))) / (2 * B);
        for (var step = 0; step < 8 && ratio < 1; step++)
        {
            var slope = A + (2 * B * celsius) + (C * celsius * celsius * ((4 * celsius) - 300));
            celsius -= ((ResistanceOhm(Math.Max(celsius, ColdestC), 1)) - ratio) / slope;
        }

        return celsius;
    }
}
