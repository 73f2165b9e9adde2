using Acquire.Physics;

namespace Acquire.Simulator.Samples;

/// <summary>Carriers from charge neutrality with shallow donors and acceptors and a deep level.</summary>
/// <remarks>
/// Neutrality is solved on a grid of temperatures, each node when it is first needed, and ln n and ln p are interpolated
/// between four nodes (Lagrange, cubic): relative error below 1e-5 from 60 K upwards, far below the noise of any meter.
/// </remarks>
internal sealed class NeutralBulk : IBulk
{
    private const double GridK = 1;
    private readonly SampleModel _model;
    private readonly Material _material;
    private readonly Dictionary<int, (double LnElectrons, double LnHoles)> _nodes = [];

    /// <summary>The bulk of a sample whose material is one of the shipped sets.</summary>
    public NeutralBulk(SampleModel model, Material material)
    {
        _model = model;
        _material = material;
    }

    /// <inheritdoc/>
    public BulkCarriers At(double temperatureK)
    {
        var place = temperatureK / GridK;
        var first = Math.Max(1, (int)Math.Floor(place) - 1);
        var x = place - first;
        var (electrons, holes) = (0.0, 0.0);
        for (var i = 0; i < 4; i++)
        {
            var weight = 1.0;
            for (var j = 0; j < 4; j++)
                if (j != i) weight *= (x - j) / (i - j);
            var node = Node(first + i);
            electrons += weight * node.LnElectrons;
            holes += weight * node.LnHoles;
        }
        return new BulkCarriers(Math.Exp(electrons), Math.Exp(holes),
            _material.ElectronMobilityM2PerVs.At(temperatureK), _material.HoleMobilityM2PerVs.At(temperatureK));
    }

    /// <summary>The carriers without interpolation.</summary>
    public CarrierBalance Exact(double temperatureK)
    {
        List<Level> donors = [new(_model.DonorsPerM3, _model.DonorEV, 2)];
        List<Level> acceptors = [new(_model.AcceptorsPerM3, _model.AcceptorEV, 4)];
        if (_model.Deep is { } deep)
        {
            if (deep.IsDonor) donors.Add(new Level(deep.DensityPerM3, deep.BelowConductionEV, 2));
            else acceptors.Add(new Level(deep.DensityPerM3, _material.Gap.GapEV(temperatureK) - deep.BelowConductionEV, 4));
        }
        return Neutrality.Solve(_material, temperatureK, donors, acceptors);
    }

    private (double LnElectrons, double LnHoles) Node(int index)
    {
        if (_nodes.TryGetValue(index, out var node)) return node;
        var balance = Exact(index * GridK);
        // The minority of a cold, doped sample may underflow; any tiny number will do, since it carries no current.
        node = (Math.Log(Math.Max(balance.ElectronsPerM3, double.Epsilon)), Math.Log(Math.Max(balance.HolesPerM3, double.Epsilon)));
        _nodes.Add(index, node);
        return node;
    }
}
