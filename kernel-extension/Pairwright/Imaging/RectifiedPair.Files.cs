using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <content>Reading pairs that came rectified.</content>
public sealed partial class RectifiedPair
{
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
