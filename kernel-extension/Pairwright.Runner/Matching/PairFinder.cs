using Pairwright.Runner.Commands;

namespace Pairwright.Runner.Matching;

/// <summary>Finds the pairs that a command line of <c>match</c> means.</summary>
internal static class PairFinder
{
    /// <returns>The pairs, and the files without a partner.</returns>
    /// <exception cref="BadUsageException">Names and patterns are mixed, two files to write are one, or no pair is found.</exception>
    public static (IReadOnlyList<PairFiles> Pairs, IReadOnlyList<string> Alone) Find(MatchSettings settings)
    {
        var left = FilePattern.Of("LEFT", settings.Left);
        var right = FilePattern.Of("RIGHT", settings.Right);
        var map = FilePattern.Of("--out", settings.Out);
        var sigma = Optional("--sigma", settings.Sigma);
        var depth = Optional("--depth", settings.Depth);
        var cloud = Optional("--cloud", settings.Cloud);
        var truth = Optional("--truth", settings.Truth);
        var all = new[] { left, right, map, sigma, depth, cloud, truth }.OfType<FilePattern>().ToList();
        if (all.Find(pattern => pattern.HasStar != left.HasStar) is { } odd)
        {
            throw new BadUsageException(left.HasStar
                ? $"LEFT has a *, but {odd.Text} has none; put one where the pairs' names differ."
                : $"{odd.Text} has a *, but LEFT has none; put one where the pairs' names differ, in quotation marks, so that the shell leaves it alone.");
        }

        if (new[] { map, sigma, depth, cloud }.OfType<FilePattern>().GroupBy(pattern => Path.GetFullPath(pattern.Text)).FirstOrDefault(group => group.Count() > 1) is { } twice)
        {
            throw new BadUsageException($"{twice.First().Text} is named for two things to write; give each a name of its own.");
        }

        if (!left.HasStar)
        {
            return ([Files("")], []);
        }

        var (lefts, rights) = (left.PartsOfFiles(), right.PartsOfFiles());
        var both = lefts.Intersect(rights).ToList();
        return both.Count > 0
            ? ([.. both.Select(Files)], [.. lefts.Except(both).Select(left.With), .. rights.Except(both).Select(right.With)])
            : throw new BadUsageException($"No pair fits {left.Text} and {right.Text}; check the folder, and that the * stands for the same in both names.");

        PairFiles Files(string part) => new(
            left.HasStar ? part : $"{Path.GetFileName(left.Text)} and {Path.GetFileName(right.Text)}",
            left.With(part),
            right.With(part),
            truth?.With(part),
            map.With(part),
            settings.Fill ? Path.ChangeExtension(map.With(part), ".filled.png") : null,
            sigma?.With(part),
            depth?.With(part),
            cloud?.With(part));
    }

    private static FilePattern? Optional(string option, string? text) => text is null ? null : FilePattern.Of(option, text);
}
