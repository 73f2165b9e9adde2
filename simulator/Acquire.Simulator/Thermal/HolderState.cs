namespace Acquire.Simulator.Thermal;

/// <summary>Temperatures of stage and sample, and how they move.</summary>
/// <remarks>
/// Model      C_stage dT/dt = P_heater - K (T - T_cold) - eps A s (T^4 - T_s^4) - L (T - T_sample)
///            C_sample dT_sample/dt = P_sample + L (T - T_sample)
/// Inputs     P_heater, P_sample [W]; step [s]
/// Numerics   midpoint rule, the step cut so that it stays below a fifth of the sample's time constant; steady states
///            are fixed points of the rule and so carry no step error
/// Source     s = 5.670374419e-8 W m-2 K-4, CODATA 2018
/// </remarks>
public sealed class HolderState(HolderModel model)
{
    private const double StefanBoltzmannWPerM2K4 = 5.670374419e-8;
    private const int MostCuts = 64;

    /// <summary>The holder's constants.</summary>
    public HolderModel Model => model;

    /// <summary>Temperature of the stage [K].</summary>
    public double StageK { get; private set; } = model.StartK;

    /// <summary>Temperature of the sample [K].</summary>
    public double SampleK { get; private set; } = model.StartK;

    /// <summary>Lets time pass with constant powers.</summary>
    public void Step(double heaterW, double sampleW, double stepS)
    {
        var fastest = model.ToSample.ConductanceWPerK(StageK, SampleK) / model.Sample.CapacityJPerK(SampleK);
        var cuts = Math.Clamp((int)Math.Ceiling(5 * stepS * fastest), 1, MostCuts);
        var h = stepS / cuts;
        for (var i = 0; i < cuts; i++)
        {
            var (stage, sample) = RatesKPerS(StageK, SampleK, heaterW, sampleW);
            var (stageMid, sampleMid) = RatesKPerS(StageK + (stage * h / 2), SampleK + (sample * h / 2), heaterW, sampleW);
            StageK += stageMid * h;
            SampleK += sampleMid * h;
        }
    }

    /// <summary>Heat that leaves the stage for the cold end and the surroundings [W].</summary>
    public double LossW(double stageK)
    {
        var radiatedW = 0.0;
        if (model.RadiatingAreaM2 > 0)
        {
            var (t2, s2) = (stageK * stageK, model.SurroundingsK * model.SurroundingsK);
            radiatedW = model.RadiatingAreaM2 * StefanBoltzmannWPerM2K4 * ((t2 * t2) - (s2 * s2));
        }
        return model.ToColdEnd.FlowW(stageK, model.ColdEndK) + radiatedW;
    }

    private (double Stage, double Sample) RatesKPerS(double stageK, double sampleK, double heaterW, double sampleW)
    {
        var toSampleW = model.ToSample.FlowW(stageK, sampleK);
        return ((heaterW - LossW(stageK) - toSampleW) / model.Stage.CapacityJPerK(stageK),
                (sampleW + toSampleW) / model.Sample.CapacityJPerK(sampleK));
    }
}
