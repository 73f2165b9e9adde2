using System.Runtime.CompilerServices;
using Acquire.Bench.Readings;
using Acquire.Drivers.Files;
using Acquire.Wire;

namespace Acquire.Drivers.Instruments;

/// <summary>The numbers of one poll, in the order of its template; no allocation on the path that polls all night.</summary>
internal struct PolledNumbers
{
    /// <summary>The most fields that a reply may have.</summary>
    public const int MostFields = 8;

    private Slots _slots;

    public readonly Measured this[int field] => _slots[field];

    public static PolledNumbers Read(Poll poll, in Reply reply)
    {
        var numbers = default(PolledNumbers);
        Span<Range> ranges = stackalloc Range[MostFields];
        if (!reply.IsGood) numbers.Fill(Measured.Bad(InstrumentTalk.QualityOf(reply.State), reply.Text.Length > 0 ? reply.Text : reply.Problem));
        else if (!poll.Reply.TryMatch(reply.Text, ranges)) numbers.Fill(Measured.Bad(Quality.Unreadable, reply.Text));
        else for (var i = 0; i < poll.Fields.Count; i++) numbers._slots[i] = poll.Fields[i].Read(reply.Text.AsSpan()[ranges[i]], reply.Text);
        return numbers;
    }

    private void Fill(Measured value)
    {
        for (var i = 0; i < MostFields; i++) _slots[i] = value;
    }

    [InlineArray(MostFields)]
    private struct Slots
    {
        private Measured _first;
    }
}
