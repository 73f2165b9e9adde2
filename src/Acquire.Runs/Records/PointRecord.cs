using Acquire.Bench.Readings;

namespace Acquire.Runs.Records;

/// <summary>What was illuminating the sample during a point.</summary>
public enum LightState
{
    /// <summary>Dark, measured before any light at this temperature.</summary>
    Dark = 0,

    /// <summary>Under the light of the protocol.</summary>
    Lit = 1,

    /// <summary>Dark again after light at this temperature.</summary>
    DarkAfter = 2,
}

/// <summary>One measured point: the reduced result of one measuring step, with the gates it met. One row of the table <c>point</c>.</summary>
public sealed record PointRecord
{
    /// <summary>Number in the run, from 1, in order of measurement.</summary>
    public required int Index { get; init; }

    /// <summary>Index of the plan's step that made it.</summary>
    public required int Step { get; init; }

    /// <summary>Number of the leg, from 1.</summary>
    public required int Leg { get; init; }

    /// <summary>Direction of the leg: +1 warming, -1 cooling, 0 neither.</summary>
    public required int Direction { get; init; }

    /// <summary>Light on the sample.</summary>
    public required LightState Light { get; init; }

    /// <summary>First reading of the point, microseconds since the start of the run.</summary>
    public required long StartUs { get; init; }

    /// <summary>Last reading of the point, microseconds since the start of the run.</summary>
    public required long EndUs { get; init; }

    /// <summary>Temperature asked for [K].</summary>
    public required double SetPointK { get; init; }

    /// <summary>Mean stage temperature over the current readings [K].</summary>
    public required double StageK { get; init; }

    /// <summary>Mean sample temperature over the current readings [K].</summary>
    public required double SampleK { get; init; }

    /// <summary>Random standard uncertainty of the sample temperature over the point [K]; the thermometer's common part is in the bench file.</summary>
    public required double SampleUncertaintyK { get; init; }

    /// <summary>Bias magnitude, measured [V].</summary>
    public required double BiasV { get; init; }

    /// <summary>Mean current at positive bias [A].</summary>
    public required double CurrentPlusA { get; init; }

    /// <summary>Mean current at negative bias [A].</summary>
    public required double CurrentMinusA { get; init; }

    /// <summary>Half-difference of the two polarities divided by the bias [S].</summary>
    public required double ConductanceS { get; init; }

    /// <summary>Standard uncertainty of the conductance from the scatter of the readings [S].</summary>
    public required double ConductanceUncertaintyS { get; init; }

    /// <summary>Half-sum of the two polarities [A]: thermal EMF and background current.</summary>
    public required double HalfSumA { get; init; }

    /// <summary>Locked current range, full scale [A].</summary>
    public required double RangeA { get; init; }

    /// <summary>Good readings used in both polarities together.</summary>
    public required int Readings { get; init; }

    /// <summary>Soak at the temperature before the first reading [s].</summary>
    public required double SoakS { get; init; }

    /// <summary>Time the signal was given to settle after the last change of bias, range or light [s].</summary>
    public required double SignalSettleS { get; init; }

    /// <summary>Wavelength of the light [m]; NaN in the dark.</summary>
    public required double WavelengthM { get; init; }

    /// <summary>Irradiance asked for [W/m2]; NaN in the dark.</summary>
    public required double IrradianceWPerM2 { get; init; }

    /// <summary>Mean monitor current [A]; NaN without a monitor.</summary>
    public required double MonitorA { get; init; }

    /// <summary>Time since the light last changed [s]; NaN when it never was on in this run.</summary>
    public required double SinceLightS { get; init; }

    /// <summary>What speaks against the point.</summary>
    public required Quality Quality { get; init; }

    /// <summary>Why, in words; null when nothing does.</summary>
    public required string? Reason { get; init; }

    /// <summary>The gates as asked and as achieved, JSON (see docs/run-file.md).</summary>
    public required string GatesJson { get; init; }
}
