using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Samples;

/// <summary>Excess carriers under light, and what stays in traps after it.</summary>
/// <remarks>
/// Model      g = (1 - R) (E lambda / h c) (1 - exp(-d/L)) / d                 pairs per volume and time
///            dn = n_ref (g tau / n_ref)^gamma                                  free pairs, at once (tau is far below a step)
///            df/dt = (dn / c) (1 - f) - f nu exp(-Et / kT)                     filling of the traps, one per second at dn = c
///            A trapped minority carrier leaves one majority carrier free: this is the persistent part.
/// Inputs     irradiance E [W/m2], wavelength lambda [m], thickness d [m], temperature [K], step [s]
/// Numerics   the filling is exact for constant light over a step of any length
/// Source     A. Rose, Concepts in Photoconductivity and Allied Problems (1963), chapters 2 and 3;
///            h, c, k, e exact (SI 2019)
/// </remarks>
internal sealed class ExcessCarriers(PhotoModel model, double thicknessM)
{
    private const double PlanckTimesLightJM = 6.62607015e-34 * 299792458;
    private const double BoltzmannEVPerK = 1.380649e-23 / 1.602176634e-19;

    // Below one part in 1e9 the filling no longer shows and the exponentials can be saved.
    private const double Empty = 1e-9;

    /// <summary>Free electron-hole pairs beyond the dark [m-3].</summary>
    public double PairsPerM3 { get; private set; }

    /// <summary>Part of the traps that is filled beyond the dark.</summary>
    public double Filling { get; private set; }

    /// <summary>Majority carriers held free by filled traps [m-3].</summary>
    public double PersistentPerM3 => model.TrapsPerM3 * Filling;

    /// <summary>Pairs made per volume and time [m-3 s-1].</summary>
    public double GenerationPerM3S(double irradianceWPerM2, double wavelengthM) =>
        (1 - model.Reflectance) * irradianceWPerM2 * wavelengthM / PlanckTimesLightJM
        * Relaxation.Gone(thicknessM / model.AbsorptionLengthM) / thicknessM;

    /// <summary>Lets time pass under constant light.</summary>
    public void Step(double irradianceWPerM2, double wavelengthM, double temperatureK, double stepS)
    {
        PairsPerM3 = irradianceWPerM2 > 0 ? Pairs(GenerationPerM3S(irradianceWPerM2, wavelengthM), temperatureK) : 0;
        if (PairsPerM3 == 0 && Filling < Empty)
        {
            Filling = 0;
            return;
        }
        var captureHz = PairsPerM3 / model.CapturePerM3;
        var rateHz = captureHz + EmissionHz(temperatureK);
        Filling += ((captureHz / rateHz) - Filling) * Relaxation.Gone(rateHz * stepS);
    }

    /// <summary>How often a filled trap lets go [1/s].</summary>
    public double EmissionHz(double temperatureK) => model.AttemptHz * Math.Exp(-model.TrapEV / (BoltzmannEVPerK * temperatureK));

    private double Pairs(double generationPerM3S, double temperatureK)
    {
        var lifetimeS = model.LifetimeAt300S * Math.Pow(temperatureK / 300, model.LifetimeExponent);
        return model.ReferencePerM3 * Math.Pow(generationPerM3S * lifetimeS / model.ReferencePerM3, model.IntensityExponent);
    }
}
