namespace Pairwright.Matching;

/// <summary>How a match is carried out; nothing here changes the result.</summary>
internal sealed record MatcherSettings
{
    /// <summary>How many threads work; one per processor unless said otherwise.</summary>
    public int Threads { get; init; } = Environment.ProcessorCount;
}
