using Acquire.Simulator.Tests.Twins;
using Acquire.Simulator.Thermal;
using CsCheck;

namespace Acquire.Simulator.Tests.Thermal;

public sealed class HolderStateTests
{
    private static readonly HolderModel Plain = new()
    {
        Stage = new HeatStore(10, 0),
        Sample = new HeatStore(0.5, 0),
        ToColdEnd = new HeatLink(0.2, 0),
        ToSample = new HeatLink(0.05, 0),
        ColdEndK = 80,
        SurroundingsK = 295,
        RadiatingAreaM2 = 0,
        StartK = 295,
    };

    [Fact]
    public void Steady_ConductiveHolder_IsColdEndPlusPowerOverConductance() =>
        Gen.Select(Gen.Double[0, 40], Gen.Double[0, 0.01]).Sample((heaterW, sampleW) =>
        {
            var holder = new HolderState(Plain);
            for (var i = 0; i < 20_000; i++) holder.Step(heaterW, sampleW, 0.1);
            var stageK = 80 + ((heaterW + sampleW) / 0.2);
            Assert.InRange(holder.StageK - stageK, -1e-6, 1e-6);
            Assert.InRange(holder.SampleK - (stageK + (sampleW / 0.05)), -1e-6, 1e-6);
        }, iter: 10);

    [Fact]
    public void Steady_RadiatingFurnace_BalancesTheFourthPowers()
    {
        // Closed form without conduction: T^4 = T_s^4 + P / (eps A sigma).
        var furnace = Plain with { ToColdEnd = new HeatLink(0, 0), RadiatingAreaM2 = 0.009, SurroundingsK = 293 };
        var holder = new HolderState(furnace);
        for (var i = 0; i < 200_000; i++) holder.Step(500, 0, 0.1);
        var expectedK = Math.Pow(Math.Pow(293, 4) + (500 / (0.009 * 5.670374419e-8)), 0.25);
        Assert.InRange(holder.StageK - expectedK, -1e-6, 1e-6);
    }

    [Fact]
    public void Cooling_ConductiveHolder_IsExponential()
    {
        var light = Plain with { Sample = new HeatStore(1e-6, 0), ToSample = new HeatLink(1e-7, 0) };
        var holder = new HolderState(light);
        for (var i = 0; i < 500; i++) holder.Step(0, 0, 0.1);
        // tau = C / K = 50 s; after 50 s 1/e of the difference is left. The midpoint rule is of second order.
        Assert.InRange(holder.StageK - (80 + (215 * Math.Exp(-1))), -1e-3, 1e-3);
    }

    [Fact]
    public void Energy_InsulatedHolder_KeepsWhatTheHeaterGave() =>
        Gen.Select(Gen.Double[0, 5], Gen.Double[50, 300], Gen.Double[0, 400]).Sample((heaterW, startK, einsteinK) =>
        {
            var insulated = Plain with
            {
                Stage = new HeatStore(10, einsteinK),
                Sample = new HeatStore(0.5, einsteinK),
                ToColdEnd = new HeatLink(0, 0),
                StartK = startK,
            };
            var holder = new HolderState(insulated);
            double Stored() => insulated.Stage.HeatJ(holder.StageK) + insulated.Sample.HeatJ(holder.SampleK);
            var before = Stored();
            for (var i = 0; i < 1000; i++) holder.Step(heaterW, 0, 0.1);
            Assert.InRange(Stored() - before - (heaterW * 100), -1e-3, 1e-3);
        }, iter: 50);

    [Theory]
    [InlineData("germanium-quick")]
    [InlineData("germanium-cryostat")]
    [InlineData("silicon-furnace")]
    public void Energy_ShippedHolders_BalanceHeaterLossAndStore(string name)
    {
        var model = ShippedBenches.Twin(name).Holder;
        var holder = new HolderState(model);
        double Stored() => model.Stage.HeatJ(holder.StageK) + model.Sample.HeatJ(holder.SampleK);
        var (before, gaveJ, lostJ) = (Stored(), 0.0, 0.0);
        for (var i = 0; i < 5000; i++)
        {
            var heaterW = i < 2500 ? 20 : 0;
            var lossBeforeW = holder.LossW(holder.StageK);
            holder.Step(heaterW, 0, 0.1);
            gaveJ += heaterW * 0.1;
            // The trapezoid over each step is a quadrature of its own, independent of the model's rule.
            lostJ += (lossBeforeW + holder.LossW(holder.StageK)) / 2 * 0.1;
        }
        Assert.InRange((Stored() - before - gaveJ + lostJ) / gaveJ, -1e-4, 1e-4);
    }

    [Fact]
    public void Lag_UnderARamp_IsRampTimesTimeConstantOfTheSample()
    {
        // Constant dT/dt of the stage: the sample trails by ramp times C/L = 10 s once the transient is over.
        var holder = new HolderState(Plain with { ToColdEnd = new HeatLink(0, 0) });
        for (var i = 0; i < 2000; i++) holder.Step(1, 0, 0.1);
        var rampKPerS = 1 / 10.5;
        Assert.InRange(holder.StageK - holder.SampleK, (rampKPerS * 10) - 1e-4, (rampKPerS * 10) + 1e-4);
    }

    [Fact]
    public void HeatStore_Capacity_IsTheSlopeOfItsHeat() =>
        Gen.Select(Gen.Double[0, 500], Gen.Double[20, 1200]).Sample((einsteinK, temperatureK) =>
        {
            var store = new HeatStore(3, einsteinK);
            var h = temperatureK * 1e-5;
            var slope = (store.HeatJ(temperatureK + h) - store.HeatJ(temperatureK - h)) / (2 * h);
            Assert.InRange(store.CapacityJPerK(temperatureK) - slope, -1e-6, 1e-6);
        });
}
