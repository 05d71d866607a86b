namespace Pairwright.Geometry;

/// <summary>Chooses axes, focal length, centres and size of a rectification.</summary>
/// <remarks>Everything is planned on the plane at distance one of the rectified axes, where pixels are (x, y) and a focal length is a scale.</remarks>
internal static class RectificationPlan
{
    // Beyond this angle from the axis a rectified pixel would be stretched more than thirtyfold; nothing is kept there.
    private const double WidestAngle = 80 * Math.PI / 180;
    private const int Rows = 240;

    // What shared principal columns may cost against separate ones.
    private const double WorthSharing = 0.9;

    public static Rectification For(Rig rig, RectificationFit fit, PictureSize? size)
    {
        ArgumentNullException.ThrowIfNull(rig);
        if (size is { Width: < 2 } or { Height: < 2 })
        {
            throw new UserErrorException($"A rectified size of {size} px is too small; give at least 2 × 2 px, or none.");
        }

        RefuseWhereOneCameraSeesTheOther(rig);
        var leftFromRectified = Axes(rig);
        var left = Outline(rig, View.Left, leftFromRectified);
        var right = Outline(rig, View.Right, leftFromRectified);
        return fit == RectificationFit.Everything
            ? Everything(rig, leftFromRectified, left, right, size)
            : Cropped(rig, leftFromRectified, left, right, size);
    }

    private static void RefuseWhereOneCameraSeesTheOther(Rig rig)
    {
        foreach (var (view, baseline) in new[] { (View.Left, rig.RightCentreInLeft), (View.Right, rig.RightFromLeft.Translation) })
        {
            // In front of the camera or behind it: either way the epipole is the pixel where the baseline pierces the picture.
            var ahead = baseline.Z < 0 ? -baseline : baseline;
            var epipole = rig[view].Project(ahead);
            if (rig[view].Size.Contains(epipole.U, epipole.V))
            {
                throw new UserErrorException(
                    $"The {view.Name()} camera looks along the baseline (its epipole is at pixel ({epipole.U:0}, {epipole.V:0}), inside the picture), so no rectification has matching rows; search along epipolar lines instead, or mount the cameras side by side.");
            }
        }
    }

    // The columns of the result are the rectified axes in the left camera's frame.
    private static Matrix3x3 Axes(Rig rig)
    {
        var along = rig.RightCentreInLeft.Normalized;
        var viewing = new Vector3D(0, 0, 1);
        var forward = (viewing - viewing.Dot(along) * along).Normalized;
        return Matrix3x3.FromRows(along, forward.Cross(along), forward).Transpose;
    }

    // Through the centres of the outermost pixels, so that every level inside can be interpolated.
    private static PlaneOutline Outline(Rig rig, View view, Matrix3x3 leftFromRectified)
    {
        var rectifiedFromCamera = view == View.Left
            ? leftFromRectified.Transpose
            : leftFromRectified.Transpose * rig.RightFromLeft.Rotation.Transpose;
        return new(rig[view].BorderDrawnIn(0.5).Select(pixel =>
        {
            var direction = rectifiedFromCamera * rig[view].Matrix.Direction(pixel);
            var aside = Math.Sqrt(direction.X * direction.X + direction.Y * direction.Y);
            var reach = Math.Atan2(aside, direction.Z) > WidestAngle ? Math.Tan(WidestAngle) / aside : 1 / direction.Z;
            return (reach * direction.X, reach * direction.Y);
        }));
    }

