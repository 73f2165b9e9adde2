using Acquire.Simulator.Instruments;
using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Samples;

/// <summary>The invented sample on its holder: what a source-meter sees between its terminals.</summary>
/// <remarks>
/// Model      G = 1 / (1 / (sigma F) + Rc) + G_leak exp(-E_leak (1/kT - 1/k 300 K))
///            sigma = e (n mu_n + p mu_p), with the excess carriers of the light added
/// Source     e, k exact (SI 2019)
/// </remarks>
internal sealed class SampleState(SampleModel model, IBulk bulk, HolderState holder) : IConductor
{
    private const double ElementaryChargeC = 1.602176634e-19;
    private const double BoltzmannEVPerK = 1.380649e-23 / 1.602176634e-19;
    private readonly ExcessCarriers _excess = new(model.Photo, model.Bar.ThicknessM);
    private double _lightW;
    private double _biasW;
    private double _conductanceS = double.NaN;

    /// <inheritdoc/>
    public double TemperatureK => holder.SampleK;

    /// <inheritdoc/>
    public double EmfV => model.ContactEmfV + (model.ThermoelectricVPerK * (holder.StageK - holder.SampleK));

    /// <summary>What heats the sample beside the stage [W].</summary>
    public double HeatW => _lightW + _biasW;

    /// <inheritdoc/>
    public double ConductanceS
    {
        get
        {
            // Asked several times for one reading; neutrality is solved once per step.
            if (double.IsNaN(_conductanceS)) _conductanceS = Conductance();
            return _conductanceS;
        }
    }

    /// <inheritdoc/>
    public void Dissipate(double powerW) => _biasW = powerW;

    /// <summary>Lets time pass under constant light.</summary>
    public void Step(double irradianceWPerM2, double wavelengthM, double stepS)
    {
        _excess.Step(irradianceWPerM2, wavelengthM, holder.SampleK, stepS);
        _lightW = irradianceWPerM2 * (1 - model.Photo.Reflectance) * model.Bar.LengthM * model.Bar.WidthM;
        _conductanceS = double.NaN;
    }

    private double Conductance()
    {
        var temperatureK = holder.SampleK;
        var carriers = bulk.At(temperatureK);
        var electrons = carriers.ElectronsPerM3 + _excess.PairsPerM3;
        var holes = carriers.HolesPerM3 + _excess.PairsPerM3;
        // The trapped charge is balanced by carriers of the kind that is already in the majority.
        if (carriers.ElectronsPerM3 >= carriers.HolesPerM3) electrons += _excess.PersistentPerM3;
        else holes += _excess.PersistentPerM3;
        var sigma = ElementaryChargeC * ((electrons * carriers.ElectronMobilityM2PerVS) + (holes * carriers.HoleMobilityM2PerVS));
        var leakageS = model.LeakageAt300S * Math.Exp(-model.LeakageEV / BoltzmannEVPerK * ((1 / temperatureK) - (1 / 300.0)));
        return (1 / ((1 / (sigma * model.Bar.FactorM)) + model.ContactOhm)) + leakageS;
    }
}
