using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <content>Making a rectified pair.</content>
public sealed partial class StereoPair
{
    /// <summary>Resamples both pictures so that matching points share a row.</summary>
    /// <remarks>
    /// Levels between pixels are looked up by cubic convolution (Keys 1981) at positions that are not rounded. Pixels that no camera saw, or that
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
        var columns = new float[size.Area];
        var rows = new float[size.Area];
        Parallel.For(0, size.Height, v =>
        {
            for (var u = 0; u < size.Width; u++)
            {
                var raw = rectification.RawFromRectified(view, new(u, v));
                (columns[v * size.Width + u], rows[v * size.Width + u]) = ((float)raw.U, (float)raw.V);
            }
        });

        var largest = (1 << bits) - 1;
        var seen = CubicConvolution.Seen(picture.Size, picture.Usable, columns, rows);
        return new(
            size,
            CubicConvolution.Resample(picture.GreyMemory, picture.Size, 1, largest, columns, rows, size.Width),
            bits,
            picture.SaturationLevel,
            picture.HasColour ? CubicConvolution.Resample(picture.Colour.ToArray(), picture.Size, 3, largest, columns, rows, size.Width) : null,
            Array.TrueForAll(seen, pixel => pixel) ? null : new Mask(size, seen),
            picture.CapturedAt,
            picture.Provenance.With(rectification.Rig.Provenance).Then("rectify", $"{view.ToString().ToLowerInvariant()}, {size} px"),
            picture.ReadingWarnings);
    }
}
