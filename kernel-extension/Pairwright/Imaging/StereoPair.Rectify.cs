using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <content>Making a rectified pair.</content>
public sealed partial class StereoPair
{
    /// <summary>Resamples both pictures so that matching points share a row, by the rectification of the pair's own rig.</summary>
    /// <remarks>As <see cref="Rectify(Rectification)"/>.</remarks>
    /// <param name="fit">What of the two pictures to keep.</param>
    /// <param name="size">The size of the rectified pictures; chosen to keep the scale when left out.</param>
    /// <exception cref="UserErrorException">The pair has no rig, or the rig cannot be rectified.</exception>
    public RectifiedPair Rectify(RectificationFit fit = RectificationFit.Cropped, PictureSize? size = null) =>
        Rectify(Rectification.Of(
            Rig ?? throw new UserErrorException(
                $"The pair{Quoted} has no rig to rectify it by; read it with its rig, or say with AsRectified that its rows match already."),
            fit,
            size));

    /// <summary>The same pictures, taken as rectified already.</summary>
    /// <param name="geometry">Focal length, baseline and offset; nothing where they are not known, so that there is disparity but no depth.</param>
    /// <exception cref="UserErrorException">The pictures' sizes differ, or are not that of the geometry.</exception>
    public RectifiedPair AsRectified(RectifiedGeometry? geometry = null) => new(Left, Right, geometry);

    /// <summary>Resamples both pictures so that matching points share a row.</summary>
    /// <remarks>
    /// Levels between pixels are looked up by cubic B-splines (Unser 1999) at positions that are not rounded. Pixels that no camera saw, or that
    /// a region or mask forbids, are marked in each picture's <see cref="Picture.Usable"/>. Where the two pictures have different significant
    /// bits, the levels of the one with fewer are scaled up.
    /// </remarks>
    /// <param name="rectification">The rectification, of this pair's rig or of one with cameras of the same picture sizes.</param>
    /// <exception cref="UserErrorException">A picture's size is not that of its camera.</exception>
    public RectifiedPair Rectify(Rectification rectification)
    {
        ArgumentNullException.ThrowIfNull(rectification);
        foreach (var view in Enum.GetValues<View>())
        {
            RequireSize(rectification.Rig, view);
        }

        var bits = Math.Max(Left.SignificantBits, Right.SignificantBits);
        return new(Resampled(View.Left, rectification, bits), Resampled(View.Right, rectification, bits), rectification.Geometry, rectification);
    }

    private Picture Resampled(View view, Rectification rectification, int bits)
    {
        var picture = this[view].WithBits(bits);
        var size = rectification.Geometry.Size;
        var map = rectification.SamplingMapOf(view);
        var largest = (1 << bits) - 1;
        var seen = Resampling.Seen(picture.Size, picture.Usable, map.Columns.Span, map.Rows.Span);
        return new(
            size,
            Resampling.Levels(picture.GreyMemory, picture.Size, 1, largest, map.Columns, map.Rows, size.Width),
            bits,
            picture.SaturationLevel,
            picture.HasColour ? Resampling.Levels(picture.Colour.ToArray(), picture.Size, 3, largest, map.Columns, map.Rows, size.Width) : null,
            Array.TrueForAll(seen, pixel => pixel) ? null : new Mask(size, seen),
            picture.CapturedAt,
            picture.Provenance.With(rectification.Rig.Provenance).Then("rectify", $"{view.ToString().ToLowerInvariant()}, {rectification.Fit.ToString().ToLowerInvariant()}, {size} px"),
            picture.ReadingWarnings);
    }
}
