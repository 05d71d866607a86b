namespace Pairwright.Geometry;

/// <summary>The geometry of a rectified pair: one focal length, a baseline along the rows, and the difference of the principal points' columns.</summary>
/// <remarks>Z = f·b / (d + offset), with d = u_left − u_right. Depth Z is along the rectified left axis, in millimetres.</remarks>
public sealed record RectifiedGeometry
{
    /// <summary>Makes the geometry.</summary>
    /// <param name="focalPixels">The focal length f of both rectified views, in pixels, above zero.</param>
    /// <param name="baselineMm">The baseline b, in millimetres, above zero.</param>
    /// <param name="offsetPixels">The column of the right principal point minus that of the left one, in pixels.</param>
    /// <param name="centreU">The column of the left principal point, in pixels.</param>
    /// <param name="centreV">The row of both principal points, in pixels.</param>
    /// <param name="size">The size of both rectified pictures.</param>
    /// <param name="leftFromRectified">Turns directions of the rectified left frame into the left camera's own frame; identity when left out.</param>
    /// <exception cref="UserErrorException">A value is not finite or not in its range.</exception>
    public RectifiedGeometry(
        double focalPixels, double baselineMm, double offsetPixels, double centreU, double centreV, PictureSize size, Matrix3x3? leftFromRectified = null)
    {
        if (!(focalPixels > 0 && baselineMm > 0) || !double.IsFinite(focalPixels + baselineMm + offsetPixels + centreU + centreV))
        {
            throw new UserErrorException(
                $"A rectified pair needs a focal length (given {focalPixels} px) and a baseline (given {baselineMm} mm) above zero and a finite offset and centre; correct them.");
        }

        if (leftFromRectified is { } turn && !Rotation.IsRotation(turn))
        {
            throw new UserErrorException("The rotation from the rectified to the left camera's frame is not a rotation; correct it.");
        }

        (FocalPixels, BaselineMm, OffsetPixels, CentreU, CentreV, Size) = (focalPixels, baselineMm, offsetPixels, centreU, centreV, size);
        LeftFromRectified = leftFromRectified ?? Matrix3x3.Identity;
    }

    /// <summary>The focal length f of both rectified views, in pixels.</summary>
    public double FocalPixels { get; }

    /// <summary>The baseline b, in millimetres.</summary>
    public double BaselineMm { get; }

    /// <summary>The column of the right principal point minus that of the left one, in pixels.</summary>
    public double OffsetPixels { get; }

    /// <summary>The column of the left principal point, in pixels.</summary>
    public double CentreU { get; }

    /// <summary>The row of both principal points, in pixels.</summary>
    public double CentreV { get; }

    /// <summary>The size of both rectified pictures.</summary>
    public PictureSize Size { get; }

    /// <summary>Turns directions of the rectified left frame into the left camera's own frame.</summary>
    public Matrix3x3 LeftFromRectified { get; }

    /// <summary>Z = f·b / (d + offset), in millimetres; NaN where the disparity is NaN or at or behind infinity.</summary>
    public double DepthMm(double disparity) =>
        disparity + OffsetPixels > 0 ? FocalPixels * BaselineMm / (disparity + OffsetPixels) : double.NaN;

    /// <summary>The disparity of a depth along the rectified axis: d = f·b / Z − offset, in pixels.</summary>
    public double Disparity(double depthMm) => FocalPixels * BaselineMm / depthMm - OffsetPixels;

    /// <summary>dZ/dd = −Z² / (f·b), in millimetres per pixel, at a depth.</summary>
    public double DepthPerDisparity(double depthMm) => -depthMm * depthMm / (FocalPixels * BaselineMm);

    /// <summary>Focal length, baseline, offset and size.</summary>
    public override string ToString() =>
        FormattableString.Invariant($"{Size} px, focal length {FocalPixels:0.###} px, baseline {BaselineMm:0.###} mm, offset {OffsetPixels:0.###} px, centre ({CentreU:0.###}, {CentreV:0.###}) px");

    /// <summary>The point in the rectified left frame, in millimetres; NaN where the disparity gives no depth.</summary>
    public Vector3D PointInRectifiedFrame(RectifiedPixel left, double disparity)
    {
        var z = DepthMm(disparity);
        return new((left.U - CentreU) * z / FocalPixels, (left.V - CentreV) * z / FocalPixels, z);
    }

    /// <summary>The point in the left camera's own frame, in millimetres; NaN where the disparity gives no depth.</summary>
    public Vector3D PointInLeftCamera(RectifiedPixel left, double disparity) => LeftFromRectified * PointInRectifiedFrame(left, disparity);
}
