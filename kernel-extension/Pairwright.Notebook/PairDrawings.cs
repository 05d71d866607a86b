using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Notebook;

/// <summary>Drawings over the pictures of a pair, for a notebook cell.</summary>
public static class PairDrawings
{
    /// <summary>Both pictures with the epipolar line of each given point in the other picture, as the lens forms it.</summary>
    /// <param name="pair">The pair.</param>
    /// <param name="left">Points of the left picture; a few over the whole picture when left out.</param>
    /// <param name="right">The match of each left point in the right picture, where they are known, to be seen against the lines.</param>
    /// <param name="fundamentalMatrix">The geometry of a pair without a rig: its lines are drawn straight, in raw pixels.</param>
    /// <exception cref="UserErrorException">The pair has no rig and no matrix is given, or there are not as many right points as left ones.</exception>
    public static EpipolarDrawing WithEpipolarLines(
        this StereoPair pair, IEnumerable<RawPixel>? left = null, IEnumerable<RawPixel>? right = null, FundamentalMatrix? fundamentalMatrix = null)
    {
        ArgumentNullException.ThrowIfNull(pair);
        return new(pair, [.. left ?? Spread(pair.Left.Size)], [.. right ?? []], fundamentalMatrix);
    }

    // Three by three points, the rows a little apart so that lines along the rows do not fall on one another.
    private static IEnumerable<RawPixel> Spread(PictureSize size) =>
        from row in Enumerable.Range(0, 3)
        from column in Enumerable.Range(0, 3)
        select new RawPixel((1 + column) * size.Width / 4.0, (1 + row + (column - 1) * 0.25) * size.Height / 4.0);
}
