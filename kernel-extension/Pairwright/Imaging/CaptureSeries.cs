using System.Collections;
using System.Collections.Immutable;

namespace Pairwright.Imaging;

/// <summary>The pairs that were read from a folder, in order, with what was left over.</summary>
public sealed class CaptureSeries : IReadOnlyList<StereoPair>
{
    private readonly ImmutableArray<StereoPair> pairs;

    internal CaptureSeries(CaptureFolder folder, ImmutableArray<StereoPair> pairs) => (Folder, this.pairs) = (folder, pairs);

    /// <summary>The folder.</summary>
    public CaptureFolder Folder { get; }

    /// <summary>The files without a partner, then what may be wrong with each pair, one sentence each.</summary>
    public IReadOnlyList<string> Warnings =>
    [
        .. Folder.Unmatched.Select(file => $"'{file}' in '{Folder.FolderPath}' has no partner and was left out; add the other view or remove it."),
        .. pairs.SelectMany(pair => pair.Warnings.Select(warning => $"Pair '{pair.Name}': {warning}")),
    ];

    /// <summary>The number of pairs.</summary>
    public int Count => pairs.Length;

    /// <summary>The pair at a place, from 0.</summary>
    public StereoPair this[int index] => pairs[index];

    /// <summary>The pair of a name.</summary>
    /// <exception cref="UserErrorException">No pair has it.</exception>
    public StereoPair this[string name] =>
        pairs.FirstOrDefault(pair => pair.Name == name)
        ?? throw new UserErrorException($"'{Folder.FolderPath}' has no pair '{name}'; its pairs are {string.Join(", ", pairs.Select(pair => pair.Name))}.");

    /// <summary>Goes through the pairs in order.</summary>
    public IEnumerator<StereoPair> GetEnumerator() => pairs.AsEnumerable().GetEnumerator();

    IEnumerator IEnumerable.GetEnumerator() => GetEnumerator();

    /// <summary>The folder and the number of pairs in a line.</summary>
    public override string ToString() => $"{Count} pairs from '{Folder.FolderPath}'";
}
