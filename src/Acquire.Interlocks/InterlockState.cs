using System.Collections.Immutable;

namespace Acquire.Interlocks;

/// <summary>A row that tripped.</summary>
/// <param name="RowId">The row.</param>
/// <param name="AtS">When [s], monotonic.</param>
/// <param name="Text">What the operator is told.</param>
public sealed record Trip(string RowId, double AtS, string Text);

/// <summary>What the interlocks remember between evaluations.</summary>
/// <param name="Unhealthy">For each row, its last three samples as bits, the unhealthy ones set.</param>
/// <param name="Trips">Rows that tripped, the first cause first; they stay until a person resets, and nothing resets within a run in this version.</param>
public sealed record InterlockState(ImmutableArray<int> Unhealthy, ImmutableArray<Trip> Trips)
{
    /// <summary>Nothing seen yet.</summary>
    public static InterlockState Start(InterlockTable table) => new([.. new int[table.Rows.Count]], []);

    /// <summary>True once a row tripped: nothing may be energised.</summary>
    public bool IsTripped => !Trips.IsEmpty;

    /// <summary>The first cause, or null.</summary>
    public Trip? FirstOut => Trips.IsEmpty ? null : Trips[0];
}