    private static Rectification Everything(Rig rig, Matrix3x3 axes, PlaneOutline left, PlaneOutline right, PictureSize? size)
    {
        var (top, bottom) = (Math.Min(left.Top, right.Top), Math.Max(left.Bottom, right.Bottom));
        var together = Math.Max(left.Right, right.Right) - Math.Min(left.Left, right.Left);
        var apart = Math.Max(left.Right - left.Left, right.Right - right.Left);
        var shared = apart >= WorthSharing * together;
        var (width, height) = (shared ? together : apart, bottom - top);
        double focal;
        if (size is { } given)
        {
            focal = Math.Min((given.Width - 1) / width, (given.Height - 1) / height);
        }
        else
        {
            var most = 2.0 * Math.Max(
                Math.Max(rig.Left.Size.Width, rig.Left.Size.Height), Math.Max(rig.Right.Size.Width, rig.Right.Size.Height));
            focal = Math.Min(MeanFocal(rig), (most - 1) / Math.Max(width, height));
            size = new((int)Math.Ceiling(focal * width) + 1, (int)Math.Ceiling(focal * height) + 1);
        }

        var middleLeft = shared ? (Math.Min(left.Left, right.Left) + Math.Max(left.Right, right.Right)) / 2 : (left.Left + left.Right) / 2;
        var middleRight = shared ? middleLeft : (right.Left + right.Right) / 2;
        return Make(rig, axes, RectificationFit.Everything, size.Value, focal, middleLeft, middleRight, (top + bottom) / 2);
    }

    private static Rectification Cropped(Rig rig, Matrix3x3 axes, PlaneOutline left, PlaneOutline right, PictureSize? size)
    {
        var aspect = size is { } given ? (given.Width - 1.0) / (given.Height - 1.0) : (double?)null;
        var apart = LargestRectangle(left, right, shareColumns: false, aspect);
        var together = LargestRectangle(left, right, shareColumns: true, aspect);
        var chosen = together.Area >= WorthSharing * apart.Area ? together : apart;
        if (!(chosen.Area > 0))
        {
            throw new UserErrorException(
                "After rectification the two pictures have no row in common, so nothing is left to match; check the rig's rotation, or keep everything instead of cropping.");
        }

        var focal = size is { } fixedSize ? (fixedSize.Height - 1) / chosen.Height : MeanFocal(rig);
        var chosenSize = size ?? new((int)Math.Floor(focal * chosen.Width) + 1, (int)Math.Floor(focal * chosen.Height) + 1);
        var rectification = Make(
            rig, axes, RectificationFit.Cropped, chosenSize, focal, chosen.MiddleLeft, chosen.MiddleRight, (chosen.Top + chosen.Bottom) / 2);
        return WithFilledBorder(rectification, sizeIsFixed: size is not null);
    }

    // The outline is a chain of chords, and bulges or caves in by a fraction of a pixel between them: the exact map has the last word.
    private static Rectification WithFilledBorder(Rectification rectification, bool sizeIsFixed)
    {
        for (var attempt = 0; attempt < 100; attempt++)
        {
            var geometry = rectification.Geometry;
            var (last, bottom) = (geometry.Size.Width - 1, geometry.Size.Height - 1);
            var columns = Enumerable.Range(0, geometry.Size.Width);
            var rows = Enumerable.Range(0, geometry.Size.Height);
            var empty = new[]
            {
                columns.Count(u => IsEmpty(new(u, 0))), columns.Count(u => IsEmpty(new(u, bottom))),
                rows.Count(v => IsEmpty(new(0, v))), rows.Count(v => IsEmpty(new(last, v))),
            };
            if (empty.Sum() == 0)
            {
                return rectification;
            }

            var (width, height) = (geometry.Size.Width, geometry.Size.Height);
            if (width < 3 || height < 3)
            {
                break;
            }

            // A fixed size is kept by zooming in about the middle; otherwise the worst side loses its outermost row or column.
            var zoom = sizeIsFixed ? 1 + 1.0 / Math.Max(width, height) : 1;
            var worst = Array.IndexOf(empty, empty.Max());
            var (cutTop, cutLeft) = (!sizeIsFixed && worst == 0 ? 1 : 0, !sizeIsFixed && worst == 2 ? 1 : 0);
            var centreU = last / 2.0 + zoom * (geometry.CentreU - last / 2.0) - cutLeft;
            var centreV = bottom / 2.0 + zoom * (geometry.CentreV - bottom / 2.0) - cutTop;
            rectification = new(
                rectification.Rig,
                new(
                    zoom * geometry.FocalPixels,
                    geometry.BaselineMm,
                    zoom * geometry.OffsetPixels,
                    centreU,
                    centreV,
                    sizeIsFixed ? geometry.Size : new(width - (worst >= 2 ? 1 : 0), height - (worst < 2 ? 1 : 0)),
                    geometry.LeftFromRectified),
                rectification.Fit);
        }

        throw new UserErrorException(
            "The two pictures share no rectangle that both cameras fill; check the rig's lenses, or keep everything instead of cropping.");

        bool IsEmpty(RectifiedPixel pixel) => IsEmptyIn(View.Left, pixel) || IsEmptyIn(View.Right, pixel);

        bool IsEmptyIn(View view, RectifiedPixel pixel)
        {
            var (raw, size) = (rectification.RawFromRectified(view, pixel), rectification.Rig[view].Size);
            return !(raw.U >= 0 && raw.V >= 0 && raw.U <= size.Width - 1 && raw.V <= size.Height - 1);
        }
    }

