using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>Tests over real processes run one after the other: two cores carry one bench at a time.</summary>
[CollectionDefinition(Name, DisableParallelization = true)]
public sealed class ProcessCollection
{
    public const string Name = "real processes";
}
