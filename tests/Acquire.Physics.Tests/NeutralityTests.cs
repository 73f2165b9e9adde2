using CsCheck;
using Xunit;

namespace Acquire.Physics.Tests;

public sealed class NeutralityTests
{
    /// <summary>Full Fermi-Dirac solution for Si at 300 K with Nc 2.8e19, Nv 1.04e19 cm-3, gap 1.12 eV (own reference computation at 30 digits).</summary>
    [Theory]
    [InlineData(0, 0, 6.6758987e9, 6.6758987e9, 0.5471981065)]
    [InlineData(1e15, 0, 9.995931e14, 44585.203, 0.8552663666)]
    [InlineData(1e17, 0, 9.6224797e16, 462.59914, 0.9733659645)]
    [InlineData(0, 1e16, 4550.9516, 9.7897755e15, 0.1801338846)]
    [InlineData(2e16, 1e16, 9.9195246e15, 4492.3566, 0.9145973425)]
    public void Solve_DopedSilicon_EqualsTheReference(double donorsPerCm3, double acceptorsPerCm3, double electrons, double holes, double fermiEV)
    {
        var silicon = Material.Si with { Gap = new(1.12, 0, 1), ConductionStatesPerM3 = new(2.8e25, 1.5), ValenceStatesPerM3 = new(1.04e25, 1.5) };
        var balance = Neutrality.Solve(silicon, 300, [new(donorsPerCm3 * 1e6, 0.045, 2)], [new(acceptorsPerCm3 * 1e6, 0.045, 4)]);
        Assert.Equal(electrons, balance.ElectronsPerM3 / 1e6, electrons * 1e-6);
        Assert.Equal(holes, balance.HolesPerM3 / 1e6, holes * 1e-6);
        Assert.Equal(fermiEV, balance.FermiAboveValenceEV, 1e-8);
    }

    /// <summary>Freeze-out, Nc = 2.8e19 (T/300)^1.5, N_D = 1e16, 45 meV, g = 2, compensated by 1e14 (closed-form root, recomputed independently).</summary>
    [Theory]
    [InlineData(40, 7.9687869e13)]
    [InlineData(77, 3.5665233e15)]
    [InlineData(150, 9.3230952e15)]
    [InlineData(300, 9.8600078e15)]
    public void Solve_FreezeOut_EqualsTheClosedForm(double temperatureK, double electronsPerCm3)
    {
        var silicon = Material.Si with { ConductionStatesPerM3 = new(2.8e25, 1.5) };
        var balance = Neutrality.Solve(silicon, temperatureK, [new(1e22, 0.045, 2)], [new(1e20, 0.045, 4)]);
        // The closed form is non-degenerate; at these densities degeneracy moves the answer by less than 2e-4.
        Assert.Equal(electronsPerCm3, balance.ElectronsPerM3 / 1e6, electronsPerCm3 * 3e-4);
    }

    [Theory]
    [InlineData(0.1, 1.05124922)]
    [InlineData(1, 1.618033989)]
    [InlineData(2, 2.414213562)]
    [InlineData(10, 10.09901951)]
    public void FullyIonised_RatioToIntrinsic_EqualsTheQuadraticsRoot(double ratio, double expected) =>
        Assert.Equal(expected, Neutrality.FullyIonised(1, ratio).ElectronsPerM3, 1e-8);

    [Fact]
    public void FullyIonised_Always_ObeysMassActionAndNeutrality() =>
        Gen.Select(Gen.Double[1e8, 1e22], Gen.Double[-1e24, 1e24]).Sample((intrinsic, net) =>
        {
            var (electrons, holes) = Neutrality.FullyIonised(intrinsic, net);
            Assert.Equal(1, electrons * holes / (intrinsic * intrinsic), 1e-12);
            Assert.Equal(net, electrons - holes, Math.Max(electrons, holes) * 1e-12);
        });
}
