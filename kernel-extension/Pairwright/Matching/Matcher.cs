using System.Diagnostics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Carries out a recipe.</summary>
internal static class Matcher
{
    public static DisparityMap Match(RectifiedPair pair, Recipe recipe, MatcherSettings settings, CancellationToken stop, IProgress<double>? progress)
    {
        Require(pair, recipe);
        var watch = Stopwatch.StartNew();
        var map = new WorkingMap(pair, recipe.Range, settings.Threads, recipe.Filters.Any(filter => filter.NeedsEvidence));
        stop.ThrowIfCancellationRequested();
        if (settings.PlainOnly || !FusedMatcher.TryRun(pair, recipe, settings, map, stop, progress))
        {
            new PlainMatcher(pair, recipe, settings).Run(map, stop, progress);
        }

        foreach (var filter in recipe.Filters)
        {
            stop.ThrowIfCancellationRequested();
            StageGuard.Run(filter, stop, () => filter.Apply(map, stop));
        }

        progress?.Report(1);
        return new(
            pair,
            recipe,
            new(pair.Size, map.DisparityArray),
            new(pair.Size, map.ConfidenceArray),
            new(pair.Size, map.LabelArray),
            watch.Elapsed,
            pair.Provenance.Then("match", recipe.ToString()),
            SigmaOf(map),
            map.RowOffset);
    }

    // A later filter may have dropped or filled what an earlier one measured.
    private static ScalarMap? SigmaOf(WorkingMap map) => map.SigmaArray is { } sigma
        ? new(map.Size, [.. sigma.Zip(map.LabelArray, (value, label) => label == DisparityLabel.Measured ? value : float.NaN)])
        : null;

    private static void Require(RectifiedPair pair, Recipe recipe)
    {
        var width = pair.Size.Width;
        if (recipe.Range.Count > width || recipe.Range.Least >= width || recipe.Range.Most <= -width)
        {
            throw new UserErrorException(
                $"The search range {recipe.Range} does not fit pictures {width} px wide: it is wider than they are or compares nothing; give the range that the rig and the working distance call for.");
        }
    }
}
