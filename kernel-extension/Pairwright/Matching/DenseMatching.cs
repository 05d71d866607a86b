using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Dense matching of a rectified pair.</summary>
public static class DenseMatching
{
    /// <summary>Finds the disparity of each pixel of the left picture.</summary>
    /// <param name="pair">The rectified pair, at least as wide and high as the cost's window.</param>
    /// <param name="recipe">How to match.</param>
    /// <param name="stop">Asks to stop.</param>
    /// <param name="progress">Told the share done, 0 to 1, now and then.</param>
    /// <param name="memoryMb">
    /// The most memory that the match may take beside the pictures, in units of 10⁶ bytes; it then works in strips, with the same result. No limit
    /// when left out.
    /// </param>
    /// <exception cref="UserErrorException">The recipe does not fit the pictures; the message says why.</exception>
    /// <exception cref="OperationCanceledException">It was asked to stop.</exception>
    public static DisparityMap Match(
        this RectifiedPair pair, Recipe recipe, CancellationToken stop = default, IProgress<double>? progress = null, int? memoryMb = null)
    {
        ArgumentNullException.ThrowIfNull(pair);
        ArgumentNullException.ThrowIfNull(recipe);
        if (memoryMb <= 0)
        {
            throw new UserErrorException($"A memory limit of {memoryMb} MB allows nothing; give a number above zero, or none.");
        }

        return Matcher.Match(pair, recipe, new MatcherSettings { MemoryBytes = memoryMb * 1_000_000L }, stop, progress);
    }
}