    // Over all pairs of rows, what width the rows between them leave in both outlines. With an aspect (width over height) the rectangle is
    // narrowed, or the pair passed over, to fit it.
    private static Rectangle LargestRectangle(PlaneOutline left, PlaneOutline right, bool shareColumns, double? aspect)
    {
        var (top, bottom) = (Math.Max(left.Top, right.Top), Math.Min(left.Bottom, right.Bottom));
        var best = new Rectangle(0, 0, 0, 0, 0);
        if (!(top < bottom))
        {
            return best;
        }

        var ys = Enumerable.Range(0, Rows).Select(row => top + (row + 0.5) / Rows * (bottom - top)).ToArray();
        var (inLeft, inRight) = (ys.Select(left.Span).ToArray(), ys.Select(right.Span).ToArray());
        for (var first = 0; first < Rows; first++)
        {
            var (a, b) = (inLeft[first], inRight[first]);
            for (var last = first + 1; last < Rows; last++)
            {
                a = (Math.Max(a.Low, inLeft[last].Low), Math.Min(a.High, inLeft[last].High));
                b = (Math.Max(b.Low, inRight[last].Low), Math.Min(b.High, inRight[last].High));
                if (shareColumns)
                {
                    a = b = (Math.Max(a.Low, b.Low), Math.Min(a.High, b.High));
                }

                var width = Math.Min(a.High - a.Low, b.High - b.Low);
                var height = ys[last] - ys[first];
                if (!(width > 0))
                {
                    break;
                }

                if (aspect is { } wanted)
                {
                    width = wanted * height <= width ? wanted * height : 0;
                }

                if (width * height > best.Area)
                {
                    best = new(ys[first], ys[last], width, (a.Low + a.High) / 2, (b.Low + b.High) / 2);
                }
            }
        }

        return best;
    }

    private static double MeanFocal(Rig rig)
    {
        var (left, right) = (rig.Left.Matrix, rig.Right.Matrix);
        return Math.Sqrt(Math.Sqrt(left.FocalU * left.FocalV) * Math.Sqrt(right.FocalU * right.FocalV));
    }

    private static Rectification Make(
        Rig rig, Matrix3x3 axes, RectificationFit fit, PictureSize size, double focal, double middleLeft, double middleRight, double middleRow)
    {
        var (middleU, middleV) = ((size.Width - 1) / 2.0, (size.Height - 1) / 2.0);
        return new(
            rig,
            new(
                focal,
                rig.BaselineMm,
                focal * (middleLeft - middleRight),
                middleU - focal * middleLeft,
                middleV - focal * middleRow,
                size,
                axes),
            fit);
    }

    private readonly record struct Rectangle(double Top, double Bottom, double Width, double MiddleLeft, double MiddleRight)
    {
        public double Height => Bottom - Top;

        public double Area => Width * Height;
    }
}
