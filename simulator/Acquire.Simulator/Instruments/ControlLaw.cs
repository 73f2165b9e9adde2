namespace Acquire.Simulator.Instruments;

/// <summary>A sampled PID control law with a power limit and a ramp generator.</summary>
/// <remarks>
/// Model      P = Kp (w - T) + I - Kp Td dT/dt + Cf dw/dt, dI/dt = Kp (w - T) / Ti, 0 &lt;= P &lt;= Pmax
///            w moves from where it is towards the target at the ramp.
/// Anti-windup: the integral stands while the output is at a limit and the error would push it further.
/// Source     K. J. Astrom, T. Hagglund, PID Controllers, 2nd ed. (1995), sections 3.4 and 3.5.
/// </remarks>
internal sealed class ControlLaw(ControllerModel model)
{
    private double _integralW;
    private double _lastK = double.NaN;

    /// <summary>Where the ramp ends [K].</summary>
    public double TargetK { get; set; }

    /// <summary>Speed of the set point [K/s]; 0 jumps.</summary>
    public double RampKPerS { get; set; }

    /// <summary>The set point worked to now [K].</summary>
    public double WorkingK { get; private set; }

    /// <summary>True while the heater is switched on.</summary>
    public bool IsOn { get; private set; }

    /// <summary>Heater power [W].</summary>
    public double PowerW { get; private set; }

    /// <summary>Switches the heater; the ramp begins at the temperature found.</summary>
    public void Switch(bool on, double measuredK)
    {
        if (on == IsOn) return;
        IsOn = on;
        PowerW = 0;
        _integralW = 0;
        _lastK = double.NaN;
        if (on) WorkingK = measuredK;
    }

    /// <summary>One sample of the law.</summary>
    public void Step(double measuredK, double stepS)
    {
        if (!IsOn)
        {
            WorkingK = measuredK;
            return;
        }
        var rampKPerS = MoveSetPoint(stepS);
        var errorK = WorkingK - measuredK;
        var slopeKPerS = double.IsNaN(_lastK) ? 0 : (measuredK - _lastK) / stepS;
        _lastK = measuredK;
        var proportionalW = model.ProportionalWPerK * (errorK - (model.DerivativeTimeS * slopeKPerS));
        var wantedW = proportionalW + _integralW + (model.FeedForwardJPerK * rampKPerS);
        PowerW = Math.Clamp(wantedW, 0, model.MostPowerW);
        if ((wantedW < model.MostPowerW || errorK < 0) && (wantedW > 0 || errorK > 0))
            _integralW = Math.Clamp(_integralW + (model.ProportionalWPerK * errorK * stepS / model.IntegralTimeS), 0, model.MostPowerW);
    }

    private double MoveSetPoint(double stepS)
    {
        var missingK = TargetK - WorkingK;
        if (missingK == 0) return 0;
        var stepK = RampKPerS * stepS;
        if (RampKPerS <= 0 || Math.Abs(missingK) <= stepK)
        {
            WorkingK = TargetK;
            return 0;
        }
        WorkingK += Math.Sign(missingK) * stepK;
        return Math.Sign(missingK) * RampKPerS;
    }
}
