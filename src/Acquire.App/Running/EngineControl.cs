using Acquire.Control;
using Acquire.Runs.Records;
using Acquire.Sweep.Engine;

namespace Acquire.App.Running;

/// <summary>The engine as the control socket sees it.</summary>
internal sealed class EngineControl(SweepEngine engine, RunHeader header, string runPath) : IControlTarget
{
    /// <inheritdoc/>
    public EngineStatusMessage Status()
    {
        var status = engine.Status();
        return new(header.RunId, Path.GetFullPath(runPath), status.State, status.Phase, status.Leg, status.Legs, status.Point, status.Points,
            status.StageK, status.SampleK, status.TargetK, status.TimeLeftS, status.Committed, status.Waiting);
    }

    /// <inheritdoc/>
    public ControlOutcome MakeSafe(string operatorName, string? reason) => new(true, engine.MakeSafe(operatorName, reason));

    /// <inheritdoc/>
    public ControlOutcome Stop(string operatorName, string? reason) => new(true, engine.Stop(operatorName, reason));

    /// <inheritdoc/>
    public ControlOutcome Hold(string operatorName, string? reason) => new(true, engine.Hold(operatorName, reason));

    /// <inheritdoc/>
    public ControlOutcome Continue(string operatorName, string? reason) => new(true, engine.Continue(operatorName, reason));
}
