namespace Pairwright.Matching;

/// <summary>How a match is carried out; nothing here changes the result.</summary>
internal sealed record MatcherSettings
{
    /// <summary>How many threads work; one per processor unless said otherwise.</summary>
    public int Threads { get; init; } = Environment.ProcessorCount;

    /// <summary>The most memory that the match may take, its result included, in bytes; no limit when left out.</summary>
    public long? MemoryBytes { get; init; }

    /// <summary>The width of vectors: 512, 256 or 8 bits; 0 for the one that suits the processor.</summary>
    public int VectorBits { get; init; }

    /// <summary>How many rows a strip has; as many as memory allows when left out.</summary>
    public int? StripRows { get; init; }

    /// <summary>Whether recipes that are fused run on the general path all the same, for comparisons.</summary>
    public bool PlainOnly { get; init; }
}
