using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <content>Reading pairs that came rectified, and what may be wrong with a pair.</content>
public sealed partial class RectifiedPair
{
    private IReadOnlyList<string>? warnings;

    /// <summary>As <see cref="StereoPair.Warnings"/>, of the rectified pictures.</summary>
    public IReadOnlyList<string> Warnings => warnings ??= PairWarnings.Of(Left, Right, StereoPair.DefaultSkewTolerance);

    /// <summary>Reads a pair whose rows match already.</summary>
    /// <param name="leftPath">The left picture's file.</param>
    /// <param name="rightPath">The right picture's file.</param>
    /// <param name="geometry">Focal length, baseline and offset; nothing where they are not known, so that there is disparity but no depth.</param>
    /// <param name="reading">What the left file does not say about itself, and the right one where <paramref name="rightReading"/> is left out.</param>
    /// <param name="rightReading">What the right file does not say about itself.</param>
    /// <exception cref="UserErrorException">A file cannot be read, or the sizes differ.</exception>
    public static RectifiedPair Read(
        string leftPath, string rightPath, RectifiedGeometry? geometry = null, PictureReading? reading = null, PictureReading? rightReading = null) =>
        new(Picture.Read(leftPath, reading), Picture.Read(rightPath, rightReading ?? reading), geometry);
}
