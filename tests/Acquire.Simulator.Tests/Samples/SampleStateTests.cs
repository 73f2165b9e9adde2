using Acquire.Physics;
using Acquire.Simulator.Samples;
using Acquire.Simulator.Tests.Twins;
using Acquire.Simulator.Thermal;
using CsCheck;

namespace Acquire.Simulator.Tests.Samples;

public sealed class SampleStateTests
{
    private const double BoltzmannEVPerK = 1.380649e-23 / 1.602176634e-19;

    [Fact]
    public void Bulk_Interpolated_AgreesWithNeutralityAtEveryTemperature()
    {
        foreach (var (name, fromK, toK) in new[] { ("germanium-quick", 200.0, 360.0), ("germanium-cryostat", 65.0, 440.0), ("silicon-furnace", 290.0, 1140.0) })
        {
            var model = ShippedBenches.Twin(name).Sample;
            var bulk = new NeutralBulk(model, Material.Find(model.Material)!);
            Gen.Double[fromK, toK].Sample(temperatureK =>
            {
                var exact = bulk.Exact(temperatureK);
                var quick = bulk.At(temperatureK);
                Assert.InRange(quick.ElectronsPerM3 / exact.ElectronsPerM3, 1 - 1e-5, 1 + 1e-5);
                Assert.InRange(quick.HolesPerM3 / exact.HolesPerM3, 1 - 1e-3, 1 + 1e-3);
            }, iter: 20, threads: 1);
        }
    }

    [Fact]
    public void QuickBar_Above290K_HasTheSlopeOfIntrinsicGermanium()
    {
        // Slope of ln G against 1/kT between 295 K and 340 K; half the raw 2 Ea of germanium is 0.38 eV
        // (Varshni gap, T^1.5 and mobilities included), known to 2 meV from the gap and the exponents.
        var slopeEV = Math.Log(Dark(295) / Dark(340)) / ((1 / (BoltzmannEVPerK * 340)) - (1 / (BoltzmannEVPerK * 295)));
        Assert.InRange(slopeEV, 0.375, 0.390);
    }

    [Fact]
    public void QuickBar_Above290K_IsIntrinsicWithinTwoPercent()
    {
        var model = ShippedBenches.Twin("germanium-quick").Sample;
        foreach (var temperatureK in new[] { 290.0, 310.0, 340.0 })
        {
            var intrinsicS = Material.Ge.IntrinsicConductivitySPerM(temperatureK) * model.Bar.FactorM;
            Assert.InRange(Dark(temperatureK) / intrinsicS, 0.98, 1.02);
        }
    }

    [Fact]
    public void QuickBar_AtItsColdEnd_IsNoLongerIntrinsic() => Assert.True(Dark(225) / IntrinsicS(225) > 1.5);

    [Fact]
    public void Light_OnTheQuickBar_ShowsAndLeavesATailThatDiesWithTheEmissionTime()
    {
        var model = ShippedBenches.Twin("germanium-quick").Sample;
        const double temperatureK = 230;
        var holder = Holder(temperatureK);
        var sample = State(model, holder);
        var darkS = sample.ConductanceS;
        for (var i = 0; i < 600; i++) sample.Step(49, 940e-9, 0.1);
        var litS = sample.ConductanceS;
        Assert.InRange(litS / darkS, 2, 100);

        sample.Step(0, 940e-9, 0.1);
        var tailS = sample.ConductanceS - darkS;
        Assert.True(tailS / darkS > 0.01, "persistent part");
        // Emission time exp(Et/kT)/nu for 0.59 eV and 1e12 per second at 230 K: 8.5 s.
        var emissionS = Math.Exp(0.59 / (BoltzmannEVPerK * temperatureK)) / 1e12;
        Assert.InRange(emissionS, 8, 9);
        for (var i = 0; i < (int)Math.Round(emissionS * 10); i++) sample.Step(0, 940e-9, 0.1);
        Assert.InRange((sample.ConductanceS - darkS) / tailS, Math.Exp(-1) - 0.01, Math.Exp(-1) + 0.01);
        for (var i = 0; i < 1200; i++) sample.Step(0, 940e-9, 0.1);
        Assert.InRange((sample.ConductanceS / darkS) - 1, -1e-6, 1e-4);
    }

    [Fact]
    public void Light_TenTimesWeaker_GivesThePowerOfTheIntensity()
    {
        var photo = ShippedBenches.Twin("germanium-quick").Sample.Photo with { TrapsPerM3 = 0, IntensityExponent = 0.75 };
        var strong = new ExcessCarriers(photo, 5e-4);
        var weak = new ExcessCarriers(photo, 5e-4);
        strong.Step(10, 940e-9, 300, 0.1);
        weak.Step(1, 940e-9, 300, 0.1);
        Assert.Equal(0.75, Math.Log10(strong.PairsPerM3 / weak.PairsPerM3), 9);
    }

    [Fact]
    public void Generation_ThickSample_IsThePhotonFluxThatEntersOverTheThickness()
    {
        // 4.73e18 photons per joule at 940 nm (lambda / h c).
        var photo = ShippedBenches.Twin("germanium-quick").Sample.Photo with { Reflectance = 0, AbsorptionLengthM = 1e-6 };
        Assert.InRange(new ExcessCarriers(photo, 5e-4).GenerationPerM3S(10, 940e-9) * 5e-4 / 10, 4.73e18, 4.74e18);
    }

    [Fact]
    public void Traps_LightStepOfAnyLength_FillTheSameWay()
    {
        var photo = ShippedBenches.Twin("germanium-quick").Sample.Photo;
        var fine = new ExcessCarriers(photo, 5e-4);
        var coarse = new ExcessCarriers(photo, 5e-4);
        for (var i = 0; i < 100; i++) fine.Step(0.01, 940e-9, 230, 0.1);
        coarse.Step(0.01, 940e-9, 230, 10);
        Assert.InRange(fine.Filling / coarse.Filling, 1 - 1e-9, 1 + 1e-9);
    }

    [Fact]
    public void Contacts_AndLeakage_AddAsSeriesAndParallel()
    {
        var model = ShippedBenches.Twin("germanium-quick").Sample;
        var bare = State(model with { ContactOhm = 0, LeakageAt300S = 0 }, Holder(300)).ConductanceS;
        var both = State(model with { ContactOhm = 100, LeakageAt300S = 1e-5, LeakageEV = 0.3 }, Holder(300)).ConductanceS;
        Assert.Equal((1 / ((1 / bare) + 100)) + 1e-5, both, 12);
    }

    private static double Dark(double temperatureK) => State(ShippedBenches.Twin("germanium-quick").Sample, Holder(temperatureK)).ConductanceS;

    private static double IntrinsicS(double temperatureK) =>
        Material.Ge.IntrinsicConductivitySPerM(temperatureK) * ShippedBenches.Twin("germanium-quick").Sample.Bar.FactorM;

    private static HolderState Holder(double temperatureK) => new(ShippedBenches.Twin("germanium-quick").Holder with { StartK = temperatureK });

    private static SampleState State(SampleModel model, HolderState holder) => new(model, new NeutralBulk(model, Material.Find(model.Material)!), holder);
}
