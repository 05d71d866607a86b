namespace Pairwright.Geometry;

/// <summary>How raw pictures of a rig map to rectified ones with parallel axes and matching rows.</summary>
public sealed class Rectification
{
    /// <summary>Makes a rectification from its parts.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="geometry">The rectified geometry; its <see cref="RectifiedGeometry.LeftFromRectified"/> fixes both rotations.</param>
    public Rectification(Rig rig, RectifiedGeometry geometry)
    {
        ArgumentNullException.ThrowIfNull(rig);
        ArgumentNullException.ThrowIfNull(geometry);
        (Rig, Geometry) = (rig, geometry);
    }

    /// <summary>The rig.</summary>
    public Rig Rig { get; }

    /// <summary>The rectified geometry.</summary>
    public RectifiedGeometry Geometry { get; }

    /// <summary>The rectified pixel of an ideal one.</summary>
    public RectifiedPixel Rectify(View view, IdealPixel pixel)
    {
        var direction = RectifiedFromCamera(view) * Rig[view].Ray(pixel);
        return new(Geometry.FocalPixels * direction.X / direction.Z + CentreU(view), Geometry.FocalPixels * direction.Y / direction.Z + Geometry.CentreV);
    }

    /// <summary>The ideal pixel of a rectified one; NaN behind the camera.</summary>
    public IdealPixel Unrectify(View view, RectifiedPixel pixel) => Rig[view].ProjectIdeal(CameraDirection(view, pixel));

    /// <summary>The raw pixel of a rectified one: where the remapping looks the level up; NaN outside the lens model's valid field.</summary>
    public RawPixel RawFromRectified(View view, RectifiedPixel pixel) => Rig[view].Project(CameraDirection(view, pixel));

    private double CentreU(View view) => view == View.Left ? Geometry.CentreU : Geometry.CentreU + Geometry.OffsetPixels;

    private Matrix3x3 RectifiedFromCamera(View view) =>
        view == View.Left ? Geometry.LeftFromRectified.Transpose : Geometry.LeftFromRectified.Transpose * Rig.RightFromLeft.Rotation.Transpose;

    private Vector3D CameraDirection(View view, RectifiedPixel pixel) =>
        RectifiedFromCamera(view).Transpose
        * new Vector3D((pixel.U - CentreU(view)) / Geometry.FocalPixels, (pixel.V - Geometry.CentreV) / Geometry.FocalPixels, 1);
}
