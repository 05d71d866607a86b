namespace Pairwright.Runner.Matching;

/// <summary>One pair to match: what is read and what is written.</summary>
/// <param name="Name">How lines in the terminal name it.</param>
/// <param name="Left">The left picture.</param>
/// <param name="Right">The right picture.</param>
/// <param name="Truth">The true disparities, where they are known.</param>
/// <param name="Map">The disparity map to write.</param>
/// <param name="Filled">The picture to write of what was filled and not measured; nothing where gaps stay.</param>
/// <param name="Sigma">The map of standard uncertainties to write.</param>
/// <param name="Depth">The depth map to write.</param>
/// <param name="Cloud">The cloud to write.</param>
internal sealed record PairFiles(
    string Name, string Left, string Right, string? Truth, string Map, string? Filled, string? Sigma, string? Depth, string? Cloud)
{
    /// <summary>What came of the pair and what it was made from, beside the map.</summary>
    public string Record => Path.ChangeExtension(Map, ".json");

    public IEnumerable<string> Written => new[] { Map, Filled, Sigma, Depth, Cloud }.OfType<string>();
}
