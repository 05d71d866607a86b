using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Two pictures of one size in which matching points share a row.</summary>
/// <remarks>Pixels that no camera saw are marked in each picture's <see cref="Picture.Usable"/>.</remarks>
public sealed partial class RectifiedPair
{
    /// <summary>Makes a rectified pair.</summary>
    /// <param name="left">The reference picture.</param>
    /// <param name="right">The other picture.</param>
    /// <param name="geometry">Focal length, baseline and offset; nothing where they are not known, so that there is disparity but no depth.</param>
    /// <param name="rectification">How the pair was made from raw pictures; nothing where it came rectified.</param>
    /// <exception cref="UserErrorException">The sizes differ.</exception>
    public RectifiedPair(Picture left, Picture right, RectifiedGeometry? geometry = null, Rectification? rectification = null)
    {
        ArgumentNullException.ThrowIfNull(left);
        ArgumentNullException.ThrowIfNull(right);
        geometry ??= rectification?.Geometry;
        if (left.Size == right.Size && geometry is not null && geometry.Size != left.Size)
        {
            throw new UserErrorException($"The rectified pictures are {left.Size} px, but their geometry is for {geometry.Size} px; give the geometry of these pictures.");
        }

        if (left.Size != right.Size)
        {
            throw new UserErrorException(
                $"Rectified pictures must have one size, but the left is {left.Size} px and the right {right.Size} px; rectify them together or crop them alike.");
        }

        if (left.SignificantBits != right.SignificantBits)
        {
            throw new UserErrorException(
                $"The left picture has {left.SignificantBits} significant bits and the right {right.SignificantBits}; take both with the same depth, or state it when reading.");
        }

        (Left, Right, Geometry, Rectification) = (left, right, geometry, rectification);
    }

    /// <summary>The reference picture.</summary>
    public Picture Left { get; }

    /// <summary>The other picture.</summary>
    public Picture Right { get; }

    /// <summary>The size of both pictures.</summary>
    public PictureSize Size => Left.Size;

    /// <summary>Focal length, baseline and offset, where they are known.</summary>
    public RectifiedGeometry? Geometry { get; }

    /// <summary>How the pair was made from raw pictures; nothing where it came rectified.</summary>
    public Rectification? Rectification { get; }

    /// <summary>Where the pair came from.</summary>
    public Provenance Provenance => Left.Provenance.With(Right.Provenance);

    /// <summary>Size and geometry in a line.</summary>
    public override string ToString() => string.Create(
        System.Globalization.CultureInfo.InvariantCulture,
        $"Rectified pair: {Left}; {(Geometry is { } g ? $"f = {g.FocalPixels:0.###} px, b = {g.BaselineMm:0.###} mm, offset {g.OffsetPixels:0.###} px" : "geometry not known")}");
}
