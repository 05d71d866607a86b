namespace Pairwright.Geometry;

/// <summary>How raw pictures of a rig map to rectified ones with parallel axes and matching rows.</summary>
/// <remarks>
/// Immutable. Both cameras are turned, not moved, and looked through by one linear camera each: the rows run along the baseline from the
/// left to the right camera, so that d = u_left − u_right grows as a point comes nearer, and the axes point as the left camera's own does,
/// less its part along the baseline.
/// </remarks>
public sealed class Rectification
{
    private readonly Matrix3x3 leftFromRectified;
    private readonly Matrix3x3 rightFromRectified;
    private readonly Lazy<(double Left, double Right)> areaKept;

    /// <summary>Makes a rectification from its parts.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="geometry">The rectified geometry; its <see cref="RectifiedGeometry.LeftFromRectified"/> fixes both rotations.</param>
    /// <param name="fit">What of the pictures the geometry was made to keep.</param>
    /// <exception cref="UserErrorException">The geometry's rows or its baseline are not those of the rig.</exception>
    public Rectification(Rig rig, RectifiedGeometry geometry, RectificationFit fit = RectificationFit.Cropped)
    {
        ArgumentNullException.ThrowIfNull(rig);
        ArgumentNullException.ThrowIfNull(geometry);
        var along = geometry.LeftFromRectified.Transpose.Row1;
        var offRow = along - rig.RightCentreInLeft / rig.BaselineMm;
        if (offRow.Norm > 1e-6 || Math.Abs(geometry.BaselineMm / rig.BaselineMm - 1) > 1e-6)
        {
            throw new UserErrorException(
                $"The rectified geometry (baseline {geometry.BaselineMm:0.###} mm, rows {offRow.Norm * 180 / Math.PI:0.####}° off) is not one of this rig (baseline {rig.BaselineMm:0.###} mm); make it with Rectification.Of.");
        }

        (Rig, Geometry, Fit) = (rig, geometry, fit);
        leftFromRectified = geometry.LeftFromRectified;
        rightFromRectified = rig.RightFromLeft.Rotation * geometry.LeftFromRectified;
        areaKept = new(() => (ShareKept(View.Left), ShareKept(View.Right)));
    }

    /// <summary>The rig.</summary>
    public Rig Rig { get; }

    /// <summary>The rectified geometry.</summary>
    public RectifiedGeometry Geometry { get; }

    /// <summary>What of the pictures was to be kept.</summary>
    public RectificationFit Fit { get; }

    /// <summary>
    /// How far the rectified left picture is turned against the raw one about the viewing direction, in degrees, −180 to 180: near 0 for
    /// cameras side by side, near 90 or −90 for one above the other, near 180 where the right camera stands at the left.
    /// </summary>
    public double TurnDegrees
    {
        get
        {
            var rows = Geometry.LeftFromRectified.Transpose.Row1;
            return Math.Atan2(rows.Y, rows.X) * 180 / Math.PI;
        }
    }

    /// <summary>Works out a rectification of a rig.</summary>
    /// <remarks>
    /// Both principal points share a column, so that a disparity of zero is infinity, unless that would cost more than a tenth of what
    /// separate columns keep, as with cameras that look towards each other.
    /// </remarks>
    /// <param name="rig">The rig.</param>
    /// <param name="fit">What of the two pictures to keep.</param>
    /// <param name="size">
    /// The size of the rectified pictures; the focal length follows from it. When left out, the focal length is the mean of the rig's, so
    /// that the scale stays, and the size follows (at most twice the larger picture's).
    /// </param>
    /// <exception cref="UserErrorException">
    /// One camera looks at the other (the epipole lies inside a picture), the pictures share no rectangle, or the size is below two pixels.
    /// </exception>
    public static Rectification Of(Rig rig, RectificationFit fit = RectificationFit.Cropped, PictureSize? size = null) =>
        RectificationPlan.For(rig, fit, size);

    /// <summary>The rectified pixel of an ideal one; NaN at 90° or more from the rectified axis.</summary>
    public RectifiedPixel Rectify(View view, IdealPixel pixel)
    {
        var direction = CameraFromRectified(view).Transpose * Rig[view].Matrix.Direction(pixel);
        return direction.Z > 0
            ? new(Geometry.FocalPixels * direction.X / direction.Z + CentreU(view), Geometry.FocalPixels * direction.Y / direction.Z + Geometry.CentreV)
            : new(double.NaN, double.NaN);
    }

    /// <summary>The rectified pixel of a raw one; NaN at 90° or more from the rectified axis.</summary>
    /// <exception cref="UserErrorException">The pixel lies outside the lens model's valid field.</exception>
    public RectifiedPixel Rectify(View view, RawPixel pixel) => Rectify(view, Rig[view].Undistort(pixel));

    /// <summary>The ideal pixel of a rectified one; NaN behind the camera.</summary>
    public IdealPixel Unrectify(View view, RectifiedPixel pixel) => Rig[view].ProjectIdeal(CameraDirection(view, pixel));

    /// <summary>The raw pixel of a rectified one: where the remapping looks the level up; NaN outside the lens model's valid field.</summary>
    public RawPixel RawFromRectified(View view, RectifiedPixel pixel) => Rig[view].Project(CameraDirection(view, pixel));

    /// <summary>The row of a match's right pixel less that of its left one in the rectified pair, in pixels; zero for an exact match.</summary>
    public double RowError(IdealMatch match) => Rectify(View.Right, match.Right).V - Rectify(View.Left, match.Left).V;

    /// <summary>The row of a match's right pixel less that of its left one in the rectified pair, in pixels; zero for an exact match.</summary>
    /// <exception cref="UserErrorException">A pixel lies outside its lens model's valid field.</exception>
    public double RowError(RawMatch match) => RowError(Rig.Undistort(match));

    /// <summary>The disparity u_left − u_right of a match in the rectified pair, in pixels.</summary>
    public double Disparity(IdealMatch match) => Rectify(View.Left, match.Left).U - Rectify(View.Right, match.Right).U;

    /// <summary>The share of a raw picture's area that the rectified one shows, 0 to 1, to about half a percent; the rest is lost.</summary>
    public double UsableShare(View view) => view == View.Left ? areaKept.Value.Left : areaKept.Value.Right;

    /// <summary>For each rectified pixel where in a view's raw picture its level is looked up; NaN where the camera did not see it.</summary>
    public SamplingMap SamplingMapOf(View view)
    {
        var (size, camera, turn) = (Geometry.Size, Rig[view], CameraFromRectified(view));
        var (columns, rows) = (new float[size.Area], new float[size.Area]);
        Parallel.For(0, size.Height, v =>
        {
            // Along a row the direction grows by the same step from pixel to pixel.
            var start = CameraDirection(view, new(0, v));
            var step = turn.Transpose.Row1 / Geometry.FocalPixels;
            for (var u = 0; u < size.Width; u++)
            {
                var at = camera.Project(start + u * step);
                var seen = camera.Size.Contains(at.U, at.V);
                columns[(long)v * size.Width + u] = seen ? (float)at.U : float.NaN;
                rows[(long)v * size.Width + u] = seen ? (float)at.V : float.NaN;
            }
        });
        return new(view, size, columns, rows);
    }

    private double CentreU(View view) => view == View.Left ? Geometry.CentreU : Geometry.CentreU + Geometry.OffsetPixels;

    private Matrix3x3 CameraFromRectified(View view) => view == View.Left ? leftFromRectified : rightFromRectified;

    private Vector3D CameraDirection(View view, RectifiedPixel pixel) =>
        CameraFromRectified(view)
        * new Vector3D((pixel.U - CentreU(view)) / Geometry.FocalPixels, (pixel.V - Geometry.CentreV) / Geometry.FocalPixels, 1);

    private double ShareKept(View view)
    {
        const int cells = 100;
        var (camera, kept) = (Rig[view], 0);
        for (var i = 0; i < cells * cells; i++)
        {
            var raw = new RawPixel((i % cells + 0.5) / cells * camera.Size.Width - 0.5, (i / cells + 0.5) / cells * camera.Size.Height - 0.5);
            if (camera.TryUndistort(raw) is { } ideal && Rectify(view, ideal) is var rectified && Geometry.Size.Contains(rectified.U, rectified.V))
            {
                kept++;
            }
        }

        return kept / (double)(cells * cells);
    }
}
